import { div, one, rational, zero } from '../numbers/rational.ts';
import { charge } from '../numbers/work.ts';
import type { GraphBuilder, GraphNode } from '../values/graph.ts';

/**
 * The derivative of a node by a letter, as a node of the same builder, for graphs that `simplifyForScan` made: roots to
 * the power one, exponentials, natural logarithms, sines, cosines, arcsines and arctangents. Null for any other node.
 */
export function deriveNode(builder: GraphBuilder, index: number, letter: string): number | null {
  const known = new Map<number, number | null>();
  const visit = (at: number): number | null => {
    const found = known.get(at);
    if (found !== undefined) return found;
    const node = builder.nodes[at];
    const result = node ? slopeOf(builder, node, at, letter, visit) : null;
    known.set(at, result);
    return result;
  };
  return visit(index);
}

type Visit = (index: number) => number | null;

function isZeroNode(builder: GraphBuilder, index: number): boolean {
  return builder.valueOf(index)?.num === 0n;
}

/** A product, without its factors of zero and one. */
function times(builder: GraphBuilder, parts: readonly number[]): number {
  return parts.some((part) => isZeroNode(builder, part)) ? builder.number(zero) : builder.mul(parts);
}

function slopeOf(builder: GraphBuilder, node: GraphNode, at: number, letter: string, visit: Visit): number | null {
  const slopes = (node.args as readonly number[]).map(visit);
  if (slopes.includes(null)) return null;
  const [a, b] = slopes as number[];
  switch (node.op) {
    case 'number':
    case 'constant':
      return builder.number(zero);
    case 'letter':
      return builder.number(node.name === letter ? one : zero);
    case 'add':
      return builder.add((slopes as number[]).filter((slope) => !isZeroNode(builder, slope)));
    case 'negate':
      return builder.negate(a as number);
    case 'mul': {
      // Each factor is differentiated beside all the others.
      charge(node.args.length ** 2 / 2);
      const terms = (slopes as number[]).map((slope, k) =>
        times(builder, [slope, ...node.args.filter((_, j) => j !== k)]),
      );
      return builder.add(terms.filter((term) => !isZeroNode(builder, term)));
    }
    case 'div': {
      const [top, bottom] = node.args;
      const first = builder.div(a as number, bottom);
      if (isZeroNode(builder, b as number)) return isZeroNode(builder, a as number) ? builder.number(zero) : first;
      const second = builder.negate(builder.div(times(builder, [top, b as number]), builder.power(bottom, 2)));
      return isZeroNode(builder, a as number) ? second : builder.add([first, second]);
    }
    case 'power': {
      const factor = builder.number(rational(node.exponent));
      return times(builder, [factor, builder.power(node.args[0], node.exponent - 1), a as number]);
    }
    case 'root': {
      // (a^(1/n))' = a^(1/n) a' / (n a)
      const share = builder.number(div(one, rational(node.degree)));
      return times(builder, [share, builder.div(at, node.args[0]), a as number]);
    }
    case 'call':
      return node.args[0] === undefined ? null : slopeOfCall(builder, node.name, node.args[0], a as number, at);
    default:
      return null;
  }
}

function slopeOfCall(
  builder: GraphBuilder,
  name: Extract<GraphNode, { op: 'call' }>['name'],
  inner: number,
  slope: number,
  at: number,
): number | null {
  if (isZeroNode(builder, slope)) return builder.number(zero);
  const unit = builder.number(one);
  const square = (): number => builder.power(inner, 2);
  switch (name) {
    case 'exp':
      return times(builder, [at, slope]);
    case 'ln':
      return builder.div(slope, inner);
    case 'sin':
      return times(builder, [builder.push({ op: 'call', name: 'cos', args: [inner] }), slope]);
    case 'cos':
      return builder.negate(times(builder, [builder.push({ op: 'call', name: 'sin', args: [inner] }), slope]));
    case 'arctan':
      return builder.div(slope, builder.add([unit, square()]));
    case 'arcsin': {
      const below = builder.add([unit, builder.negate(square())]);
      const root = builder.push({ op: 'root', args: [below], degree: 2, times: 1, positive: false });
      return builder.div(slope, root);
    }
    default:
      return null;
  }
}
