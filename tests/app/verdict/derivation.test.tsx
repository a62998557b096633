import { screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { Component as DerivationPage } from '../../../app/pages/derivation.tsx';
import type { AuthorDerivation, TeacherDerivation } from '../../../shared/schemas/review.ts';
import { fakeApi } from '../../support/fake-api.ts';
import { renderPage } from '../../support/render-page.tsx';
import { derivation, found, LINES, ROUND, TASK, VERDICT } from '../reviews/samples.ts';

function show(answer: AuthorDerivation | TeacherDerivation, more: Parameters<typeof fakeApi>[0] = {}) {
  const calls = fakeApi({ 'GET /api/derivations/d': answer, ...more });
  renderPage(DerivationPage, '/derivations/:derivationId', '/derivations/d');
  return calls;
}

const settled = derivation({
  round: { ...ROUND, stage: 'settled', settledAt: '2031-03-09T11:00:00.000Z' },
  canAnswer: false,
  findings: [
    found({ outcome: 'right', slipNamed: true, termMarked: true }),
    found({ key: 'k2', pick: 3, outcome: 'carried', markedSpan: null }),
  ],
  settled: { verdict: VERDICT, contest: { openUntil: '2031-03-16T11:00:00.000Z', mine: null } },
});

// Dialogs and fields are loaded when first needed; on a busy machine that takes a while.
vi.setConfig({ testTimeout: 20_000 });
afterEach(() => vi.unstubAllGlobals());

describe('answering findings', () => {
  it('shows each finding without a name, and counts what waits', async () => {
    show(derivation());
    expect(await screen.findByRole('heading', { level: 1 })).toHaveTextContent('One finding waits for your answer.');
    expect(screen.getByText('“All is well.”')).toBeInTheDocument();
    expect(screen.getByText('Nearly certain.')).toBeInTheDocument();
    expect(document.body).not.toHaveTextContent(/points|right|carried/);
  });

  it('accepts at once, and asks for a reason to contest', async () => {
    const user = userEvent.setup();
    const calls = show(derivation(), {
      'PUT /api/findings/k1/answer': undefined,
      'PUT /api/findings/k2/answer': undefined,
    });
    const [first, second] = await screen.findAllByRole('article');
    await user.click(within(first!).getByRole('radio', { name: 'I see it: accepted' }));
    expect(calls.find((call) => call.what === 'PUT /api/findings/k1/answer')?.body).toEqual({
      kind: 'accept',
      reason: '',
    });
    await user.click(within(second!).getByRole('radio', { name: 'I contest it' }));
    expect(within(second!).getByRole('button', { name: 'Contest' })).toBeDisabled();
    await user.type(within(second!).getByLabelText('Why you contest it'), 'There is one.');
    await user.click(within(second!).getByRole('button', { name: 'Contest' }));
    expect(calls.find((call) => call.what === 'PUT /api/findings/k2/answer')?.body).toEqual({
      kind: 'contest',
      reason: 'There is one.',
    });
  });

  it('says to wait while reviewers are at work', async () => {
    show(derivation({ round: ROUND, canAnswer: false, findings: [] }));
    expect(await screen.findByRole('heading', { level: 1 })).toHaveTextContent(
      'Your derivation is with its reviewers.',
    );
  });
});

describe('the verdict', () => {
  it('is the heading, with each step in words and evidence to check by hand', async () => {
    show(settled);
    expect(await screen.findByRole('heading', { level: 1 })).toHaveTextContent('The first fault is step 2.');
    const steps = screen.getByRole('list', { name: 'The derivation as it was judged' });
    expect(steps).toHaveTextContent('step 2: first fault');
    expect(steps).toHaveTextContent('step 3: carried');
    expect(steps).toHaveTextContent('mended ending');
    expect(steps).toHaveTextContent(/the line above is/);
  });

  it('shows how each finding fared, and no points', async () => {
    show(settled);
    expect(await screen.findByText('right')).toBeInTheDocument();
    expect(screen.getByText('a carried step, not the first')).toBeInTheDocument();
    expect(screen.getByText(/Named the slip and the very term/)).toBeInTheDocument();
    expect(document.body).not.toHaveTextContent('points');
  });

  it('can be contested at a step', async () => {
    const user = userEvent.setup();
    const calls = show(settled, { 'POST /api/derivations/d/contest': settled });
    await user.click(await screen.findByRole('button', { name: 'Contest this verdict' }));
    expect(await screen.findByLabelText('The step it is about')).toHaveValue('2');
    await user.type(screen.getByLabelText('What is contested, and why'), 'I meant minus.');
    await user.click(screen.getByRole('button', { name: 'Send to the teacher' }));
    expect(calls.find((call) => call.what === 'POST /api/derivations/d/contest')?.body).toEqual({
      step: 2,
      words: 'I meant minus.',
    });
  });

  it('lets the author reply to the teacher', async () => {
    const user = userEvent.setup();
    const contest = { openUntil: null, mine: { words: '', open: true, question: 'What did you mean?', answer: null } };
    const calls = show(
      { ...settled, settled: { verdict: VERDICT, contest } },
      { 'POST /api/derivations/d/question-answer': settled },
    );
    await user.type(await screen.findByLabelText('Your reply'), 'Minus five.');
    await user.click(screen.getByRole('button', { name: 'Reply' }));
    expect(calls.find((call) => call.what.endsWith('question-answer'))?.body).toEqual({ answer: 'Minus five.' });
  });
});

describe('the teacher’s side', () => {
  const teacher: TeacherDerivation = {
    as: 'teacher',
    derivationId: 'd',
    round: ROUND,
    task: TASK,
    lines: LINES,
    author: 'Mira Castellan',
    planted: false,
    verdict: VERDICT,
    findings: [
      {
        findingId: 'f',
        reviewer: 'Dara Oyelaran',
        pick: 2,
        noFault: false,
        markedSpan: null,
        sureness: 5,
        slipKind: 'sign',
        shouldBe: '',
        why: 'A sign.',
        answer: null,
        outcome: 'right',
        points: 75,
      },
    ],
    rulings: [],
  };

  it('shows both names, and overrules with a reason', async () => {
    const user = userEvent.setup();
    const calls = show(teacher, { 'POST /api/derivations/d/ruling': undefined });
    expect(await screen.findByText(/Mira Castellan/)).toBeInTheDocument();
    expect(screen.getByText('Dara Oyelaran')).toBeInTheDocument();
    expect(screen.getByText('+75')).toBeInTheDocument();
    await user.selectOptions(screen.getByLabelText('The first fault is'), 'step 3');
    await user.type(screen.getByLabelText(/^Reason/), 'Terms were lost.');
    await user.click(screen.getByRole('button', { name: 'Rule so' }));
    expect(calls.find((call) => call.what.endsWith('/ruling'))?.body).toEqual({
      firstFault: 3,
      reason: 'Terms were lost.',
    });
  });
});
