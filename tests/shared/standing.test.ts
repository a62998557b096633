import { describe, expect, it } from 'vitest';
import {
  classMeanOf,
  hasSpread,
  listUpperThird,
  place,
  shownStanding,
  standingOf,
  type PersonPoints,
} from '../../shared/lib/standing.ts';

/** Nine people with four findings each; person k has mean 10k and a little spread of the own. */
function nine(): PersonPoints[] {
  return Array.from({ length: 9 }, (_, k) => ({
    userId: `p${k + 1}`,
    points: [-3, -1, 1, 3].map((off) => 10 * (k + 1) + off),
  }));
}
const nobody = new Set<string>();

describe('standing', () => {
  it('draws a mean toward the class: (sum + 4 * class mean) / (n + 4)', () => {
    expect(standingOf([80, 60], 20)).toBe((140 + 80) / 6);
    expect(standingOf([], 20)).toBe(20);
    expect(standingOf([39.6, -0.4, -16.4], 10)).toBeCloseTo((22.8 + 40) / 7, 12);
  });

  it('takes the class mean over all findings, not over people', () => {
    expect(
      classMeanOf([
        { userId: 'a', points: [10, 20, 30] },
        { userId: 'b', points: [100] },
      ]),
    ).toBe(40);
    expect(classMeanOf([])).toBe(0);
  });

  it('shows whole points, half away from zero', () => {
    expect(shownStanding(57.5)).toBe(58);
    expect(shownStanding(-2.5)).toBe(-3);
  });
});

describe('the list', () => {
  it('names the upper third only, best first', () => {
    const listing = listUpperThird(nine(), nobody);
    expect(listing.withheld).toBeNull();
    expect(listing.listed.map(({ userId, place: at }) => [userId, at])).toEqual([
      ['p9', 1],
      ['p8', 2],
      ['p7', 3],
    ]);
  });

  it('counts places among those shown and moves nobody up into the third', () => {
    const listing = listUpperThird(nine(), new Set(['p8']));
    expect(listing.listed.map(({ userId, place: at }) => [userId, at])).toEqual([
      ['p9', 1],
      ['p7', 2],
    ]);
  });

  it('leaves out whoever has fewer than four findings', () => {
    const people = [...nine(), { userId: 'new', points: [400, 400, 400] }];
    expect(listUpperThird(people, nobody).listed.map((each) => each.userId)).not.toContain('new');
  });

  it('is withheld below eight reviewers', () => {
    expect(listUpperThird(nine().slice(0, 7), nobody)).toEqual({ withheld: 'too-few', listed: [], reviewers: 7 });
    expect(listUpperThird(nine().slice(0, 8), nobody).listed).toHaveLength(2);
  });

  it('is withheld when people differ no more than chance', () => {
    const people = Array.from({ length: 9 }, (_, k) => ({
      userId: `p${k}`,
      points: [80 + k / 10, -60, 20, -40, 75, -55],
    }));
    expect(listUpperThird(people, nobody).withheld).toBe('no-spread');
    expect(hasSpread(Array.from({ length: 9 }, (_, k) => ({ userId: `p${k}`, points: [7, 7, 7, 7] })))).toBe(false);
  });

  it('shares a place between equal standings', () => {
    expect(place([{ standing: 58.2 }, { standing: 57.9 }, { standing: 41 }]).map((each) => each.place)).toEqual([
      1, 1, 3,
    ]);
  });

  it('leaves out a tie that would cross the third', () => {
    const people = nine().map((person) => (person.userId === 'p6' ? { ...person, points: nine()[6]!.points } : person));
    expect(listUpperThird(people, nobody).listed.map((each) => each.userId)).toEqual(['p9', 'p8']);
  });
});

/**
 * Beta-binomial moments (method of moments, Kleinman 1973, JASA 68:46-54): with equal numbers of right-or-wrong answers
 * the spread is more than chance exactly when v - m(1-m)/n is above 0 (v with divisor R - 1, within by n - 1 per person).
 */
describe('spread against right-or-wrong answers', () => {
  it.each([
    [[9, 7, 5, 10, 6], 10, true],
    [[18, 12, 15, 8], 20, true],
    [[4, 8, 2, 7, 6, 3], 8, true],
    [[5, 5, 6, 5, 4], 10, false],
  ])('%j right of %i', (right, of, spread) => {
    const people = right.map((hits, k) => ({
      userId: `p${k}`,
      points: Array.from({ length: of }, (_, i) => (i < hits ? 1 : 0)),
    }));
    expect(hasSpread(people)).toBe(spread);
  });
});
