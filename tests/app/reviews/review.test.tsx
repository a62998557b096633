import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Component as ReviewPage } from '../../../app/pages/review.tsx';
import type { FindingDraft } from '../../../shared/schemas/finding.ts';
import type { ReviewAnswer } from '../../../shared/schemas/review.ts';
import { fakeApi, FakeProblem } from '../../support/fake-api.ts';
import { renderPage } from '../../support/render-page.tsx';
import { result, review } from './samples.ts';

const AT = 'GET /api/reviews/v';

function show(answer: ReviewAnswer | FakeProblem, more: Parameters<typeof fakeApi>[0] = {}) {
  let version = 0;
  const calls = fakeApi({
    [AT]: answer,
    'PUT /api/reviews/v/draft': () => ({ version: (version += 1), names: [] }),
    ...more,
  });
  renderPage(ReviewPage, '/reviews/:reviewId', '/reviews/v');
  return calls;
}

beforeEach(() => localStorage.clear());
// Dialogs and fields are loaded when first needed; on a busy machine that takes a while.
vi.setConfig({ testTimeout: 20_000 });
afterEach(() => vi.unstubAllGlobals());

describe('reviewing', () => {
  it('walks by the arrow keys, closes the bracket by Enter, and chooses the term sideways', async () => {
    const user = userEvent.setup();
    const calls = show(review());
    (await screen.findByRole('radio', { name: 'step 1, from the given line to line 1' })).focus();
    await user.keyboard('{ArrowDown}');
    const second = screen.getByRole('radio', { name: 'step 2, from line 1 to line 2' });
    expect(second).toHaveFocus();
    expect(second).not.toBeChecked();
    await user.keyboard('{Enter}');
    expect(second).toBeChecked();
    expect(screen.getByText(/Step 2, from line 1 to line 2/)).toBeInTheDocument();
    await user.keyboard('{ArrowRight}{ArrowRight}{ArrowRight}{ArrowRight}');
    await waitFor(() => expect(calls.at(-1)?.what).toBe('PUT /api/reviews/v/draft'), { timeout: 3_000 });
    expect(calls.at(-1)?.body).toMatchObject({ draft: { pick: 2, markedSpan: { start: 8, end: 10 } } });
  });

  it('asks for kind, line, why and sureness in that order, the kinds always the same ten', async () => {
    const user = userEvent.setup();
    show(review());
    await user.click(await screen.findByRole('radio', { name: /step 2,/ }));
    const kinds = screen.getByRole('radiogroup', { name: 'Kind of slip' });
    expect(within(kinds).getAllByRole('radio')).toHaveLength(10);
    await user.click(within(kinds).getByRole('radio', { name: 'Wrong sign' }));
    expect(within(kinds).getByText(/such as/)).toBeInTheDocument();
    expect(screen.getByText('What line 2 should have been')).toBeInTheDocument();
    expect(screen.getByLabelText('Why')).toBeInTheDocument();
    expect(screen.getByRole('slider', { name: /How sure are you/ })).toBeInTheDocument();
  });

  it('shows what could be earned and what it could cost, by the number of steps', async () => {
    show(review({ draft: { pick: 2, markedSpan: null, slipKind: null, shouldBe: '', why: '', sureness: 5 } }));
    // n = 3, s = 0.5: 75, -25, -58.3 (finding_points of the outside table).
    expect(await screen.findByText('+75')).toBeInTheDocument();
    expect(screen.getByText('−25')).toBeInTheDocument();
    expect(screen.getByText('−58')).toBeInTheDocument();
  });

  it('hands in after saving, and says so', async () => {
    const user = userEvent.setup();
    const draft: FindingDraft = {
      pick: 'none',
      markedSpan: null,
      slipKind: null,
      shouldBe: '',
      why: 'All follows.',
      sureness: 3,
    };
    const calls = show(review({ draft }), {
      'POST /api/reviews/v/finding': (body) =>
        review({ draft: body as FindingDraft, draftVersion: 1, finding: body as FindingDraft }),
    });
    await user.click(await screen.findByRole('button', { name: 'Hand in finding' }));
    expect(await screen.findByText('Handed in.')).toBeInTheDocument();
    expect(calls.at(-1)).toEqual({ what: 'POST /api/reviews/v/finding', body: draft });
    expect(screen.getByRole('button', { name: 'Take it back' })).toBeInTheDocument();
  });

  it('warns of a classmate’s name', async () => {
    const user = userEvent.setup();
    show(review(), { 'PUT /api/reviews/v/draft': { version: 1, names: ['Ottilie'] } });
    await user.type(await screen.findByLabelText('Why'), 'Ottilie');
    expect(await screen.findByRole('alert')).toHaveTextContent('“Ottilie” is a name in your class.');
  });

  it('keeps both when another window changed the review', async () => {
    const user = userEvent.setup();
    const theirs: FindingDraft = {
      pick: 3,
      markedSpan: null,
      slipKind: null,
      shouldBe: '',
      why: 'Other words.',
      sureness: 1,
    };
    show(review(), {
      'PUT /api/reviews/v/draft': new FakeProblem({
        type: 'conflict',
        title: 'This has changed',
        status: 409,
        extra: { draft: theirs, version: 4 },
      }),
    });
    await user.type(await screen.findByLabelText('Why'), 'Mine.');
    await user.click(await screen.findByRole('button', { name: 'Take the other' }, { timeout: 4_000 }));
    expect(screen.getByLabelText('Why')).toHaveValue('Other words.');
    expect(screen.getByRole('radio', { name: /step 3,/ })).toBeChecked();
  });

  it('takes up what a closed page left behind', async () => {
    const left: FindingDraft = {
      pick: 1,
      markedSpan: null,
      slipKind: null,
      shouldBe: '',
      why: 'Typed offline.',
      sureness: 2,
    };
    localStorage.setItem('slipstone.review.v', JSON.stringify({ draft: left, version: 0 }));
    show(review());
    expect(await screen.findByLabelText('Why')).toHaveValue('Typed offline.');
    await waitFor(() => expect(localStorage.getItem('slipstone.review.v')).toBeNull(), { timeout: 3_000 });
  });

  it('asks before it is set aside', async () => {
    const user = userEvent.setup();
    const calls = show(review(), {
      'POST /api/reviews/v/set-aside': review({ setAside: 'know-the-author', canEdit: false }),
    });
    await user.click(await screen.findByRole('button', { name: 'I know whose this is' }));
    await user.click(await screen.findByRole('button', { name: 'Set it aside' }));
    expect(await screen.findByText(/You know whose this is/)).toBeInTheDocument();
    expect(calls.at(-1)?.body).toEqual({ reason: 'know-the-author' });
  });
});

describe('after reviewing', () => {
  it('shows what was handed in, and nothing of a verdict', async () => {
    const finding: FindingDraft = {
      pick: 3,
      markedSpan: null,
      slipKind: 'sign',
      shouldBe: '',
      why: 'A sign.',
      sureness: 4,
    };
    show(review({ canEdit: false, finding }));
    expect(await screen.findByText('Your finding')).toBeInTheDocument();
    expect(screen.getByText('“A sign.”')).toBeInTheDocument();
    expect(document.body).not.toHaveTextContent(/first fault|holds|carried/);
  });

  it('tells the reviewer, once settled, what was marked and what is so', async () => {
    const finding: FindingDraft = { pick: 3, markedSpan: null, slipKind: null, shouldBe: '', why: '', sureness: 4 };
    show(review({ canEdit: false, finding, result: result() }));
    expect(await screen.findByRole('heading', { level: 1 })).toHaveTextContent(
      'You marked a carried step; the first fault is step 2.',
    );
    expect(screen.getByText('−20')).toBeInTheDocument();
    expect(screen.getByText('your pick')).toBeInTheDocument();
    expect(screen.getByText(/The checker advises, your teacher decides/)).toBeInTheDocument();
  });

  it('sends a contest of the points with its words', async () => {
    const user = userEvent.setup();
    const contested = result({
      contest: { openUntil: null, mine: { words: 'Look again.', open: true, question: null, answer: null } },
    });
    const calls = show(review({ canEdit: false, result: result() }), {
      'POST /api/reviews/v/contest': review({ canEdit: false, result: contested }),
    });
    await user.click(await screen.findByRole('button', { name: 'Contest these points' }));
    await user.type(await screen.findByLabelText('What is contested, and why'), 'Look again.');
    await user.click(screen.getByRole('button', { name: 'Send to the teacher' }));
    expect(await screen.findByText('You contested these points.')).toBeInTheDocument();
    expect(calls.at(-1)?.body).toEqual({ words: 'Look again.' });
  });

  it('says what failed and offers to try again', async () => {
    show(new FakeProblem({ type: 'conflict', title: 'This has changed in the meantime', status: 409 }));
    expect(await screen.findByRole('alert')).toHaveTextContent('This has changed in the meantime');
    expect(screen.getByRole('button', { name: 'Try again' })).toBeInTheDocument();
  });

  it('is a page that is not found where the review is not one’s own', async () => {
    show(new FakeProblem({ type: 'not-found', title: 'There is nothing here', status: 404 }));
    expect(await screen.findByRole('heading', { name: 'There is nothing at this address.' })).toBeInTheDocument();
  });
});
