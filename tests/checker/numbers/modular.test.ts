import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  cyclotomicPrimes,
  imaginaryMod,
  inverseMod,
  mulMod,
  powMod,
  primes,
  sqrtMod,
} from '../../../api/checker/numbers/modular.ts';

const prime = fc.nat({ max: primes.length - 1 }).map((k) => primes[k] ?? 5);
const residue = fc.nat({ max: 66_000_000 });

describe('residues', () => {
  it('multiply exactly', () => {
    fc.assert(
      fc.property(prime, residue, residue, (p, a, b) => {
        expect(mulMod(a, b, p)).toBe(Number((BigInt(a) * BigInt(b)) % BigInt(p)));
      }),
    );
  });

  it('have inverses, powers and square roots', () => {
    fc.assert(
      fc.property(prime, fc.integer({ min: 1, max: 60_000_000 }), (p, a) => {
        expect(mulMod(a, inverseMod(a, p), p)).toBe(1);
        expect(powMod(a, p - 1, p)).toBe(1);
        const root = sqrtMod(mulMod(a, a, p), p);
        expect(root === a || root === p - a).toBe(true);
      }),
    );
  });

  it('come from primes that have a square root of -1', () => {
    for (const table of [primes, cyclotomicPrimes]) {
      for (const p of [table[0], table[100], table.at(-1)]) {
        if (p === undefined) throw new Error('no prime');
        expect(mulMod(imaginaryMod(p), imaginaryMod(p), p)).toBe(p - 1);
        expect(p).toBeLessThan(2 ** 26);
        for (let q = 2; q * q <= p; q += 1) if (p % q === 0) throw new Error(`${p} is no prime`);
      }
    }
    expect(primes.length).toBeGreaterThan(16_000);
    expect(cyclotomicPrimes.every((p) => p % 720 === 1)).toBe(true);
  });
});
