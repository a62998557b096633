import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { allocate, type AllocationInput, type Couple, type DealtPair } from '../../shared/lib/allocation.ts';

const names = (prefix: string, count: number) => Array.from({ length: count }, (_, i) => `${prefix}${i}`);
const key = ({ reviewer, author }: DealtPair) => `${reviewer}>${author}`;

function loads(people: readonly string[], of: (pair: DealtPair) => string, pairs: readonly DealtPair[]): number[] {
  return people.map((person) => pairs.filter((pair) => of(pair) === person).length);
}
const spread = (counts: readonly number[]) => (counts.length === 0 ? 0 : Math.max(...counts) - Math.min(...counts));
const mutual = (pairs: readonly DealtPair[]) => {
  const present = new Set(pairs.map(key));
  return pairs.filter(({ reviewer, author }) => present.has(`${author}>${reviewer}`));
};

/** A authors and R reviewers from 2 to 60, of whom `both` are both: the others are away, late, or wrote nothing. */
const people = fc
  .record({
    authors: fc.integer({ min: 2, max: 60 }),
    reviewers: fc.integer({ min: 2, max: 60 }),
    share: fc.double({ min: 0, max: 1, noNaN: true }),
  })
  .map(({ authors, reviewers, share }) => {
    const both = Math.round(share * Math.min(authors, reviewers));
    const shared = names('both', both);
    return {
      authors: [...shared, ...names('author', authors - both)],
      reviewers: [...shared, ...names('reviewer', reviewers - both)],
    };
  });
const each = fc.integer({ min: 1, max: 4 });
const seed = fc.string({ minLength: 1, maxLength: 12 });

const classes: fc.Arbitrary<AllocationInput> = fc
  .tuple(people, each, seed)
  .map(([who, k, s]) => ({ ...who, each: k, seed: s }));

function couplesOf(input: AllocationInput, share: number): fc.Arbitrary<Couple[]> {
  const all = [...new Set([...input.authors, ...input.reviewers])];
  const person = fc.constantFrom(...all);
  return fc.array(fc.tuple(person, person), { maxLength: Math.ceil(share * all.length) });
}

describe('allocate', { timeout: 60_000 }, () => {
  it('never deals one’s own, nor one derivation twice to a reviewer', () => {
    fc.assert(
      fc.property(classes, (input) => {
        const { pairs } = allocate(input);
        expect(pairs.every(({ reviewer, author }) => reviewer !== author)).toBe(true);
        expect(new Set(pairs.map(key)).size).toBe(pairs.length);
        expect(pairs.every((p) => input.reviewers.includes(p.reviewer) && input.authors.includes(p.author))).toBe(true);
      }),
      { numRuns: 60 },
    );
  });

  it('gives every reviewer the same load and every derivation the same number of reviews, give or take one', () => {
    fc.assert(
      fc.property(classes, (input) => {
        const { pairs, each: k } = allocate(input);
        const someoneIsBoth = input.authors.some((author) => input.reviewers.includes(author));
        expect(k).toBe(Math.min(input.each, input.authors.length - (someoneIsBoth ? 1 : 0)));
        expect(new Set(loads(input.reviewers, (p) => p.reviewer, pairs))).toEqual(new Set([k]));
        expect(spread(loads(input.authors, (p) => p.author, pairs))).toBeLessThanOrEqual(1);
      }),
      { numRuns: 60 },
    );
  });

  it('gives every derivation exactly k reviews when all write and all review', () => {
    for (let size = 2; size <= 60; size += 1) {
      const everyone = names('p', size);
      for (const k of [1, 2, 3, 4]) {
        const { pairs, each: cut } = allocate({
          seed: `${size}/${k}`,
          authors: everyone,
          reviewers: everyone,
          each: k,
        });
        expect(cut).toBe(Math.min(k, size - 1));
        expect(new Set(loads(everyone, (p) => p.author, pairs))).toEqual(new Set([cut]));
        expect(size < 2 * k + 1 || mutual(pairs).length === 0).toBe(true);
      }
    }
  });

  it('makes no mutual pairs when every author reviews and there are at least 2k + 1', () => {
    const input = fc
      .record({ k: each, more: fc.integer({ min: 0, max: 40 }), others: fc.integer({ min: 0, max: 20 }), seed })
      .map(({ k, more, others, seed: s }) => {
        const authors = names('p', 2 * k + 1 + more);
        return { seed: s, authors, reviewers: [...authors, ...names('other', others)], each: k };
      });
    fc.assert(
      fc.property(input, (given) => {
        expect(mutual(allocate(given).pairs)).toEqual([]);
      }),
      { numRuns: 60 },
    );
  });

  it('makes no mutual pairs either when authors are away, as long as enough are there', () => {
    fc.assert(
      fc.property(fc.integer({ min: 9, max: 40 }), fc.integer({ min: 1, max: 8 }), seed, (size, away, s) => {
        const authors = names('p', size);
        expect(mutual(allocate({ seed: s, authors, reviewers: authors.slice(away), each: 2 }).pairs)).toEqual([]);
      }),
      { numRuns: 40 },
    );
  });

  it('never pairs a banned couple, in either direction', () => {
    const banned = classes.chain((input) => couplesOf(input, 2).map((couples) => ({ ...input, banned: couples })));
    fc.assert(
      fc.property(banned, (input) => {
        const bans = new Set(input.banned.flatMap(([a, b]) => [`${a}>${b}`, `${b}>${a}`]));
        const { pairs, each: k } = allocate(input);
        expect(pairs.filter((pair) => bans.has(key(pair)))).toEqual([]);
        expect(Math.max(0, ...loads(input.reviewers, (p) => p.reviewer, pairs))).toBeLessThanOrEqual(k);
      }),
      { numRuns: 60 },
    );
  });

  it('stays even and without mutual pairs under a few bans in a class', () => {
    fc.assert(
      fc.property(fc.integer({ min: 12, max: 60 }), fc.integer({ min: 1, max: 3 }), seed, (size, k, s) => {
        const everyone = names('p', size);
        const banned: Couple[] = [
          ['p0', 'p1'],
          ['p0', 'p2'],
          ['p3', 'p4'],
          ['p5', 'p1'],
        ];
        const { pairs } = allocate({ seed: s, authors: everyone, reviewers: everyone, each: k, banned });
        expect(new Set(loads(everyone, (p) => p.author, pairs))).toEqual(new Set([k]));
        expect(new Set(loads(everyone, (p) => p.reviewer, pairs))).toEqual(new Set([k]));
        expect(mutual(pairs)).toEqual([]);
      }),
      { numRuns: 40 },
    );
  });

  it('avoids earlier couples over six rounds of a class of 24 with two reviews each', () => {
    const everyone = names('p', 24);
    const earlier: Couple[] = [];
    const met = new Set<string>();
    let again = 0;
    for (let round = 1; round <= 5; round += 1) {
      const { pairs } = allocate({ seed: `round ${round}`, authors: everyone, reviewers: everyone, each: 2, earlier });
      expect(mutual(pairs)).toEqual([]);
      for (const { reviewer, author } of pairs) {
        const couple = [reviewer, author].sort().join();
        if (met.has(couple)) again += 1;
        met.add(couple);
        earlier.push([reviewer, author]);
      }
    }
    expect(again).toBeLessThanOrEqual(4);
  });

  it('answers the same for the same seed, whatever the order of the people, and differs between seeds', () => {
    const everyone = names('p', 24);
    const one = allocate({ seed: 'a', authors: everyone, reviewers: everyone, each: 2 });
    const turned = allocate({ seed: 'a', authors: [...everyone].reverse(), reviewers: everyone, each: 2 });
    const other = allocate({ seed: 'b', authors: everyone, reviewers: everyone, each: 2 });
    expect(turned).toEqual(one);
    expect(other).not.toEqual(one);
  });

  it('deals nothing where there is nothing to deal', () => {
    expect(allocate({ seed: 'a', authors: [], reviewers: ['x', 'y'], each: 2 })).toEqual({ each: 0, pairs: [] });
    expect(allocate({ seed: 'a', authors: ['x'], reviewers: ['x'], each: 2 })).toEqual({ each: 0, pairs: [] });
  });
});
