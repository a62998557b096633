import { screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { Component as StandingsPage } from '../../../app/pages/standings.tsx';
import type { OwnStanding, StandingsAnswer } from '../../../shared/schemas/standings.ts';
import { fakeApi } from '../../support/fake-api.ts';
import { renderPage } from '../../support/render-page.tsx';

const own: OwnStanding = {
  alias: 'Quillwort',
  optedOut: false,
  standing: 27,
  change: 4,
  rounds: [
    { number: 1, mean: 12, classMean: 20 },
    { number: 2, mean: -18, classMean: 24 },
    { number: 3, mean: 31, classMean: null },
  ],
  sureness: [{ sure: 'half', right: 4, of: 7, expected: 0.6 }],
};
const answer: StandingsAnswer = {
  classId: 'c',
  className: '10C',
  withheld: null,
  madeAt: '2031-03-03T09:00:00.000Z',
  timeZone: 'Europe/Vienna',
  own,
  listed: [
    { place: 1, alias: 'Lapwing', standing: 58 },
    { place: 2, alias: 'Feldspar', standing: 55 },
  ],
};
const viewer = {
  user: { id: 'u', name: 'Mira Castellan', role: 'student', email: null, userName: null },
  school: { id: 's', name: 'Brackenfell School' },
  classes: [{ id: 'c', name: '10C', timeZone: 'Europe/Vienna', role: 'student', alias: 'Quillwort' }],
};

function show(standings: StandingsAnswer, more: Parameters<typeof fakeApi>[0] = {}) {
  const calls = fakeApi({ 'GET /api/me': viewer, 'GET /api/classes/c/standings': standings, ...more });
  renderPage(StandingsPage, '/standings');
  return calls;
}

// Dialogs and fields are loaded when first needed; on a busy machine that takes a while.
vi.setConfig({ testTimeout: 20_000 });
afterEach(() => vi.unstubAllGlobals());

describe('standings', () => {
  it('puts the own line first, then the upper third by alias, the own row without a place', async () => {
    show(answer);
    expect(
      await screen.findByRole('heading', { level: 1, name: 'Your eye is sharper than in round 1.' }),
    ).toBeInTheDocument();
    expect(
      screen.getByRole('img', { name: /round 1: 12, round 2: -18, round 3: 31. The class: 20, 24/ }),
    ).toBeInTheDocument();
    const rows = within(screen.getByRole('table')).getAllByRole('row').slice(1);
    expect(rows.map((row) => row.textContent)).toEqual(['1Lapwing58', '2Feldspar55']);
    expect(screen.getByText('You, as Quillwort: 27.')).toBeInTheDocument();
    expect(screen.getByText(/4 points more than a week ago/)).toBeInTheDocument();
    expect(screen.getByText('right 4 of 7')).toBeInTheDocument();
  });

  it.each([
    ['too-few', /fewer than eight people/],
    ['no-spread', /no more than chance/],
    ['off', /switched off/],
    ['not-yet', /with the new week/],
  ] as const)('says why there is no list: %s', async (withheld, words) => {
    show({ ...answer, withheld, listed: [] });
    expect(await screen.findByText(words)).toBeInTheDocument();
    expect(screen.queryByRole('table')).not.toBeInTheDocument();
  });

  it('lets a student opt out and loses nothing by it', async () => {
    const user = userEvent.setup();
    const calls = show(answer, {
      'PUT /api/classes/c/standings/opt-out': { ...answer, own: { ...own, optedOut: true } },
    });
    await user.click(await screen.findByRole('button', { name: 'Don’t show me' }));
    expect(await screen.findByRole('button', { name: 'Show me again' })).toBeInTheDocument();
    expect(screen.getByText(/lose nothing by it/)).toBeInTheDocument();
    expect(calls.at(-1)?.body).toEqual({ optOut: true });
  });

  it('welcomes someone without findings', async () => {
    show({ ...answer, own: { ...own, standing: null, change: null, rounds: [], sureness: [] } });
    expect(
      await screen.findByRole('heading', { level: 1, name: 'Your first findings are still to come.' }),
    ).toBeInTheDocument();
  });
});
