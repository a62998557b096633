import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { Component as DisputesPage } from '../../../app/pages/disputes.tsx';
import type { DisputeCase, DisputeItem } from '../../../shared/schemas/dispute.ts';
import { fakeApi } from '../../support/fake-api.ts';
import { renderPage } from '../../support/render-page.tsx';
import { LINES, ROUND, TASK, VERDICT } from '../reviews/samples.ts';

const item = (disputeId: string, people: number): DisputeItem => ({
  disputeId,
  kind: 'contested-verdict',
  className: '10C',
  timeZone: 'Europe/Vienna',
  roundNumber: 4,
  taskTitle: `Task ${disputeId}`,
  step: 2,
  people,
  openedAt: '2031-03-01T11:00:00.000Z',
  states: ['holds', 'fault', 'carried'],
  asked: false,
});

const openCase = (disputeId: string, values: Partial<DisputeCase> = {}): DisputeCase => ({
  ...item(disputeId, 6),
  round: ROUND,
  task: TASK,
  lines: LINES,
  verdict: VERDICT,
  words: 'A sign is no fault.',
  raisedBy: 'author',
  findingId: null,
  sameStep: 1,
  findings: [
    {
      findingId: 'f',
      reviewer: null,
      pick: 2,
      noFault: false,
      markedSpan: null,
      sureness: 4,
      slipKind: 'sign',
      shouldBe: '',
      why: 'Minus stays.',
      answer: null,
      outcome: 'right',
      points: 66,
    },
  ],
  question: null,
  questionAnswer: null,
  mayAsk: false,
  mayReveal: true,
  earlier: [],
  ...values,
});

const EFFECT = { people: 6, becomes: { sound: 2, faulty: 0, undecided: 0 }, unchanged: 0, findings: 4, settled: true };

function show(values: Partial<DisputeCase> = {}, more: Parameters<typeof fakeApi>[0] = {}) {
  const calls = fakeApi({
    'GET /api/disputes': [item('a', 6), item('b', 3)],
    'GET /api/disputes/a': openCase('a', values),
    'GET /api/disputes/b': openCase('b'),
    'GET /api/disputes/a/effect?decision=holds&along=true': EFFECT,
    'GET /api/disputes/a/effect?decision=holds&along=false': {
      ...EFFECT,
      people: 3,
      becomes: { ...EFFECT.becomes, sound: 1 },
      findings: 2,
    },
    'POST /api/disputes/a/ruling': undefined,
    ...more,
  });
  renderPage(DisputesPage, '/disputes');
  return calls;
}

// Dialogs and fields are loaded when first needed; on a busy machine that takes a while.
vi.setConfig({ testTimeout: 20_000 });
afterEach(() => vi.unstubAllGlobals());

describe('the dispute desk', () => {
  it('opens with the case of most people: the question, the words, the findings without names', async () => {
    show();
    expect(await screen.findByRole('heading', { level: 1, name: 'Does step 2 follow?' })).toBeInTheDocument();
    expect(screen.getByText('9 people wait. Most people first.')).toBeInTheDocument();
    expect(screen.getByText('“A sign is no fault.”')).toBeInTheDocument();
    expect(screen.getByText('Reviewer 1')).toBeInTheDocument();
    expect(screen.getByText('+66')).toBeInTheDocument();
    expect(screen.getByText(/and 1 more with the same step/)).toBeInTheDocument();
  });

  it('rules by keys alone, says the effect before, and goes on to the next', async () => {
    const user = userEvent.setup();
    const calls = show();
    await screen.findByRole('heading', { level: 1 });
    await user.keyboard('1');
    expect(screen.getByRole('radio', { name: /Step 2 holds/ })).toBeChecked();
    expect(
      await screen.findByText(/2 verdicts become sound; 4 findings are scored again\. Nothing old is deleted\./),
    ).toBeInTheDocument();
    await user.keyboard('The drawing says so.{Enter}');
    await waitFor(() =>
      expect(calls.find((call) => call.what === 'POST /api/disputes/a/ruling')?.body).toEqual({
        decision: 'holds',
        reason: 'The drawing says so.',
        along: true,
      }),
    );
    expect(await screen.findByText(/Task b · round 4/)).toBeInTheDocument();
  });

  it('leaves the other derivations alone where the teacher chooses so', async () => {
    const user = userEvent.setup();
    show();
    await user.click(await screen.findByRole('checkbox', { name: 'Rule the other one with the same step along' }));
    await user.click(screen.getByRole('radio', { name: /Step 2 holds/ }));
    expect(await screen.findByText(/1 verdict becomes sound; 2 findings/)).toBeInTheDocument();
  });

  it('moves through the queue by the arrow keys', async () => {
    const user = userEvent.setup();
    show();
    await screen.findByRole('heading', { level: 1 });
    await user.keyboard('{ArrowDown}');
    expect(await screen.findByText(/Task b · round 4/)).toBeInTheDocument();
    await user.keyboard('{ArrowUp}');
    expect(await screen.findByText(/Task a · round 4/)).toBeInTheDocument();
  });

  it('shows names only when asked', async () => {
    const user = userEvent.setup();
    show({}, { 'POST /api/disputes/a/names': { author: 'Joas Whitlock', reviewers: { f: 'Dara Oyelaran' } } });
    await user.click(await screen.findByRole('button', { name: 'Show the names' }));
    expect(await screen.findByText('Dara Oyelaran')).toBeInTheDocument();
    expect(screen.getAllByText(/Joas Whitlock/).length).toBeGreaterThan(0);
  });

  it('asks the author only after settling', async () => {
    const user = userEvent.setup();
    show();
    await screen.findByRole('heading', { level: 1 });
    expect(screen.getByRole('radio', { name: /Ask the author/ })).toBeDisabled();
    await user.keyboard('4');
    expect(screen.getByRole('radio', { name: /Ask the author/ })).not.toBeChecked();
  });

  it('says when nothing is in dispute', async () => {
    fakeApi({ 'GET /api/disputes': [] });
    renderPage(DisputesPage, '/disputes');
    expect(await screen.findByRole('heading', { level: 1, name: 'Nothing is in dispute.' })).toBeInTheDocument();
  });
});
