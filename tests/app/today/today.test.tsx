import { screen, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Component as TodayPage } from '../../../app/pages/today.tsx';
import type { TodayAnswer } from '../../../shared/schemas/today.ts';
import { fakeApi, FakeProblem } from '../../support/fake-api.ts';
import { renderPage } from '../../support/render-page.tsx';

const NOW = '2031-03-03T16:50:00.000Z';
const base = { title: 'Surface of a cylinder', className: '10C', timeZone: 'Europe/Vienna', number: 6 };
const empty: TodayAnswer = { now: NOW, things: [], waiting: [], progress: null, rounds: [], joinRequests: [] };

function viewer(role: 'student' | 'teacher') {
  const user = { id: 'u', name: 'Mira Castellan', role, email: null, userName: null };
  return { user, school: { id: 's', name: 'Brackenfell School' }, classes: [] };
}

function show(today: unknown, role: 'student' | 'teacher' = 'student') {
  fakeApi({ 'GET /api/today': today as object, 'GET /api/me': viewer(role) });
  renderPage(TodayPage, '/');
}

beforeEach(() => {
  vi.useFakeTimers({ now: new Date(NOW), toFake: ['Date'] });
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

describe('a student’s first page', () => {
  it('counts what is due and gives the first thing the only button', async () => {
    show({
      ...empty,
      things: [
        {
          kind: 'write',
          ...base,
          roundId: 'r6',
          dueAt: '2031-03-03T20:00:00.000Z',
          begun: true,
          last: { number: 4, tex: 'h=1', decimal: 'point' },
          unread: [3],
          twoWays: [2],
        },
        {
          kind: 'review',
          ...base,
          roundId: 'r5',
          number: 5,
          dueAt: '2031-03-06T11:00:00.000Z',
          reviews: [
            { reviewId: 'a', steps: 5, state: 'handed-in' },
            { reviewId: 'b', steps: 4, state: 'not-begun' },
          ],
        },
        {
          kind: 'answer',
          ...base,
          roundId: 'r4',
          number: 4,
          dueAt: '2031-03-07T11:00:00.000Z',
          derivationId: 'd4',
          count: 1,
          first: { step: 3, why: 'The minus belongs to the whole bracket.' },
        },
      ],
    });
    expect(await screen.findByRole('heading', { level: 1, name: 'Three things to do, Mira.' })).toBeInTheDocument();
    const go = screen.getByRole('link', { name: 'Go on writing' });
    expect(go).toHaveAttribute('href', '/rounds/r6/write');
    expect(document.querySelectorAll('.btn')).toHaveLength(1);
    expect(screen.getByText(/You stopped in line 4/)).toHaveTextContent(
      'Line 2 can be read in two ways, line 3 cannot be read yet.',
    );
    const review = screen.getByRole('heading', { name: 'Review one derivation' }).closest('article') as HTMLElement;
    expect(within(review).getByText('Second: 4 steps, not begun')).toBeInTheDocument();
    expect(within(review).getByRole('link', { name: 'Begin' })).toHaveAttribute('href', '/reviews/b');
    expect(screen.getByText(/A reviewer marks your step 3/)).toBeInTheDocument();
    expect(screen.getByText('21:00')).toHaveAttribute('datetime', '2031-03-03T20:00:00.000Z');
  });

  it('says what a settled round came to, and until when it can be contested', async () => {
    show({
      ...empty,
      things: [
        {
          kind: 'look',
          ...base,
          roundId: 'r3',
          settledAt: '2031-03-02T17:00:00.000Z',
          contestUntil: '2031-03-09T17:00:00.000Z',
          own: { derivationId: 'd3', steps: 5, outcome: 'faulty', firstFault: 2, mend: 'none' },
          reviews: [{ reviewId: 'a', outcome: 'carried' }],
        },
      ],
    });
    expect(await screen.findByText('Yours: first fault at step 2, not mended yet')).toBeInTheDocument();
    expect(screen.getByText('First review: a carried step, not the first fault')).toBeInTheDocument();
    expect(screen.getByText(/You can contest until/)).toHaveTextContent('until Sunday.');
    expect(screen.getByRole('link', { name: 'See why' })).toHaveAttribute('href', '/derivations/d3');
  });

  it('shows one’s own progress in the margin', async () => {
    const round = (number: number, right: number) => ({ number, right, total: 2 });
    const rounds = [round(1, 0), round(2, 1), round(3, 1), round(4, 2), round(5, 2), round(6, 1)];
    show({ ...empty, progress: { rounds, nearlyCertain: { right: 5, total: 6 } } });
    const eye = await screen.findByRole('complementary', { name: 'Your eye, so far' });
    expect(eye).toHaveTextContent('7 of 10');
    expect(eye).toHaveTextContent('in the last five rounds. In the round before: 0 of 2.');
    expect(eye).toHaveTextContent('you were right 5 of 6 times');
    expect(eye).toHaveTextContent('Only you and your teacher see this.');
  });

  it('says what comes next where nothing is due', async () => {
    const waiting = { ...base, roundId: 'r', stage: 'writing', nextAt: '2031-03-03T20:00:00.000Z', handedIn: true };
    show({ ...empty, waiting: [waiting] });
    expect(await screen.findByRole('heading', { level: 1, name: 'Nothing to do, Mira.' })).toBeInTheDocument();
    expect(screen.getByText('Handed in. Reviewing opens today at 21:00.')).toBeInTheDocument();
  });

  it('does not promise an end that has passed, while rulings are open', async () => {
    const waiting = { ...base, roundId: 'r', stage: 'answering', nextAt: '2031-03-01T17:00:00.000Z', handedIn: true };
    show({ ...empty, waiting: [waiting] });
    expect(await screen.findByText(/settles when your teacher has ruled on what is open/)).toBeInTheDocument();
  });

  it('explains itself before the first round', async () => {
    show(empty);
    expect(await screen.findByText('No round is running for you')).toBeInTheDocument();
  });

  it('says what failed and offers to try again', async () => {
    show(new FakeProblem({ type: 'unexpected', title: 'Something went wrong on our side', status: 500 }));
    expect(await screen.findByRole('alert')).toHaveTextContent('Something went wrong on our side');
    expect(screen.getByRole('button', { name: 'Try again' })).toBeInTheDocument();
  });
});

describe('a teacher’s first page', () => {
  it('lists rounds by what happens next, with the people who ask to join', async () => {
    const instants = {
      opensAt: '2031-03-01T09:00:00.000Z',
      writingEndsAt: '2031-03-03T20:00:00.000Z',
      reviewingEndsAt: '2031-03-05T20:00:00.000Z',
      answeringEndsAt: '2031-03-06T20:00:00.000Z',
      settlesAt: '2031-03-07T17:00:00.000Z',
    };
    const round = { id: 'r', classId: 'c', ...base, stage: 'writing', instants, people: 27, handedIn: 9 };
    const counts = { reviewsDealt: 0, reviewsDone: 0, disputesOpen: 2, waitingForRulings: false };
    const joinRequests = [{ classId: 'c', className: '10C', count: 2 }];
    show({ ...empty, rounds: [{ ...round, ...counts }], joinRequests }, 'teacher');
    expect(await screen.findByRole('heading', { level: 1, name: 'One round is running.' })).toBeInTheDocument();
    expect(screen.getByText('9 of 27 handed in.')).toBeInTheDocument();
    expect(screen.getByText('2 disputes to rule on.')).toBeInTheDocument();
    expect(screen.getByRole('link', { name: 'Plan a round' })).toHaveAttribute('href', '/rounds/new');
    expect(screen.getByRole('link', { name: 'Let them in' })).toHaveAttribute('href', '/classes/c');
  });
});
