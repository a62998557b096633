import type { CheckContext } from '../context.ts';
import { bitLength } from '../numbers/rational.ts';
import { ballSign, magnitude } from '../numbers/ball.ts';
import { maximumBits } from '../numbers/elementary.ts';
import { isExactZero, isKnown, subKnown } from '../values/arithmetic.ts';
import type { GraphNode } from '../values/graph.ts';
import type { KnownValue } from '../values/value.ts';
import { evaluatePair } from './pair.ts';
import type { Pair } from './pair.ts';

/**
 * For a real algebraic number written with whole numbers, + - * / and roots: log2 of u and l such that the number is 0
 * or at least 1 / (u^(D-1) l) in size, where D is the product of the degrees of its roots (Burnikel, Fleischer, Mehlhorn,
 * Schirra 2000, "A strong and easily computable separation bound for arithmetic expressions involving radicals").
 */
interface Bound {
  readonly u: number;
  readonly l: number;
}

const mostDegree = 64;

/** Whether two constants are proved equal: closer than two different numbers of their kind can be. */
export function provesEqualConstants(pair: Pair, context: CheckContext): boolean {
  const degree = degreeOf(pair.nodes, pair.needed);
  if (degree === null) return false;
  const bounds = boundNodes(pair.nodes, pair.needed);
  const a = bounds[pair.above];
  const b = bounds[pair.below];
  if (a === undefined || b === undefined || a === null || b === null) return false;
  const difference = boundSum(a, b);
  const bits = Math.ceil((degree - 1) * difference.u + difference.l) + 64;
  if (bits > maximumBits - 500) return false;
  const precision = bits + 200;
  const { above, below } = evaluatePair(pair, new Map(), precision, context);
  return isKnown(above) && isKnown(below) && isWithin(subKnown(above, below, precision), precision - bits);
}

/** Whether the number is surely below 2^(room - precision) in size. */
function isWithin(difference: KnownValue, room: number): boolean {
  if (difference.kind === 'rational') return isExactZero(difference);
  if (difference.kind !== 'ball' || difference.im !== null) return false;
  return ballSign(difference.re) === 0 && bitLength(magnitude(difference.re.mid) + difference.re.rad) < room;
}

/** The product of the degrees of all roots; null where something else than arithmetic and real roots occurs. */
function degreeOf(nodes: readonly GraphNode[], needed: Uint8Array): number | null {
  let degree = 1;
  for (let index = 0; index < nodes.length; index += 1) {
    const node = nodes[index];
    if (needed[index] !== 1 || node === undefined) continue;
    if (node.op === 'root') degree *= node.degree;
    else if (!['number', 'add', 'mul', 'negate', 'div', 'power'].includes(node.op)) return null;
    if (degree > mostDegree) return null;
  }
  return degree;
}

function boundNodes(nodes: readonly GraphNode[], needed: Uint8Array): (Bound | null)[] {
  const bounds: (Bound | null)[] = [];
  nodes.forEach((node, index) => bounds.push(needed[index] === 1 ? boundNode(node, bounds) : null));
  return bounds;
}

function boundNode(node: GraphNode, bounds: readonly (Bound | null)[]): Bound | null {
  const parts = node.args.map((arg) => bounds[arg] ?? null);
  if (parts.some((part) => part === null)) return null;
  const known = parts.filter((part) => part !== null);
  const [a, b] = known;
  switch (node.op) {
    case 'number':
      return { u: bitLength(node.value.num), l: bitLength(node.value.den) };
    case 'add':
      return known.reduce(boundSum);
    case 'mul':
      return known.reduce((x, y) => ({ u: x.u + y.u, l: x.l + y.l }));
    case 'negate':
      return a ?? null;
    case 'div':
      return a === undefined || b === undefined ? null : { u: a.u + b.l, l: a.l + b.u };
    case 'power':
      return a === undefined ? null : boundPower(a, node.exponent);
    case 'root':
      return a === undefined ? null : boundPower(boundRoot(a, node.degree), node.times);
    default:
      return null;
  }
}

function boundSum(x: Bound, y: Bound): Bound {
  const first = x.u + y.l;
  const second = x.l + y.u;
  return { u: Math.max(first, second) + 1, l: x.l + y.l };
}

function boundPower(a: Bound, exponent: number): Bound {
  const n = Math.abs(exponent);
  return exponent < 0 ? { u: a.l * n, l: a.u * n } : { u: a.u * n, l: a.l * n };
}

/** u and l swap roles by which of them is larger; taking both in full is the weaker bound that always holds. */
function boundRoot(a: Bound, degree: number): Bound {
  return a.u >= a.l
    ? { u: (a.u + (degree - 1) * a.l) / degree, l: a.l }
    : { u: a.u, l: (a.l + (degree - 1) * a.u) / degree };
}
