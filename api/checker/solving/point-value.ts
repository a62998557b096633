import type { CheckContext } from '../context.ts';
import { ballSign, magnitude } from '../numbers/ball.ts';
import { bitLength, sign, type Rational } from '../numbers/rational.ts';
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

/** Bits at which values are looked at, and looked at again where they seem to be zero: up to 1200 digits. */
const wideBits = 288;
const closerBits: readonly number[] = [1024, 4096];
/** A sum that cancels to all but 108 bits of its largest part, and to all but 148 bits in size, is taken for zero. */
const spareBits = 108;
const spareSizeBits = 148;

/**
 * The sign of a graph's value at a point. A sum that cancels to a thousand digits is zero: so that a root or a
 * denominator at the very edge of its domain gets its meaning. Null sign: no value there; null answer: not known.
 */
export function signAtPoint(
  graph: Graph,
  letter: string,
  at: RealNumber,
  given: Assignment,
  context: CheckContext,
): SignAtPoint | null {
  const first = signWithin(graph, letter, at, given, context, wideBits);
  if (!first || first.certain || !mayBeTiny(graph, letter, at, given, context, wideBits)) return first;
  for (const bits of closerBits) {
    if (!isSharp(at, bits)) return null;
    const closer = signWithin(graph, letter, at, given, context, bits);
    if (!closer || closer.certain || !mayBeTiny(graph, letter, at, given, context, bits)) return closer;
  }
  return null;
}

/** Whether the point is known to about as many digits as are asked for. */
function isSharp(at: RealNumber, bits: number): boolean {
  if (at.kind === 'rational' || (at.kind === 'computed' && at.exact)) return true;
  return enclose(at, bits).rad < 1n << 40n;
}

/**
 * Whether something in the graph is so small, or written with so many digits, that two numbers may differ by no more
 * than that and still be called the same with this many bits: e^{-200}, 10^{-80} with 288.
 */
function mayBeTiny(
  graph: Graph,
  letter: string,
  at: RealNumber,
  given: Assignment,
  context: CheckContext,
  bits: number,
): boolean {
  const nodes = graph.nodes.slice(0, graph.root + 1);
  const longest = 1n << BigInt(Math.floor(bits / 3));
  const isLong = ({ num, den }: Rational): boolean => den > longest || magnitude(num) > longest;
  if (nodes.some((node) => node.op === 'number' && isLong(node.value))) return true;
  if (at.kind === 'rational' ? isLong(at.value) : magnitude(enclose(at, 96).mid) > longest << 96n) return true;
  const point = new Map<string, KnownValue>([[letter, toKnownValue(at, bits)]]);
  for (const [name, value] of given) point.set(name, { kind: 'rational', value });
  const values = evaluateNodes(nodes, point, bits, context);
  const isSmall = (index: number): boolean => {
    const value = values[index];
    if (value?.kind === 'rational' && value.value.num !== 0n)
      return bitLength(value.value.den) - bitLength(value.value.num) > bits / 5;
    if (value?.kind !== 'ball') return false;
    return magnitude(value.re.mid) - value.re.rad < 1n << BigInt(Math.ceil((bits * 4) / 5));
  };
  return nodes.some(
    (node, k) =>
      isSmall(k) &&
      node.op !== 'add' &&
      node.op !== 'letter' &&
      !(node.op === 'call' && vanishing.has(node.name)) &&
      !(node.args as readonly number[]).some(isSmall),
  );
}

function signWithin(
  graph: Graph,
  letter: string,
  at: RealNumber,
  given: Assignment,
  context: CheckContext,
  bits: number,
): SignAtPoint | null {
  let nodes: readonly GraphNode[] = graph.nodes.slice(0, graph.root + 1);
  const point = new Map<string, KnownValue>([[letter, toKnownValue(at, bits)]]);
  for (const [name, value] of given) point.set(name, { kind: 'rational', value });
  let certain = true;
  for (let tries = 0; tries < 12; tries += 1) {
    const values = evaluateNodes(nodes, point, bits, context);
    const found = signOfValue(values[graph.root]);
    if (found !== undefined) return { sign: found, certain };
    const zero = nodes.findIndex((node, k) => isCancelled(node, values, k, bits));
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

function isCancelled(node: GraphNode, values: readonly Value[], index: number, bits: number): boolean {
  const value = values[index];
  if (value?.kind !== 'ball' || value.im !== null || ballSign(value.re) !== 0) return false;
  const size = magnitude(value.re.mid) + value.re.rad;
  const cancelledBits = BigInt(bits - spareBits);
  if (node.op === 'add') {
    const parts = node.args.map((arg) => sizeOf(values[arg], bits));
    const largest = parts.reduce((most, part) => (part > most ? part : most), 0n);
    return size << cancelledBits < largest && size < 1n << BigInt(spareSizeBits);
  }
  return node.op === 'call' && vanishing.has(node.name) && size << cancelledBits < 1n << BigInt(bits);
}

/** A lower bound of the size of a value, as a multiple of 2^-bits. */
function sizeOf(value: Value | undefined, bits: number): bigint {
  if (!value || value.kind === 'undefined' || value.kind === 'unknown') return 0n;
  const { re } = toBall(value, bits);
  const size = magnitude(re.mid) - re.rad;
  return size > 0n ? size : 0n;
}
