import { performance } from 'node:perf_hooks';
import type { Expr } from '../../../shared/maths/expression.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import { createContext } from '../context.ts';
import { letter, power, product, sum, whole } from '../evidence/build.ts';
import { checkDerivation } from '../rule-derivation.ts';

export interface Growth {
  readonly what: string;
  readonly size: number;
  readonly outcome: string;
  readonly ms: number;
}

const runs = 7;
const sizes = [10, 100, 1000, 10_000];

/** How the cost of a ruling, reading included, grows with the size of what is ruled on: the least of some runs. */
export function measureGrowth(): Growth[] {
  return [
    ...[10, 100, 700].map((terms) => measured('terms written in a line, reordered', terms, sumOf(terms))),
    ...sizes.map((terms) => measuredTrees('terms in three letters, no line read', terms, termsOf(terms, manyLetters))),
    ...sizes.map((terms) =>
      measuredTrees('terms of a polynomial of as high a degree', terms, termsOf(terms, oneLetter)),
    ),
    // 10 to 9880 terms, were it multiplied out: a line has no room for more than 2000 that are written.
    ...[2, 6, 17, 37].map((n) => measured('terms of (x+y+z+1)^n multiplied out', binomial(n + 3), powerOf(n))),
    ...[2, 10, 100, 1000, 10_000].map((n) =>
      measured('degree: (x+1)^n and x^n(1+1/x)^n', n, [`(x+1)^{${n}}`, `x^{${n}}(1+\\frac1x)^{${n}}`]),
    ),
    ...[2, 20, 200].map((lines) => measured('lines of a derivation', lines, equationOf(lines))),
    measured('(x+y+z+1)^40 and its reordering', 40, powerOf(40)),
    measured('(x+1)^10000 and (1+2x+x^2)^5000', 10_000, ['(x+1)^{10000}', '(1+2x+x^2)^{5000}']),
    measured('nodes of a line', 2996, nodesOf(2995)),
  ];
}

function measured(what: string, size: number, lines: readonly string[]): Growth {
  let ms = Infinity;
  let outcome = '';
  for (let run = 0; run < runs; run += 1) {
    const began = performance.now();
    outcome = checkDerivation({ lines, assume: [], settings: {} }).outcome;
    ms = Math.min(ms, performance.now() - began);
  }
  return { what, size, outcome, ms };
}

/** The comparison alone, of trees that no line has room for: a line is read up to 4000 characters or 3000 nodes. */
function measuredTrees(what: string, size: number, terms: readonly Expr[]): Growth {
  const [above, below] = [sum(...terms), sum(...[...terms].reverse())];
  let ms = Infinity;
  let outcome = '';
  for (let run = 0; run < runs; run += 1) {
    const began = performance.now();
    outcome = compareExpressions(above, below, createContext()).kind;
    ms = Math.min(ms, performance.now() - began);
  }
  return { what, size, outcome, ms };
}

type TermOf = (k: number) => Expr;

function termsOf(count: number, termOf: TermOf): Expr[] {
  return Array.from({ length: count }, (_, k) => product(whole((k % 9) + 2), termOf(k)));
}

const manyLetters: TermOf = (k) => power(letter(['x', 'y', 'z'][k % 3] ?? 'x'), whole((k % 7) + 2));
const oneLetter: TermOf = (k) => power(letter('x'), whole(k + 2));

function sumOf(terms: number): string[] {
  const parts = Array.from({ length: terms }, (_, k) => `${(k % 7) + 1}${'xyz'[k % 3]}`);
  return [parts.join('+'), [...parts].reverse().join('+')];
}

function powerOf(n: number): string[] {
  return [`(x+y+z+1)^{${n}}`, `(1+z+y+x)^{${n}}`];
}

/** Choices of three from n. */
function binomial(n: number): number {
  return (n * (n - 1) * (n - 2)) / 6;
}

function equationOf(lines: number): string[] {
  return Array.from({ length: lines + 1 }, (_, k) => `${k + 2}x-${k}=${5 * (k + 2) - k}`);
}

/** A number, a letter, an exponent, their power and product for each term. */
function nodesOf(nodes: number): string[] {
  const parts = Array.from({ length: nodes / 5 }, (_, k) => `${(k % 9) + 1}${'xyt'[k % 3]}^${(k % 4) + 2}`);
  return [parts.join('+'), [...parts].reverse().join('+')];
}
