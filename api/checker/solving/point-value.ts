import type { CheckContext } from '../context.ts';
import { ballSign, magnitude } from '../numbers/ball.ts';
import { sign } from '../numbers/rational.ts';
import { evaluateNodes } from '../values/evaluate.ts';
import type { Graph, GraphNode } from '../values/graph.ts';
import { toBall } from '../values/arithmetic.ts';
import type { KnownValue, Value } from '../values/value.ts';
import type { Assignment } from './fraction.ts';
import type { Sign } from './fraction-signs.ts';
import { enclose, type RealNumber } from './real-number.ts';

/** The value that stands in for a letter at a point of the line. */
export function toKnownValue(a: RealNumber, bits: number): KnownValue {
  if (a.kind === 'rational') return { kind: 'rational', value: a.value };
  if (a.kind === 'computed' && a.exact) return a.exact;
  return { kind: 'ball', re: enclose(a, bits), im: null };
}

export interface SignAtPoint {
  readonly sign: Sign;
  /** False where zero was taken for a number that vanishes to all digits looked at. */
  readonly certain: boolean;
}

/** Bits at which values are looked at. */
const wideBits = 288;
/** A sum that cancels to less than 2^-180 of its largest part, and below 2^-140, is zero: more than 50 digits agree. */
const cancelledBits = 180n;
const tinyBits = 140;

/**
 * The sign of a graph's value at a point. A sum that cancels to 50 digits is zero: so that a root or a denominator at the
 * very edge of its domain gets its meaning. Null sign: no value there; null answer: not known.
 */
export function signAtPoint(
  graph: Graph,
  letter: string,
  at: RealNumber,
  given: Assignment,
  context: CheckContext,
): SignAtPoint | null {
  let nodes: readonly GraphNode[] = graph.nodes.slice(0, graph.root + 1);
  const point = new Map<string, KnownValue>([[letter, toKnownValue(at, wideBits)]]);
  for (const [name, value] of given) point.set(name, { kind: 'rational', value });
  let certain = true;
  for (let tries = 0; tries < 12; tries += 1) {
    const values = evaluateNodes(nodes, point, wideBits, context);
    const found = signOfValue(values[graph.root]);
    if (found !== undefined) return { sign: found, certain };
    const zero = nodes.findIndex((node, k) => isCancelled(node, values, k));
    if (zero < 0) return null;
    certain = false;
    if (zero === graph.root) return { sign: 0, certain };
    nodes = nodes.map((node, k) => (k === zero ? { op: 'number', args: [], value: { num: 0n, den: 1n } } : node));
  }
  return null;
}

/** The sign where it is certain, null for no value, undefined where it cannot be told. */
function signOfValue(value: Value | undefined): Sign | undefined {
  switch (value?.kind) {
    case 'rational':
    case 'pi':
      return sign(value.value);
    case 'undefined':
      return null;
    case 'ball':
      return value.im === null ? ballSign(value.re) || undefined : undefined;
    default:
      return undefined;
  }
}

/** Functions that have zeros where their argument has none; their values near a zero are small beside 1. */
const vanishing: ReadonlySet<string> = new Set(['sin', 'cos', 'tan', 'cot', 'ln', 'log', 'arccos', 'arcosh']);

function isCancelled(node: GraphNode, values: readonly Value[], index: number): boolean {
  const value = values[index];
  if (value?.kind !== 'ball' || value.im !== null || ballSign(value.re) !== 0) return false;
  const size = magnitude(value.re.mid) + value.re.rad;
  if (node.op === 'add') {
    const parts = node.args.map((arg) => sizeOf(values[arg]));
    const largest = parts.reduce((most, part) => (part > most ? part : most), 0n);
    return size << cancelledBits < largest && size < 1n << BigInt(wideBits - tinyBits);
  }
  return node.op === 'call' && vanishing.has(node.name) && size << cancelledBits < 1n << BigInt(wideBits);
}

/** A lower bound of the size of a value, as a multiple of 2^-wideBits. */
function sizeOf(value: Value | undefined): bigint {
  if (!value || value.kind === 'undefined' || value.kind === 'unknown') return 0n;
  const { re } = toBall(value, wideBits);
  const size = magnitude(re.mid) - re.rad;
  return size > 0n ? size : 0n;
}
