import { screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { MendSheet } from '../../../app/features/sheet/mend-sheet.tsx';
import type { MendView } from '../../../shared/schemas/derivation.ts';
import type { HandedInLine } from '../../../shared/schemas/sheet.ts';
import { fakeApi } from '../../support/fake-api.ts';
import type { MathfieldElement } from '../../support/mathlive-stub.ts';
import { renderPage } from '../../support/render-page.tsx';

const line = (stepId: string, tex: string): HandedInLine => ({ stepId, tex, reason: '', uses: null, prose: '' });

const MEND: MendView = {
  derivationId: 'd1',
  timeZone: 'Europe/Vienna',
  task: {
    title: 'A rectangle',
    instructions: '',
    given: '(x+2)(x-3)',
    goal: { kind: 'expanded' },
    assumptions: [],
    settings: {
      numbers: 'real',
      reversible: false,
      presentationCounts: false,
      constantNeeded: false,
      decimal: 'point',
    },
  },
  firstFault: 2,
  fixed: [line('given', '(x+2)(x-3)'), line('a', 'x^2-3x+2x-6')],
  written: [line('b', 'x^2-5x-6')],
  draft: {
    document: {
      type: 'doc',
      content: [{ type: 'step', attrs: { stepId: 'c', tex: 'x^2-5x-6', reason: '', uses: null } }],
    },
    version: 1,
    savedAt: '2031-03-03T17:49:00.000Z',
  },
  handedIn: null,
};

beforeEach(() => localStorage.clear());
afterEach(() => vi.unstubAllGlobals());

it('goes on from the fault, saves what was typed before it is checked, and shows the verdict on it', async () => {
  const verdict = { outcome: 'sound', firstFault: null, steps: [] } as const;
  const handedIn = { number: 1, at: '2031-03-03T18:00:00.000Z', lines: MEND.fixed };
  const calls = fakeApi({
    'GET /api/derivations/d1/mend': MEND,
    'PUT /api/derivations/d1/mend': { version: 2, savedAt: '2031-03-03T17:51:00.000Z' },
    'POST /api/derivations/d1/mend/hand-in': { ...MEND, handedIn: { ...handedIn, verdict } },
  });
  renderPage(
    () => <MendSheet derivationId="d1" userId="u1" showVerdict={(mend) => <p>{mend.verdict.outcome}</p>} />,
    '/derivations/d1',
  );
  expect(await screen.findByRole('list', { name: 'Lines that stay' })).toBeInTheDocument();
  await userEvent.click(await screen.findByRole('button', { name: 'Write on line 2' }));
  ((await screen.findByRole('textbox', { name: 'line 2' })) as MathfieldElement).setValue('x^2-x-6');
  await userEvent.click(screen.getByRole('button', { name: 'Have the mend checked' }));
  expect(await screen.findByText('sound')).toBeInTheDocument();
  await waitFor(() =>
    expect(calls.at(-1)).toEqual({ what: 'POST /api/derivations/d1/mend/hand-in', body: { draftVersion: 2 } }),
  );
});
