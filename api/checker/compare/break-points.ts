import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { toDoubleFunction } from '../solving/double-evaluator.ts';
import type { DoubleFunction } from '../solving/double-evaluator.ts';
import { toFraction } from '../solving/fraction.ts';
import { squareFreePart } from '../solving/polynomial.ts';
import { approximate, between, rationalNumber, realRoots } from '../solving/real-number.ts';
import type { RealNumber } from '../solving/real-number.ts';
import { fromRational } from '../values/arithmetic.ts';
import type { GraphNode } from '../values/graph.ts';
import type { KnownValue, Point } from '../values/value.ts';
import type { Pair } from './pair.ts';
import type { Region } from './points.ts';
import { signChanges } from './sign-changes.ts';

/** Where one letter makes a node plus a whole number vanish. */
interface Break {
  readonly node: number;
  readonly shift: number;
}

const mostBreaks = 24;
const mostRoots = 14;

/** What may change sign where an expression changes its form or loses its value. */
function breaksOf(pair: Pair): Break[] {
  const found: Break[] = [];
  pair.nodes.forEach((node, index) => {
    if (pair.needed[index] !== 1 || found.length >= mostBreaks) return;
    found.push(...breaksOfNode(node), ...turnsOfInverse(node, pair.nodes));
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

const circular: ReadonlySet<string> = new Set(['sin', 'cos', 'tan', 'cot', 'sec', 'csc']);
/** One between pi/2 and pi, the other beyond it, and the same on the other side. */
const turns = [-2, 2, -5, 5];

/** An inverse function of a circular one goes on differently after each half turn. */
function turnsOfInverse(node: GraphNode, nodes: readonly GraphNode[]): Break[] {
  if (node.op !== 'call' || !node.name.startsWith('arc')) return [];
  const inner = nodes[node.args[0] ?? -1];
  const parts = inner?.op === 'div' || inner?.op === 'negate' || inner?.op === 'power' ? inner.args : node.args;
  return parts.flatMap((index) => {
    const part = nodes[index];
    if (part?.op !== 'call' || !circular.has(part.name)) return [];
    return turns.map((shift) => ({ node: part.args[0] as number, shift }));
  });
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
      for (const part of partsThatVanish(pair.nodes, node, shift))
        roots.push(...scannedRoots(pair, { node: part, shift }, letter, given));
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

/** A power or product vanishes where its base or a factor does, which changes its sign there. */
function partsThatVanish(nodes: readonly GraphNode[], index: number, shift: number): number[] {
  const node = nodes[index];
  if (shift !== 0) return [index];
  if (node?.op === 'power' || node?.op === 'root' || node?.op === 'negate')
    return partsThatVanish(nodes, node.args[0], 0);
  if (node?.op === 'mul' || node?.op === 'div') return node.args.flatMap((arg) => partsThatVanish(nodes, arg, 0));
  return node?.op === 'number' ? [] : [index];
}

/** Where two arguments of a minimum or maximum are equal. */
function differencesOfExtremes(pair: Pair, letter: string, given: ReadonlyMap<string, Rational>): RealNumber[] {
  return pair.nodes.flatMap((node, index) => {
    if (pair.needed[index] !== 1 || node.op !== 'call' || (node.name !== 'min' && node.name !== 'max')) return [];
    const [first, second] = node.args;
    if (first === undefined || second === undefined) return [];
    const [a, b] = [first, second].map((root) => toFraction({ nodes: pair.nodes, root }, letter, given));
    if (!a || !b) {
      const [f, g] = [first, second].map((root) => doubleFunctionOf(pair, root, letter, given));
      return f && g ? signChanges((x) => f(x) - g(x)).map((root) => rationalNumber(fromDouble(root))) : [];
    }
    const difference = addScaled(multiply(a.num, b.den), multiply(b.num, a.den), -1n);
    return difference.length > 1 && difference.length < 40 ? realRoots(squareFreePart(difference)) : [];
  });
}

function multiply(a: readonly bigint[], b: readonly bigint[]): bigint[] {
  const product = Array.from({ length: Math.max(0, a.length + b.length - 1) }, () => 0n);
  a.forEach((x, i) => b.forEach((y, j) => (product[i + j] = (product[i + j] ?? 0n) + x * y)));
  return product;
}

/** Sign changes of a part that is no quotient of polynomials, by doubles: places to look at, nothing more. */
function scannedRoots(
  pair: Pair,
  { node, shift }: Break,
  letter: string,
  given: ReadonlyMap<string, Rational>,
): RealNumber[] {
  const f = doubleFunctionOf(pair, node, letter, given);
  return signChanges((x) => f(x) + shift).map((root) => rationalNumber(fromDouble(root)));
}

function doubleFunctionOf(
  pair: Pair,
  root: number,
  letter: string,
  given: ReadonlyMap<string, Rational>,
): DoubleFunction {
  const numbers = new Map([...given].map(([name, value]) => [name, Q.toNumber(value)]));
  return toDoubleFunction({ nodes: pair.nodes, root }, letter, numbers);
}

/** To about 20 bits behind the first that counts. */
function fromDouble(x: number): Rational {
  if (x === 0) return Q.zero;
  const scale = 2 ** Math.max(0, 30 - Math.floor(Math.log2(Math.abs(x))));
  return Q.rational(Math.round(x * scale), scale);
}

function sorted(roots: readonly RealNumber[]): RealNumber[] {
  const byValue = roots.map((root) => ({ root, value: approximate(root) })).sort((a, b) => a.value - b.value);
  return byValue
    .filter(({ value }, k) => k === 0 || value - (byValue[k - 1]?.value ?? 0) > 1e-9 * Math.abs(value))
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
