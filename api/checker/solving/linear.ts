import type { CheckContext } from '../context.ts';
import { rescale, type Ball } from '../numbers/ball.ts';
import { bitLength, rational } from '../numbers/rational.ts';
import {
  addKnown,
  divKnown,
  isExactZero,
  isKnown,
  mulKnown,
  negateKnown,
  oneValue,
  subKnown,
  toBall,
  zeroValue,
} from '../values/arithmetic.ts';
import { evaluateNodes } from '../values/evaluate.ts';
import type { Graph, GraphNode } from '../values/graph.ts';
import type { KnownValue } from '../values/value.ts';
import type { Assignment } from './fraction.ts';
import { rationalNumber, type RealNumber } from './real-number.ts';
import { addSurds, invertSurd, multiplySurds, negateSurd, surdToNumber, toSurd } from './surd.ts';

/**
 * The degree in a letter, or in several together, as it is written; Infinity where it is no polynomial with constant
 * coefficients.
 */
export function degreeIn(graph: Graph, ...letters: readonly string[]): number {
  const degrees: number[] = [];
  for (let k = 0; k <= graph.root; k += 1) {
    const node = graph.nodes[k];
    if (!node) return Infinity;
    const of = (node.args as readonly number[]).map((arg) => degrees[arg] ?? Infinity);
    degrees.push(degreeOf(node, of, letters));
  }
  return degrees[graph.root] ?? Infinity;
}

function degreeOf(node: Graph['nodes'][number], of: readonly number[], letters: readonly string[]): number {
  switch (node.op) {
    case 'letter':
      return letters.includes(node.name) ? 1 : 0;
    case 'add':
    case 'negate':
      return Math.max(0, ...of);
    case 'mul':
      return of.reduce((sum, d) => sum + d, 0);
    case 'div':
      return of[1] === 0 ? (of[0] ?? Infinity) : Infinity;
    case 'power':
      return of[0] === 0 ? 0 : node.exponent > 0 ? (of[0] ?? Infinity) * node.exponent : Infinity;
    case 'opaque':
    case 'series':
      return Infinity;
    default:
      return of.every((d) => d === 0) ? 0 : Infinity;
  }
}

export interface LinearForm {
  readonly slope: KnownValue;
  readonly offset: KnownValue;
}

/** slope * letter + offset for a graph of degree one, exact where its constants are; null where one has no value. */
export function linearForm(
  graph: Graph,
  letter: string,
  given: Assignment,
  bits: number,
  context: CheckContext,
): LinearForm | null {
  const point = new Map<string, KnownValue>([[letter, zeroValue]]);
  for (const [name, value] of given) point.set(name, { kind: 'rational', value });
  const nodes = graph.nodes.slice(0, graph.root + 1);
  const values = evaluateNodes(nodes, point, bits, context);
  const forms: (LinearForm | null)[] = [];
  nodes.forEach((node, k) => {
    const offset = values[k];
    if (!offset || !isKnown(offset)) forms.push(null);
    else forms.push({ slope: slopeOf(node, forms, letter, bits), offset });
  });
  return forms[graph.root] ?? null;
}

function slopeOf(node: GraphNode, forms: readonly (LinearForm | null)[], letter: string, bits: number): KnownValue {
  const of = (arg: number): KnownValue => forms[arg]?.slope ?? zeroValue;
  switch (node.op) {
    case 'letter':
      return node.name === letter ? oneValue : zeroValue;
    case 'add':
      return node.args.reduce((sum, arg) => addKnown(sum, of(arg), bits), zeroValue);
    case 'negate':
      return negateKnown(of(node.args[0]));
    case 'mul': {
      const moving = node.args.find((arg) => !isExactZero(of(arg)));
      if (moving === undefined) return zeroValue;
      return node.args.reduce<KnownValue>((product, arg) => {
        return mulKnown(product, arg === moving ? of(arg) : (forms[arg]?.offset ?? zeroValue), bits);
      }, oneValue);
    }
    case 'div': {
      const divisor = forms[node.args[1]]?.offset;
      const quotient = divisor ? divKnown(of(node.args[0]), divisor, bits) : null;
      return quotient && isKnown(quotient) ? quotient : zeroValue;
    }
    default:
      return zeroValue;
  }
}

/** A number that is computed again at each precision asked for. */
export function computedNumber(compute: (bits: number) => KnownValue | null): RealNumber | null {
  const value = compute(firstBits);
  if (value === null || value.kind === 'gaussian' || (value.kind === 'ball' && value.im !== null)) return null;
  if (value.kind === 'rational') return rationalNumber(value.value);
  return {
    kind: 'computed',
    expr: null,
    ...(value.kind === 'pi' ? { exact: value } : {}),
    enclose: (bits) => encloseBy(compute, value, bits),
  };
}

/** Bits that `computedNumber` looks at first, and that are added where a number is so large that digits are missing. */
const firstBits = 160;

function encloseBy(compute: (bits: number) => KnownValue | null, first: KnownValue, bits: number): Ball {
  let best = rescale(toBall(first, firstBits).re, firstBits, bits);
  let wide = Math.max(bits, firstBits) + 8;
  for (let k = 0; k < 3; k += 1) {
    const value = compute(wide);
    if (value === null || value.kind === 'gaussian') return best;
    best = rescale(toBall(value, wide).re, wide, bits);
    const missing = bitLength(best.rad) - 20;
    if (missing <= 0 || missing > 4000) return best;
    wide += missing + 16;
  }
  return best;
}

/** Where slope * x + offset equals target: exact where it is a fraction, a surd or a multiple of pi. */
export function solveLinear(
  graph: Graph,
  letter: string,
  given: Assignment,
  context: CheckContext,
  target: KnownValue | null = null,
): RealNumber | null {
  if (target === null) {
    const exact = exactLinearRoot(graph, letter, given);
    if (exact) return exact;
  }
  return computedNumber((bits) => {
    const form = linearForm(graph, letter, given, bits, context);
    if (!form) return null;
    const goal = target === null ? negateKnown(form.offset) : subKnown(target, form.offset, bits);
    const root = divKnown(goal, form.slope, bits);
    return isKnown(root) ? root : null;
  });
}

function exactLinearRoot(graph: Graph, letter: string, given: Assignment): RealNumber | null {
  const offset = toSurd(graph, new Map([...given, [letter, rational(0)]]));
  const sum = offset && toSurd(graph, new Map([...given, [letter, rational(1)]]));
  const slope = sum && offset && addSurds(sum, negateSurd(offset));
  const inverse = slope && invertSurd(slope);
  const root = inverse && offset && multiplySurds(negateSurd(offset), inverse);
  return root ? surdToNumber(root) : null;
}
