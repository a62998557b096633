import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { allocate, type Couple } from '../../shared/lib/allocation.ts';
import { allocateLater, type LaterInput } from '../../shared/lib/later-allocation.ts';

/** A class that was dealt k reviews each, and late people who hand in afterwards and have no reviews yet. */
const lateCase = fc
  .record({
    size: fc.integer({ min: 5, max: 30 }),
    late: fc.integer({ min: 1, max: 6 }),
    k: fc.integer({ min: 1, max: 3 }),
    seed: fc.string({ minLength: 1, maxLength: 8 }),
  })
  .map(({ size, late, k, seed }) => {
    const onTime = Array.from({ length: size }, (_, i) => `p${i}`);
    const lateOnes = Array.from({ length: late }, (_, i) => `late${i}`);
    const banned: Couple[] = [['late0', 'p0']];
    const { pairs, each } = allocate({ seed, authors: onTime, reviewers: onTime, each: k });
    const count = (name: string) => pairs.filter(({ author }) => author === name).length;
    const input: LaterInput = {
      seed,
      banned,
      dealt: pairs,
      derivations: [
        ...onTime.map((author) => ({ author, reviews: count(author), wants: 0 })),
        ...lateOnes.map((author) => ({ author, reviews: 0, wants: each })),
      ],
      reviewers: [
        ...onTime.map((person) => ({ person, load: each, wants: 0, room: each })),
        ...lateOnes.map((person) => ({ person, load: 0, wants: each, room: each })),
      ],
    };
    return { input, onTime, lateOnes, each };
  });

describe('allocateLater', { timeout: 60_000 }, () => {
  it('gives each late derivation its reviews and each late author their share, leaving what was dealt alone', () => {
    fc.assert(
      fc.property(lateCase, ({ input, lateOnes, each }) => {
        const added = allocateLater(input);
        for (const person of lateOnes) {
          expect(added.filter(({ author }) => author === person).length).toBeGreaterThanOrEqual(each);
          expect(added.filter(({ reviewer }) => reviewer === person)).toHaveLength(each);
        }
        const before = new Set(input.dealt.map(({ reviewer, author }) => `${reviewer}>${author}`));
        expect(added.some(({ reviewer, author }) => before.has(`${reviewer}>${author}`))).toBe(false);
      }),
      { numRuns: 60 },
    );
  });

  it('never deals one’s own, a banned couple, or one derivation twice', () => {
    fc.assert(
      fc.property(lateCase, ({ input }) => {
        const added = allocateLater(input);
        const keys = added.map(({ reviewer, author }) => `${reviewer}>${author}`);
        expect(new Set(keys).size).toBe(keys.length);
        expect(added.some(({ reviewer, author }) => reviewer === author)).toBe(false);
        expect(keys).not.toContain('late0>p0');
        expect(keys).not.toContain('p0>late0');
      }),
      { numRuns: 60 },
    );
  });

  it('burdens those on time no more than the late work needs, and evenly', () => {
    fc.assert(
      fc.property(lateCase, ({ input, onTime }) => {
        const added = allocateLater(input);
        const loads = onTime.map((person) => added.filter(({ reviewer }) => reviewer === person).length);
        expect(Math.max(...loads) - Math.min(...loads)).toBeLessThanOrEqual(1);
      }),
      { numRuns: 40 },
    );
  });

  it('answers the same for the same seed', () => {
    fc.assert(
      fc.property(lateCase, ({ input }) => {
        expect(allocateLater(input)).toEqual(allocateLater(input));
      }),
      { numRuns: 10 },
    );
  });
});
