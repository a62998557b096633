import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { toDoubleFunction } from '../solving/double-evaluator.ts';
import { toFraction } from '../solving/fraction.ts';
import { squareFreePart } from '../solving/polynomial.ts';
import { approximate, between, rationalNumber, realRoots } from '../solving/real-number.ts';
import type { RealNumber } from '../solving/real-number.ts';
import { fromRational } from '../values/arithmetic.ts';
import type { GraphNode } from '../values/graph.ts';
import type { KnownValue, Point } from '../values/value.ts';
import type { Pair } from './pair.ts';
import type { Region } from './points.ts';

/** Where one letter makes a node, or a node plus or minus 1, vanish. */
interface Break {
  readonly node: number;
  readonly shift: -1 | 0 | 1;
}

const mostBreaks = 24;
const mostRoots = 14;

/** What may change sign where an expression changes its form or loses its value. */
function breaksOf(pair: Pair): Break[] {
  const found: Break[] = [];
  pair.nodes.forEach((node, index) => {
    if (pair.needed[index] !== 1 || found.length >= mostBreaks) return;
    found.push(...breaksOfNode(node));
  });
  return found.filter(({ node }) => pair.moving[node] === 1);
}

function breaksOfNode(node: GraphNode): Break[] {
  const [a, b] = node.args as readonly number[];
  const at = (index: number | undefined, ...shifts: Break['shift'][]): Break[] =>
    index === undefined ? [] : shifts.map((shift) => ({ node: index, shift }));
  switch (node.op) {
    case 'div':
      return at(b, 0);
    case 'power':
      return node.exponent <= 0 ? at(a, 0) : [];
    case 'root':
    case 'pow':
      return at(a, 0);
    case 'call':
      return node.name === 'log' ? [...at(a, 0, -1), ...at(b, 0)] : breaksOfCall(node.name, at, node.args);
    default:
      return [];
  }
}

function breaksOfCall(
  name: string,
  at: (index: number | undefined, ...shifts: Break['shift'][]) => Break[],
  args: readonly number[],
): Break[] {
  const [a] = args;
  switch (name) {
    case 'ln':
    case 'abs':
    case 'sign':
    case 'arccot':
      return at(a, 0);
    case 'arcsin':
    case 'arccos':
    case 'arctan':
    case 'arcsec':
    case 'arccsc':
      return at(a, -1, 0, 1);
    case 'min':
    case 'max':
      return args.flatMap((arg) => at(arg, 0));
    default:
      return [];
  }
}

/** The real numbers at which one letter, the others given, makes a part vanish; smallest first. */
function rootsAlong(
  pair: Pair,
  breaks: readonly Break[],
  letter: string,
  given: ReadonlyMap<string, Rational>,
): RealNumber[] {
  const roots: RealNumber[] = [];
  for (const { node, shift } of breaks) {
    if (roots.length > mostRoots) break;
    const fraction = toFraction({ nodes: pair.nodes, root: node }, letter, given);
    if (fraction === null) {
      roots.push(...scannedRoots(pair, node, shift, letter, given));
      continue;
    }
    const shifted = addScaled(fraction.num, fraction.den, BigInt(shift));
    if (shifted.length > 1 && shifted.length < 40) roots.push(...realRoots(squareFreePart(shifted)));
  }
  roots.push(...differencesOfExtremes(pair, letter, given));
  return sorted(roots);
}

function addScaled(a: readonly bigint[], b: readonly bigint[], factor: bigint): bigint[] {
  const sum = Array.from({ length: Math.max(a.length, b.length) }, (_, k) => (a[k] ?? 0n) + factor * (b[k] ?? 0n));
  while (sum.length > 0 && sum.at(-1) === 0n) sum.pop();
  return sum;
}

/** Where two arguments of a minimum or maximum are equal. */
function differencesOfExtremes(pair: Pair, letter: string, given: ReadonlyMap<string, Rational>): RealNumber[] {
  return pair.nodes.flatMap((node, index) => {
    if (pair.needed[index] !== 1 || node.op !== 'call' || (node.name !== 'min' && node.name !== 'max')) return [];
    const [a, b] = node.args.map((arg) => toFraction({ nodes: pair.nodes, root: arg }, letter, given));
    if (!a || !b) return [];
    const difference = addScaled(multiply(a.num, b.den), multiply(b.num, a.den), -1n);
    return difference.length > 1 && difference.length < 40 ? realRoots(squareFreePart(difference)) : [];
  });
}

function multiply(a: readonly bigint[], b: readonly bigint[]): bigint[] {
  const product = Array.from({ length: Math.max(0, a.length + b.length - 1) }, () => 0n);
  a.forEach((x, i) => b.forEach((y, j) => (product[i + j] = (product[i + j] ?? 0n) + x * y)));
  return product;
}

const grid = [
  0, 0.01, 0.1, 0.3, 0.6, 1, 1.5, 2, 2.5, 3, 4, 5, 7, 10, 15, 20, 30, 50, 100, 300, 1_000, 3_000, 10_000, 30_000,
  100_000, 1_000_000,
];

/** Sign changes of a part that is no quotient of polynomials, by doubles: places to look at, nothing more. */
function scannedRoots(
  pair: Pair,
  node: number,
  shift: number,
  letter: string,
  given: ReadonlyMap<string, Rational>,
): RealNumber[] {
  const numbers = new Map([...given].map(([name, value]) => [name, Q.toNumber(value)]));
  const f = toDoubleFunction({ nodes: pair.nodes, root: node }, letter, numbers);
  const at = (x: number): number => f(x) + shift;
  const points = [
    ...grid
      .slice(1)
      .map((x) => -x)
      .reverse(),
    ...grid,
  ];
  const roots: RealNumber[] = [];
  for (let k = 1; k < points.length && roots.length < 6; k += 1) {
    const root = bisect(at, points[k - 1] ?? 0, points[k] ?? 0);
    if (root !== null) roots.push(rationalNumber(fromDouble(root)));
  }
  return roots;
}

function bisect(f: (x: number) => number, from: number, to: number): number | null {
  let [low, high] = [from, to];
  const sign = Math.sign(f(low));
  if (sign === 0) return low;
  if (!(sign * f(high) < 0)) return null;
  for (let k = 0; k < 40; k += 1) {
    const middle = (low + high) / 2;
    if (sign * f(middle) > 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

function fromDouble(x: number): Rational {
  return Q.rational(Math.round(x * 2 ** 20), 2 ** 20);
}

function sorted(roots: readonly RealNumber[]): RealNumber[] {
  const byValue = roots.map((root) => ({ root, value: approximate(root) })).sort((a, b) => a.value - b.value);
  return byValue
    .filter(({ value }, k) => k === 0 || value - (byValue[k - 1]?.value ?? 0) > 1e-9 * (1 + Math.abs(value)))
    .map(({ root }) => root);
}

export interface Broken {
  /** One value of the letter in every gap between the breaks and beyond them. */
  readonly gaps: readonly Rational[];
  /** Breaks that are fractions. */
  readonly exact: readonly Rational[];
}

export function breakUp(pair: Pair, letter: string, given: ReadonlyMap<string, Rational>): Broken {
  const roots = rootsAlong(pair, breaksOf(pair), letter, given);
  if (roots.length === 0) return { gaps: [], exact: [] };
  const gaps = roots.map((root, k) => between(roots[k - 1] ?? null, root));
  gaps.push(between(roots.at(-1) ?? null, null));
  return { gaps, exact: roots.flatMap((root) => (root.kind === 'rational' ? [root.value] : [])) };
}

const bases: readonly (readonly number[])[] = [
  [2, 3, 5, 7],
  [-3, 1, -2, 4],
];

/** Points on both sides of every break and on it, for each letter in turn. */
export function* breakPointsOf(pair: Pair, region: Region): Generator<Point> {
  const moving = pair.names.filter((name) => !region.whole.has(name));
  if (pair.nodes.length > 400) return;
  for (const letter of moving) {
    for (const base of moving.length === 1 && region.names.length === 1 ? bases.slice(0, 1) : bases) {
      const given = new Map(
        region.names.filter((name) => name !== letter).map((name, k) => [name, Q.rational(Math.abs(base[k % 4] ?? 1))]),
      );
      for (const [name, value] of given)
        if (!region.whole.has(name) && base[0] === -3) given.set(name, Q.negate(value));
      const { gaps, exact } = breakUp(pair, letter, given);
      for (const value of [...gaps, ...exact]) {
        const point = new Map<string, KnownValue>([...given].map(([name, known]) => [name, fromRational(known)]));
        point.set(letter, fromRational(value));
        if (region.equations.length === 0 && region.admits(point)) yield point;
      }
    }
  }
}
