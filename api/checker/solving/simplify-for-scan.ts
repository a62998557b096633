import { minusOne, one, rational } from '../numbers/rational.ts';
import { createGraphBuilder, type CallName, type Graph, type GraphBuilder, type GraphNode } from '../values/graph.ts';
import { reachable } from './double-evaluator.ts';
import type { LineEnv } from './line-env.ts';

/** The sign of a node of the first graph on the stretch that is looked at; null where it is not known. */
export type SignOnStretch = (node: number) => -1 | 0 | 1 | null;

/**
 * The same function on a stretch of the line, written with fewer kinds of nodes: the other letters replaced by their
 * values, bars taken off, tangents as quotients, hyperbolic functions and powers by exponentials, logarithms natural and
 * without powers in them. Null where something is left that has no such form.
 */
export function simplifyForScan(
  graph: Graph,
  env: LineEnv,
  signOf: SignOnStretch,
): { readonly builder: GraphBuilder; readonly root: number } | null {
  const builder = createGraphBuilder(() => env.context.budget.spend(1));
  const made = new Map<number, number>();
  for (const index of [...reachable(graph)].sort((a, b) => a - b)) {
    const node = graph.nodes[index] as GraphNode;
    const args = (node.args as readonly number[]).map((arg) => made.get(arg) as number);
    const found = copyNode(builder, node, args, env, signOf);
    if (found === null) return null;
    made.set(index, found);
  }
  return { builder, root: made.get(graph.root) as number };
}

function copyNode(
  builder: GraphBuilder,
  node: GraphNode,
  args: readonly number[],
  env: LineEnv,
  signOf: SignOnStretch,
): number | null {
  const [a, b] = args as [number, number];
  switch (node.op) {
    case 'number':
      return builder.number(node.value);
    case 'letter': {
      const value = env.given.get(node.name);
      return node.name !== env.letter && value ? builder.number(value) : builder.push(node);
    }
    case 'constant':
      return node.name === 'pi' || node.name === 'e' ? builder.push(node) : null;
    case 'add':
      return builder.add(args);
    case 'mul':
      return builder.mul(args);
    case 'negate':
      return builder.negate(a);
    case 'div':
      return builder.div(a, b);
    case 'power':
      return builder.power(a, node.exponent);
    case 'root': {
      const root = builder.push({ op: 'root', args: [a], degree: node.degree, times: 1, positive: false });
      if (node.times < 0) return builder.div(builder.number(one), builder.power(root, -node.times));
      return builder.power(root, node.times);
    }
    case 'pow':
      return exponential(builder, builder.mul([b, naturalLog(builder, a)]));
    case 'call':
      return copyCall(builder, node.name, args, signOf(node.args[0] as number));
    default:
      return null;
  }
}

function call(builder: GraphBuilder, name: CallName, arg: number): number {
  return builder.push({ op: 'call', name, args: [arg] });
}

/** e to the power of a node; e^(ln a) is a. */
function exponential(builder: GraphBuilder, exponent: number): number {
  const node = builder.nodes[exponent];
  if (node?.op === 'call' && node.name === 'ln') return node.args[0] as number;
  return call(builder, 'exp', exponent);
}

/** ln of a node that has one: powers and exponentials come out, so that like logarithms meet. */
function naturalLog(builder: GraphBuilder, arg: number): number {
  const node = builder.nodes[arg];
  if (node?.op === 'call' && node.name === 'exp') return node.args[0] as number;
  if (node?.op === 'constant' && node.name === 'e') return builder.number(one);
  return call(builder, 'ln', arg);
}

function copyCall(
  builder: GraphBuilder,
  name: CallName,
  args: readonly number[],
  sign: -1 | 0 | 1 | null,
): number | null {
  const [a, b] = args as [number, number];
  const unit = builder.number(one);
  const half = builder.number(rational(1, 2));
  const over = (top: number, bottom: number): number => builder.div(top, bottom);
  const mirrored = (): number => call(builder, 'exp', builder.negate(a));
  switch (name) {
    case 'exp':
      return exponential(builder, a);
    case 'ln':
      return naturalLog(builder, a);
    case 'log':
      return over(naturalLog(builder, b), naturalLog(builder, a));
    case 'sin':
    case 'cos':
    case 'arctan':
    case 'arcsin':
      return call(builder, name, a);
    case 'arccos': {
      const quarter = builder.mul([half, builder.push({ op: 'constant', args: [], name: 'pi' })]);
      return builder.add([quarter, builder.negate(call(builder, 'arcsin', a))]);
    }
    case 'tan':
      return over(call(builder, 'sin', a), call(builder, 'cos', a));
    case 'cot':
      return over(call(builder, 'cos', a), call(builder, 'sin', a));
    case 'sec':
      return over(unit, call(builder, 'cos', a));
    case 'csc':
      return over(unit, call(builder, 'sin', a));
    case 'cosh':
      return builder.mul([half, builder.add([exponential(builder, a), mirrored()])]);
    case 'sinh':
      return builder.mul([half, builder.add([exponential(builder, a), builder.negate(mirrored())])]);
    case 'tanh': {
      const square = call(builder, 'exp', builder.mul([builder.number(rational(2)), a]));
      return over(builder.add([square, builder.number(minusOne)]), builder.add([square, unit]));
    }
    case 'abs':
      if (sign === null) return null;
      return sign === 0 ? builder.number(rational(0)) : sign > 0 ? a : builder.negate(a);
    case 'sign':
      return sign === null ? null : builder.number(rational(sign));
    default:
      return null;
  }
}

/** A quotient without quotients in its two parts, but for those inside of functions. */
export interface Quotient {
  readonly top: number;
  readonly bottom: number;
}

const mostNodes = 600;

/**
 * The numerator of a node once all is over one denominator, so that zeros are not mixed with poles; each denominator is
 * counted once. Null where it grows too long.
 */
export function numeratorOf(builder: GraphBuilder, root: number): number | null {
  const known = new Map<number, Quotient | null>();
  const visit = (index: number): Quotient | null => {
    const found = known.get(index);
    if (found !== undefined) return found;
    if (builder.nodes.length > mostNodes) return null;
    const result = toQuotient(builder, index, visit);
    known.set(index, result);
    return result;
  };
  return visit(root)?.top ?? null;
}

function toQuotient(builder: GraphBuilder, index: number, visit: (index: number) => Quotient | null): Quotient | null {
  const node = builder.nodes[index] as GraphNode;
  const unit = builder.number(one);
  const parts = ['add', 'mul', 'negate', 'div', 'power'].includes(node.op)
    ? (node.args as readonly number[]).map(visit)
    : [];
  if (parts.includes(null)) return null;
  const of = parts as Quotient[];
  const [a, b] = of as [Quotient, Quotient];
  switch (node.op) {
    case 'negate':
      return { top: builder.negate(a.top), bottom: a.bottom };
    case 'mul':
      return { top: builder.mul(of.map((q) => q.top)), bottom: builder.mul(of.map((q) => q.bottom)) };
    case 'div':
      return { top: builder.mul([a.top, b.bottom]), bottom: builder.mul([a.bottom, b.top]) };
    case 'power':
      return node.exponent >= 0
        ? { top: builder.power(a.top, node.exponent), bottom: builder.power(a.bottom, node.exponent) }
        : { top: builder.power(a.bottom, -node.exponent), bottom: builder.power(a.top, -node.exponent) };
    case 'add': {
      const bottoms = [...new Set(of.map((q) => q.bottom))].filter((bottom) => bottom !== unit);
      if (bottoms.length === 0) return { top: builder.add(of.map((q) => q.top)), bottom: unit };
      const tops = of.map((q) => builder.mul([q.top, ...bottoms.filter((bottom) => bottom !== q.bottom)]));
      return { top: builder.add(tops), bottom: builder.mul(bottoms) };
    }
    default:
      return { top: index, bottom: unit };
  }
}
