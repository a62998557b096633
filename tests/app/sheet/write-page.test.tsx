import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Component as WritePage } from '../../../app/pages/write.tsx';
import type { HandInPreview, SaveSheet, SheetView } from '../../../shared/schemas/derivation.ts';
import type { SheetDocument } from '../../../shared/schemas/sheet.ts';
import { fakeApi, FakeProblem, type FakeCall } from '../../support/fake-api.ts';
import type { MathfieldElement } from '../../support/mathlive-stub.ts';
import { renderPage } from '../../support/render-page.tsx';

const ROUND = '0b1f7a52-0000-4000-8000-000000000001';
const SHEET = `/api/rounds/${ROUND}/sheet`;
const VIEWER = {
  user: { id: 'u1', name: 'Mira Castellan', role: 'student', email: null, userName: 'mira' },
  school: { id: 's1', name: 'Harbour School' },
  classes: [],
};

function document(...lines: string[]): SheetDocument {
  const content = lines.map((tex, i) => ({
    type: 'step',
    attrs: { stepId: `0b1f7a52-0000-4000-8000-00000000010${i}`, tex, reason: '', uses: null },
  }));
  return { type: 'doc', content };
}

function view(values: Partial<SheetView> = {}): SheetView {
  return {
    derivationId: 'd1',
    roundId: ROUND,
    roundNumber: 6,
    className: '10C',
    timeZone: 'Europe/Vienna',
    stage: 'writing',
    task: {
      title: 'A rectangle',
      instructions: 'One change a line, please.',
      given: '(x+2)(x-3)',
      goal: { kind: 'expanded' },
      assumptions: ['x>3'],
      settings: {
        numbers: 'real',
        reversible: false,
        presentationCounts: false,
        constantNeeded: false,
        decimal: 'point',
      },
    },
    reviewers: 2,
    writingEndsAt: '2031-03-03T20:00:00.000Z',
    lateNow: false,
    canWrite: true,
    canTakeBack: false,
    handedIn: null,
    draft: { document: document('x^2-3x+2x-6'), version: 4, savedAt: '2031-03-03T17:49:00.000Z' },
    now: '2031-03-03T17:50:00.000Z',
    ...values,
  };
}

let calls: FakeCall[];

function open(sheet: SheetView, answers: Record<string, unknown> = {}): void {
  let version = sheet.draft.version;
  calls = fakeApi({
    'GET /api/me': VIEWER,
    [`GET ${SHEET}`]: sheet,
    [`PUT ${SHEET}`]: () => {
      version += 1;
      return { version, savedAt: '2031-03-03T17:51:00.000Z' };
    },
    ...(answers as Record<string, object>),
  });
  renderPage(WritePage, '/rounds/:roundId/write', `/rounds/${ROUND}/write`);
}

beforeEach(() => {
  localStorage.clear();
  sessionStorage.clear();
});
afterEach(() => vi.unstubAllGlobals());

const enter = async (line: number) =>
  userEvent.click(await screen.findByRole('button', { name: `Write on line ${line}` }));
const field = async (line: number) =>
  (await screen.findByRole('textbox', { name: `line ${line}` })) as MathfieldElement;
const saved = () => calls.filter(({ what }) => what.startsWith('PUT')).map(({ body }) => body as SaveSheet);
const lines = () =>
  saved()
    .at(-1)
    ?.document.content.map(({ attrs }) => attrs?.['tex']);

describe('the sheet', () => {
  it('shows the task, the given line and where everything is', async () => {
    open(view());
    expect(await screen.findByRole('heading', { name: 'A rectangle' })).toBeInTheDocument();
    expect(screen.getByText(/Multiply out/)).toBeInTheDocument();
    expect(screen.getByText(/here and at school/)).toHaveTextContent('Saved 18:49');
    expect(
      within(screen.getByRole('list', { name: 'The given line' })).getByText('the given line'),
    ).toBeInTheDocument();
    expect(within(screen.getByRole('list', { name: 'Your lines' })).getAllByRole('listitem')).toHaveLength(1);
  });

  it('keeps what is typed in the browser at once and saves it within two seconds', async () => {
    open(view());
    await enter(1);
    (await field(1)).setValue('x^2-x-6');
    expect(Object.keys(localStorage)).toHaveLength(1);
    await waitFor(() => expect(lines()).toEqual(['x^2-x-6']), { timeout: 2_000 });
    expect(saved().at(-1)?.baseVersion).toBe(4);
    await waitFor(() => expect(screen.getByText(/here and at school/)).toHaveTextContent('Saved 18:51'));
    expect(Object.keys(localStorage)).toHaveLength(0);
  });

  it('makes the next line with Enter, and copies the line above with Enter on an empty one', async () => {
    open(view());
    await enter(1);
    fireEvent.keyDown(await field(1), { key: 'Enter' });
    fireEvent.keyDown(await field(2), { key: 'Enter' });
    await waitFor(() => expect(lines()).toEqual(['x^2-3x+2x-6', 'x^2-3x+2x-6']), { timeout: 3_000 });
  });

  it('deletes an empty line with Backspace, and undoes over everything', async () => {
    open(view());
    await enter(1);
    fireEvent.keyDown(await field(1), { key: 'Enter' });
    fireEvent.keyDown(await field(2), { key: 'Backspace' });
    expect(screen.queryByRole('textbox', { name: 'line 2' })).toBeNull();
    fireEvent.keyDown(await field(1), { key: 'z', ctrlKey: true });
    expect(await field(2)).toBeInTheDocument();
  });

  it('names what cannot be read, where, and repairs a bracket', async () => {
    open(view({ draft: { ...view().draft, document: document('(x+2', 'x^2') } }));
    expect(await screen.findByText('Cannot be read yet.')).toBeInTheDocument();
    expect(screen.getByText('not read')).toBeInTheDocument();
    await userEvent.click(screen.getByRole('button', { name: 'Close it at the end' }));
    await waitFor(() => expect(lines()?.[0]).toBe('(x+2)'), { timeout: 3_000 });
    expect(screen.queryByText('Cannot be read yet.')).toBeNull();
  });

  it('asks which of two readings is meant, and never says whether a line is right', async () => {
    open(view({ draft: { ...view().draft, document: document('1/2x', 'x^2=9') } }));
    const question = await screen.findByRole('group', { name: /Two readings/ });
    const choices = within(question).getAllByRole('radio');
    expect(choices).toHaveLength(2);
    await userEvent.click(choices[1] as HTMLElement);
    await waitFor(() => expect(screen.queryByRole('group', { name: /Two readings/ })).toBeNull());
    expect(screen.queryByText(/follows|holds|wrong|correct/)).toBeNull();
  });

  it('announces in words how a line was read when it is left', async () => {
    open(view({ draft: { ...view().draft, document: document('x^2', 'x=3') } }));
    await enter(1);
    await field(1);
    await enter(2);
    expect(await screen.findByText(/line 1 reads as x squared/)).toBeInTheDocument();
  });

  it('lets a line name the lines that it follows from', async () => {
    open(view({ draft: { ...view().draft, document: document('x=1', 'y=2', 'x+y=3') } }));
    await enter(3);
    await userEvent.click(screen.getByRole('button', { name: 'Change a line' }));
    await userEvent.click(screen.getByRole('checkbox', { name: 'line 1' }));
    expect(await screen.findByText('from line 1')).toBeInTheDocument();
    await waitFor(() => expect(saved().at(-1)?.document.content[2]?.attrs?.['uses']).toHaveLength(1), {
      timeout: 3_000,
    });
  });
});

describe('a conflict', () => {
  it('shows both and goes on with both when asked to', async () => {
    const draft = { document: document('x^2-6'), version: 9, savedAt: '2031-03-03T17:50:00.000Z' };
    const problem = { type: 'conflict', title: 'Changed', status: 409, extra: { draft } } as const;
    let isFirst = true;
    open(view(), {
      [`PUT ${SHEET}`]: (body: SaveSheet) => {
        if (isFirst) {
          isFirst = false;
          return new FakeProblem(problem);
        }
        return { version: body.baseVersion + 1, savedAt: '2031-03-03T17:52:00.000Z' };
      },
    });
    await enter(1);
    (await field(1)).setValue('x^2-x-6');
    const both = await screen.findByRole('button', { name: /Keep both/ }, { timeout: 3_000 });
    expect(screen.getByRole('button', { name: 'Hand in your derivation' })).toBeDisabled();
    await userEvent.click(both);
    await waitFor(() => expect(lines()).toEqual(['x^2-x-6', 'x^2-6']));
    expect(saved().at(-1)?.baseVersion).toBe(9);
  });
});

describe('handing in', () => {
  const preview: HandInPreview = {
    draftVersion: 4,
    lines: [
      { stepId: 'given', tex: '(x+2)(x-3)', reason: '', uses: null, prose: '' },
      { stepId: 'a', tex: 'x^2-(6', reason: 'as Hanno does', uses: null, prose: 'Then' },
    ],
    emptyLines: 1,
    names: ['Hanno Pell'],
  };

  it('shows exactly what is posted, warns about names and unread lines, and posts it', async () => {
    const handedIn = { at: '2031-03-03T18:00:00.000Z', late: false, lines: preview.lines };
    open(view(), {
      [`GET ${SHEET}/preview`]: preview,
      [`POST ${SHEET}/hand-in`]: view({ canWrite: false, canTakeBack: true, handedIn }),
      [`POST ${SHEET}/take-back`]: view(),
    });
    await userEvent.click(await screen.findByRole('button', { name: 'Hand in your derivation' }));
    const dialog = await screen.findByRole('dialog', { name: 'Hand in your derivation?' });
    expect(within(dialog).getByText(/Hanno Pell/)).toBeInTheDocument();
    expect(within(dialog).getByText('Line 1 cannot be read.')).toBeInTheDocument();
    expect(within(dialog).getByText(/undecided and go to your teacher/)).toBeInTheDocument();
    expect(within(dialog).getByText('as Hanno does')).toBeInTheDocument();
    await userEvent.click(within(dialog).getByRole('button', { name: 'Hand in' }));
    expect(await screen.findByText('Handed in')).toBeInTheDocument();
    expect(calls.find(({ what }) => what.endsWith('/hand-in'))?.body).toEqual({ draftVersion: 4 });
    await userEvent.click(screen.getByRole('button', { name: 'Take it back and go on writing' }));
    expect(await screen.findByRole('button', { name: 'Hand in your derivation' })).toBeInTheDocument();
  });
});

it('says that writing is over, and shows what was written', async () => {
  open(view({ canWrite: false, stage: 'reviewing' }));
  expect(await screen.findByText('The time for writing is over.')).toBeInTheDocument();
  expect(screen.queryByRole('button', { name: /Hand in/ })).toBeNull();
  expect(screen.queryByRole('button', { name: /Write on line/ })).toBeNull();
});

it('says what went wrong where the sheet cannot be had', async () => {
  open(view(), {
    [`GET ${SHEET}`]: new FakeProblem({
      type: 'wrong-stage',
      title: 'Not yet',
      status: 409,
      detail: 'Writing has not begun yet.',
    }),
  });
  expect(await screen.findByText('Writing has not begun yet.')).toBeInTheDocument();
});
