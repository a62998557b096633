import type { CheckContext } from '../context.ts';
import { rational } from '../numbers/rational.ts';
import { divKnown, isKnown, negateKnown, subKnown, toBall } from '../values/arithmetic.ts';
import { evaluatePrepared } from '../values/evaluate.ts';
import type { Graph } from '../values/graph.ts';
import type { KnownValue } from '../values/value.ts';
import type { Assignment } from './fraction.ts';
import { rationalNumber, type RealNumber } from './real-number.ts';
import { addSurds, invertSurd, multiplySurds, negateSurd, surdToNumber, toSurd } from './surd.ts';

/** The degree of a node in the letter as it is written; Infinity where it is no polynomial with constant coefficients. */
export function degreeIn(graph: Graph, letter: string): number {
  const degrees: number[] = [];
  for (let k = 0; k <= graph.root; k += 1) {
    const node = graph.nodes[k];
    if (!node) return Infinity;
    const of = (node.args as readonly number[]).map((arg) => degrees[arg] ?? Infinity);
    degrees.push(degreeOf(node, of, letter));
  }
  return degrees[graph.root] ?? Infinity;
}

function degreeOf(node: Graph['nodes'][number], of: readonly number[], letter: string): number {
  switch (node.op) {
    case 'letter':
      return node.name === letter ? 1 : 0;
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

/** The values of a graph at whole numbers, at a precision. */
function valueAt(graph: Graph, letter: string, x: number, given: Assignment, bits: number, context: CheckContext): KnownValue | null {
  const point = new Map<string, KnownValue>([[letter, { kind: 'rational', value: rational(x) }]]);
  for (const [name, value] of given) point.set(name, { kind: 'rational', value });
  const value = evaluatePrepared(graph, point, bits, context);
  return isKnown(value) ? value : null;
}

export interface LinearForm {
  readonly slope: KnownValue;
  readonly offset: KnownValue;
}

/** slope * letter + offset for a graph of degree one. */
export function linearForm(graph: Graph, letter: string, given: Assignment, bits: number, context: CheckContext): LinearForm | null {
  const offset = valueAt(graph, letter, 0, given, bits, context);
  const sum = valueAt(graph, letter, 1, given, bits, context);
  return offset && sum && { slope: subKnown(sum, offset, bits), offset };
}

/** A number that is computed again at each precision asked for. */
export function computedNumber(compute: (bits: number) => KnownValue | null): RealNumber | null {
  const value = compute(160);
  if (value === null || value.kind === 'gaussian' || (value.kind === 'ball' && value.im !== null)) return null;
  if (value.kind === 'rational') return rationalNumber(value.value);
  return {
    kind: 'computed',
    expr: null,
    ...(value.kind === 'pi' ? { exact: value } : {}),
    enclose: (bits) => {
      const again = compute(bits) ?? value;
      return toBall(again, bits).re;
    },
  };
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

