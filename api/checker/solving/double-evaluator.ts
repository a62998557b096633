import { toNumber } from '../numbers/rational.ts';
import { charge } from '../numbers/work.ts';
import type { CallName, Graph, GraphNode } from '../values/graph.ts';

/** Evaluates a graph in doubles; NaN where there is no real value. For guesses only, never for a ruling. */
export type DoubleFunction = (x: number) => number;

export function toDoubleFunction(graph: Graph, letter: string, given: ReadonlyMap<string, number>): DoubleFunction {
  const needed = reachable(graph);
  const values = new Float64Array(graph.nodes.length);
  const steps: { readonly node: GraphNode; readonly index: number }[] = [];
  graph.nodes.forEach((node, index) => {
    if (node.op === 'number') values[index] = toNumber(node.value);
    else if (needed.has(index)) steps.push({ node, index });
  });
  const cost = 0.1 + steps.reduce((sum, { node }) => sum + (node.op === 'call' ? 0.25 : 0.08), 0);
  return (x) => {
    charge(cost);
    for (const { node, index } of steps) values[index] = valueOf(node, values, letter, given, x);
    return values[graph.root] ?? Number.NaN;
  };
}

/** The nodes that the root depends on. */
export function reachable(graph: Graph): ReadonlySet<number> {
  const found = new Set<number>([graph.root]);
  for (let k = graph.root; k >= 0; k -= 1) {
    if (!found.has(k)) continue;
    for (const arg of graph.nodes[k]?.args ?? []) found.add(arg);
  }
  return found;
}

function valueOf(
  node: GraphNode,
  values: Float64Array,
  letter: string,
  given: ReadonlyMap<string, number>,
  x: number,
): number {
  const a = values[node.args[0] ?? 0] ?? Number.NaN;
  const b = values[node.args[1] ?? 0] ?? Number.NaN;
  switch (node.op) {
    case 'number':
      return toNumber(node.value);
    case 'letter':
      return node.name === letter ? x : (given.get(node.name) ?? Number.NaN);
    case 'constant':
      return node.name === 'pi' ? Math.PI : node.name === 'e' ? Math.E : Number.NaN;
    case 'add':
      return sumOf(node.args, values);
    case 'mul':
      return node.args.reduce<number>((product, arg) => product * (values[arg] ?? Number.NaN), 1);
    case 'negate':
      return -a;
    case 'div':
      return b === 0 ? Number.NaN : a / b;
    case 'power':
      return a === 0 && node.exponent <= 0 ? Number.NaN : a ** node.exponent;
    case 'root':
      return rootOf(a, node.degree, node.times, node.positive);
    case 'pow':
      return a > 0 ? a ** b : Number.isInteger(b) && a !== 0 ? a ** b : a === 0 && b > 0 ? 0 : Number.NaN;
    case 'call':
      return callOf(node.name, a, b, node.args.length);
    default:
      return Number.NaN;
  }
}

/** NaN where the sum cancels to what may be nothing but rounding. */
function sumOf(args: readonly number[], values: Float64Array): number {
  let sum = 0;
  let largest = 0;
  for (const arg of args) {
    const value = values[arg] ?? Number.NaN;
    sum += value;
    const size = Math.abs(value);
    if (size > largest) largest = size;
  }
  return sum !== 0 && Math.abs(sum) < 4e-15 * largest ? Number.NaN : sum;
}

function rootOf(a: number, degree: number, times: number, positive: boolean): number {
  if (a === 0) return times > 0 && !positive ? 0 : Number.NaN;
  if (a > 0) return a ** (times / degree);
  if (degree % 2 === 0 || positive) return Number.NaN;
  return (times % 2 === 0 ? 1 : -1) * (-a) ** (times / degree);
}

const plain: Partial<Record<CallName, (a: number) => number>> = {
  sin: Math.sin,
  cos: Math.cos,
  tan: Math.tan,
  cot: (a) => 1 / Math.tan(a),
  sec: (a) => 1 / Math.cos(a),
  csc: (a) => 1 / Math.sin(a),
  arcsin: Math.asin,
  arccos: Math.acos,
  arctan: Math.atan,
  ln: (a) => (a > 0 ? Math.log(a) : Number.NaN),
  exp: Math.exp,
  sinh: Math.sinh,
  cosh: Math.cosh,
  tanh: Math.tanh,
  arsinh: Math.asinh,
  arcosh: Math.acosh,
  artanh: Math.atanh,
  abs: Math.abs,
  sign: Math.sign,
  floor: Math.floor,
  ceil: Math.ceil,
};

function callOf(name: CallName, a: number, b: number, count: number): number {
  if (name === 'log') return a > 0 && a !== 1 && b > 0 ? Math.log(b) / Math.log(a) : Number.NaN;
  if (name === 'min' || name === 'max') return count === 2 ? Math[name](a, b) : Number.NaN;
  return plain[name]?.(a) ?? Number.NaN;
}

/** Whether the double evaluator knows every node that the root depends on. */
export function isDoubleReady(graph: Graph, letter: string, given: ReadonlyMap<string, number>): boolean {
  for (const index of reachable(graph)) {
    const node = graph.nodes[index] as GraphNode;
    if (node.op === 'opaque' || node.op === 'series') return false;
    if (node.op === 'letter' && node.name !== letter && !given.has(node.name)) return false;
    if (node.op === 'constant' && node.name !== 'pi' && node.name !== 'e') return false;
    if (node.op === 'call' && !(node.name in plain) && !['log', 'min', 'max'].includes(node.name)) return false;
  }
  return true;
}
