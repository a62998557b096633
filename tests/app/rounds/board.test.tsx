import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Component as RoundPage } from '../../../app/pages/round.tsx';
import type { BoardAnswer, BoardPerson, RoundAnswer, StagePreview } from '../../../shared/schemas/round.ts';
import { fakeApi, FakeProblem, type FakeCall } from '../../support/fake-api.ts';
import { renderPage } from '../../support/render-page.tsx';

const NOW = '2031-03-03T16:50:00.000Z';
const minutesAgo = (minutes: number) => new Date(Date.parse(NOW) - minutes * 60_000).toISOString();

const round: RoundAnswer = {
  id: 'r6',
  classId: 'c1',
  className: '10C',
  timeZone: 'Europe/Vienna',
  number: 6,
  taskId: 't1',
  title: 'Surface of a cylinder',
  stage: 'writing',
  instants: {
    opensAt: '2031-03-02T09:00:00.000Z',
    writingEndsAt: '2031-03-03T20:00:00.000Z',
    reviewingEndsAt: '2031-03-05T11:00:00.000Z',
    answeringEndsAt: '2031-03-06T11:00:00.000Z',
    settlesAt: '2031-03-06T17:00:00.000Z',
  },
  reviewsPerDerivation: 2,
  lateRule: 'closed',
  waitingForRulings: false,
  version: 3,
  role: 'teacher',
  warnings: [],
};

function person(name: string, values: Partial<BoardPerson> = {}): BoardPerson {
  return {
    userId: `id-${name}`,
    name,
    state: 'writing',
    derivationId: null,
    lines: 3,
    hasOpened: true,
    savedAt: minutesAgo(4),
    lineAddedAt: minutesAgo(4),
    handedInAt: null,
    late: false,
    tooShort: false,
    ownWritingEndsAt: null,
    ownReviewingEndsAt: null,
    reviews: { dealt: 0, begun: 0, done: 0 },
    findings: { received: 0, accepted: 0, contested: 0 },
    ...values,
  };
}

const board: BoardAnswer = {
  round,
  now: NOW,
  stageEndsAt: '2031-03-03T20:02:00.000Z',
  seesNames: true,
  decimal: 'point',
  alerts: [
    { kind: 'line-stops', line: 2, texts: ['a=b', 'a=c', 'a=d'] },
    { kind: 'not-begun', count: 1 },
  ],
  disputesOpen: 0,
  people: [
    person('Amara Diop', { savedAt: minutesAgo(0.2) }),
    person('Farid Noori', { state: 'stuck', lineAddedAt: minutesAgo(22) }),
    person('Vera Osei', { state: 'not-begun', lines: 0 }),
    person('Celia Strand', {
      state: 'handed-in',
      handedInAt: '2031-03-03T15:40:00.000Z',
      derivationId: 'd1',
      lines: 5,
    }),
  ],
};

const viewer = (role: string) => ({
  user: { id: 'u', name: 'Ilse Varga', role, email: null, userName: null },
  school: { id: 's', name: 'Brackenfell School' },
  classes: [],
});

function show(answers: Parameters<typeof fakeApi>[0] = {}): FakeCall[] {
  const calls = fakeApi({ 'GET /api/rounds/r6/board': board, 'GET /api/me': viewer('teacher'), ...answers });
  renderPage(RoundPage, '/rounds/:roundId', '/rounds/r6');
  return calls;
}

beforeEach(() => {
  vi.useFakeTimers({ now: new Date(NOW), toFake: ['Date'] });
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

describe('the board', { timeout: 20_000 }, () => {
  it('shows where time stands, the four figures, and each person in their list', async () => {
    show();
    expect(await screen.findByRole('heading', { level: 1, name: 'Surface of a cylinder' })).toBeInTheDocument();
    const stages = screen.getByRole('list', { name: 'Stages of the round' });
    expect(within(stages).getByText('writing').closest('li')).toHaveAttribute('aria-current', 'step');
    expect(stages).toHaveTextContent('yesterday 10:00 to today 21:00');
    const standing = screen.getByRole('region', { name: 'How everyone stands' });
    expect(standing).toHaveTextContent('1 handed in');
    expect(standing).toHaveTextContent('1 not begun');
    const rowOf = (name: string) => screen.getByText(name).closest('li');
    expect(rowOf('Amara Diop')).toHaveTextContent('writes now');
    expect(rowOf('Farid Noori')).toHaveTextContent('line 3, 22 min');
    expect(rowOf('Vera Osei')).toHaveTextContent('has read the task');
    expect(rowOf('Celia Strand')).toHaveTextContent('today 16:40');
  });

  it('says what needs the teacher, each with an act', async () => {
    show();
    expect(await screen.findByRole('heading', { name: 'Two things need you' })).toBeInTheDocument();
    await userEvent.click(screen.getByRole('button', { name: 'See the 3 lines' }));
    const dialog = await screen.findByRole('dialog', { name: 'Line 2, as they wrote it' });
    expect(within(dialog).getAllByRole('listitem')).toHaveLength(3);
  });

  it('gives everyone more time', async () => {
    const calls = show({ 'POST /api/rounds/r6/more-time': undefined });
    const [button] = await screen.findAllByRole('button', { name: 'Give more time' });
    await userEvent.click(button as HTMLElement);
    const dialog = await screen.findByRole('dialog', { name: 'Give everyone more time' });
    await userEvent.click(within(dialog).getByRole('radio', { name: '1 day' }));
    expect(dialog).toHaveTextContent('Writing ends tomorrow 21:00');
    await userEvent.click(within(dialog).getByRole('button', { name: 'Give more time' }));
    await waitFor(() => expect(screen.queryByRole('dialog')).not.toBeInTheDocument());
    expect(calls).toContainEqual({ what: 'POST /api/rounds/r6/more-time', body: { minutes: 1440, reason: '' } });
  });

  it('shows what opening reviewing will do before it does it', async () => {
    const preview: StagePreview = {
      from: 'writing',
      to: 'reviewing',
      at: NOW,
      needsForce: false,
      effects: [
        { kind: 'closes-writing', count: 3 },
        { kind: 'deals', count: 6, each: 2 },
      ],
      warnings: [{ kind: 'still-writing', count: 2 }],
    };
    const calls = show({
      'GET /api/rounds/r6/next': preview,
      'POST /api/rounds/r6/stage': { ...round, stage: 'reviewing' },
    });
    await userEvent.click(await screen.findByRole('button', { name: 'Open reviewing now' }));
    const dialog = await screen.findByRole('dialog', { name: /deal the derivations now/ });
    const effects = within(dialog).getByRole('list', { name: 'What it will do' });
    expect(effects).toHaveTextContent('Writing closes for 3 people who have not handed in.');
    expect(effects).toHaveTextContent('6 derivations are dealt, 2 reviews for each reviewer.');
    expect(dialog).toHaveTextContent('2 people have begun and not handed in.');
    await userEvent.click(within(dialog).getByRole('button', { name: 'Open reviewing now' }));
    await waitFor(() => expect(screen.queryByRole('dialog')).not.toBeInTheDocument());
    const move = calls.find(({ what }) => what === 'POST /api/rounds/r6/stage');
    expect(move?.body).toEqual({ to: 'reviewing', force: false, reason: '' });
  });

  it('says why an act was refused and keeps the dialog open', async () => {
    const refusal = new FakeProblem({
      type: 'wrong-stage',
      title: 'No',
      status: 409,
      detail: 'The round is reviewing already.',
    });
    const effects = [{ kind: 'closes-writing', count: 1 }];
    show({
      'GET /api/rounds/r6/next': {
        from: 'writing',
        to: 'reviewing',
        at: null,
        needsForce: false,
        effects,
        warnings: [],
      },
      'POST /api/rounds/r6/stage': refusal,
    });
    await userEvent.click(await screen.findByRole('button', { name: 'Open reviewing now' }));
    const dialog = await screen.findByRole('dialog');
    await userEvent.click(await within(dialog).findByRole('button', { name: 'Open reviewing now' }));
    expect(await within(dialog).findByRole('alert')).toHaveTextContent('The round is reviewing already.');
  });

  it('gives one person more time, and excuses one', async () => {
    const calls = show({
      'PUT /api/rounds/r6/people/id-Farid Noori/extension': undefined,
      'PUT /api/rounds/r6/people/id-Farid Noori/excuse': undefined,
    });
    await userEvent.click(await screen.findByRole('button', { name: 'Farid Noori' }));
    await userEvent.click(await screen.findByRole('button', { name: 'Give this person more time' }));
    await waitFor(() => expect(screen.queryByRole('dialog')).not.toBeInTheDocument());
    expect(calls.find(({ what }) => what.endsWith('extension'))?.body).toEqual({
      writingEndsAt: '2031-03-04T20:00:00.000Z',
      reviewingEndsAt: null,
      reason: '',
    });
    await userEvent.click(screen.getByRole('button', { name: 'Farid Noori' }));
    await userEvent.type(await screen.findByRole('textbox', { name: 'Why, for the trail' }), 'ill');
    await userEvent.click(screen.getByRole('button', { name: 'Excuse from this round' }));
    await waitFor(() => expect(screen.queryByRole('dialog')).not.toBeInTheDocument());
    expect(calls.find(({ what }) => what.endsWith('excuse'))?.body).toEqual({ excused: true, reason: 'ill' });
  });

  it('lets an assistant look and not act', async () => {
    const hidden = board.people.map((each, i) => ({ ...each, userId: null, name: `Student ${i + 1}` }));
    show({
      'GET /api/rounds/r6/board': {
        ...board,
        seesNames: false,
        people: hidden,
        round: { ...round, role: 'assistant' },
      },
    });
    expect(await screen.findByText('Student 1')).toBeInTheDocument();
    expect(screen.getByRole('heading', { name: 'One thing needs you' })).toBeInTheDocument();
    expect(screen.queryByRole('button', { name: /Give more time|Open reviewing|Student/ })).not.toBeInTheDocument();
  });
});

describe('other stages', { timeout: 20_000 }, () => {
  it('counts reviews while reviewing', async () => {
    const people = [
      person('Amara Diop', { state: 'handed-in', reviews: { dealt: 2, begun: 0, done: 2 } }),
      person('Ben Hallworth', { state: 'handed-in', reviews: { dealt: 2, begun: 1, done: 0 } }),
      person('Celia Strand', { state: 'handed-in', reviews: { dealt: 2, begun: 0, done: 0 } }),
    ];
    show({ 'GET /api/rounds/r6/board': { ...board, alerts: [], people, round: { ...round, stage: 'reviewing' } } });
    expect(await screen.findByRole('region', { name: 'How everyone stands' })).toHaveTextContent(
      '2 of 6 reviews handed in',
    );
    expect(screen.getByText('Ben Hallworth').closest('li')).toHaveTextContent('0 of 2, 1 begun');
    expect(screen.getByRole('heading', { name: 'Nothing needs you' })).toBeInTheDocument();
  });

  it('leads to the rulings that a round waits for', async () => {
    const waiting = { ...round, stage: 'answering' as const, waitingForRulings: true };
    show({
      'GET /api/rounds/r6/board': { ...board, round: waiting, alerts: [{ kind: 'waiting-for-rulings', count: 2 }] },
    });
    expect(await screen.findByRole('link', { name: 'Rule on disputes' })).toHaveAttribute('href', '/disputes');
    expect(screen.getByText('Waiting for 2 rulings.')).toBeInTheDocument();
    expect(screen.getByRole('button', { name: 'Settle all the same' })).toBeInTheDocument();
  });
});

describe('somebody who does not teach the class', { timeout: 20_000 }, () => {
  const things = [{ kind: 'write', roundId: 'r6', dueAt: NOW, begun: false, last: null, unread: [], twoWays: [] }];
  const gone = new FakeProblem({ type: 'not-found', title: 'There is nothing here', status: 404 });

  it('is led to what the round asks of them, as a student', async () => {
    show({
      'GET /api/rounds/r6/board': gone,
      'GET /api/me': viewer('student'),
      'GET /api/today': { now: NOW, things, waiting: [], progress: null, rounds: [], joinRequests: [] },
    });
    expect(await screen.findByText('at /rounds/r6/write')).toBeInTheDocument();
  });

  it('finds nothing, as another teacher', async () => {
    show({ 'GET /api/rounds/r6/board': gone });
    expect(await screen.findByRole('heading', { level: 1 })).toHaveTextContent(/nothing/i);
  });
});
