import type { Graph, GraphNode } from '../values/graph.ts';
import { reachable } from './double-evaluator.ts';

/** Where a graph may change its form or lose its value: `node` plus `shift` is zero there. */
export interface Break {
  readonly node: number;
  readonly shift: -1 | 0 | 1;
  /** The circular function of the node that vanishes, where it is not the node itself. */
  readonly circular?: 'sin' | 'cos';
}

/** The breaks that lie in the parts of a graph which depend on its letter. */
export function listBreaks(graph: Graph): Break[] {
  const found: Break[] = [];
  for (const index of reachable(graph)) {
    const node = graph.nodes[index];
    if (node) found.push(...breaksOf(node));
  }
  return found;
}

function breaksOf(node: GraphNode): Break[] {
  const [a, b] = node.args as readonly number[];
  const at = (index: number | undefined, shift: -1 | 0 | 1 = 0): Break[] =>
    index === undefined ? [] : [{ node: index, shift }];
  switch (node.op) {
    case 'div':
      return at(b);
    case 'power':
      return node.exponent <= 0 ? at(a) : [];
    case 'root':
    case 'pow':
      return at(a);
    case 'call':
      return breaksOfCall(node.name, a, b);
    default:
      return [];
  }
}

function breaksOfCall(
  name: Extract<GraphNode, { op: 'call' }>['name'],
  a: number | undefined,
  b: number | undefined,
): Break[] {
  const both = (index: number | undefined): Break[] =>
    index === undefined
      ? []
      : [
          { node: index, shift: -1 },
          { node: index, shift: 1 },
        ];
  const zero = (index: number | undefined): Break[] => (index === undefined ? [] : [{ node: index, shift: 0 }]);
  switch (name) {
    case 'ln':
    case 'abs':
    case 'sign':
    case 'coth':
    case 'csch':
      return zero(a);
    case 'log':
      return [...zero(a), ...zero(b), ...(a === undefined ? [] : [{ node: a, shift: -1 as const }])];
    case 'arcsin':
    case 'arccos':
    case 'arcosh':
    case 'artanh':
    case 'arcsec':
    case 'arccsc':
      return [...both(a), ...zero(a)];
    case 'tan':
    case 'sec':
      return a === undefined ? [] : [{ node: a, shift: 0, circular: 'cos' }];
    case 'cot':
    case 'csc':
      return a === undefined ? [] : [{ node: a, shift: 0, circular: 'sin' }];
    default:
      return [];
  }
}
