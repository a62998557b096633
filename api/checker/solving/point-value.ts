import type { CheckContext } from '../context.ts';
import { ballSign, magnitude } from '../numbers/ball.ts';
import { sign } from '../numbers/rational.ts';
import { evaluateNodes } from '../values/evaluate.ts';
import type { Graph, GraphNode } from '../values/graph.ts';
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

/** Bits at which values are looked at, and the size below which such a value is taken for zero. */
const wideBits = 288;
const zeroBits = 200;

/**
 * The sign of a graph's value at a point. A part whose value is zero to 60 digits is zero: so that a root or a
 * denominator at the very edge of its domain gets its meaning. Null sign: no value there; null answer: not known.
 */
export function signAtPoint(
  graph: Graph,
  letter: string,
  at: RealNumber,
  given: Assignment,
  context: CheckContext,
): SignAtPoint | null {
  let nodes: readonly GraphNode[] = graph.nodes.slice(0, graph.root + 1);
  let certain = true;
  for (let tries = 0; tries < 12; tries += 1) {
    const point = new Map<string, KnownValue>([[letter, toKnownValue(at, wideBits)]]);
    for (const [name, value] of given) point.set(name, { kind: 'rational', value });
    const values = evaluateNodes(nodes, point, wideBits, context);
    const value = values[graph.root];
    if (value && value.kind !== 'unknown') {
      const found = signOfValue(value);
      if (found !== undefined && found !== 'near-zero') return { sign: found, certain };
    }
    const zero = values.findIndex((v) => signOfValue(v) === 'near-zero');
    if (zero < 0) return null;
    certain = false;
    if (zero === graph.root) return { sign: 0, certain };
    nodes = nodes.map((node, k) => (k === zero ? { op: 'number', args: [], value: { num: 0n, den: 1n } } : node));
  }
  return null;
}

function signOfValue(value: Value): Sign | 'near-zero' | undefined {
  switch (value.kind) {
    case 'rational':
    case 'pi':
      return sign(value.value);
    case 'undefined':
      return null;
    case 'ball': {
      if (value.im !== null) return undefined;
      const known = ballSign(value.re);
      if (known !== 0) return known;
      return magnitude(value.re.mid) + value.re.rad < 1n << BigInt(wideBits - zeroBits) ? 'near-zero' : undefined;
    }
    default:
      return undefined;
  }
}
