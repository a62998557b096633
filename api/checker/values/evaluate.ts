import type { Expr } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import {
  addKnown,
  divKnown,
  firstMissing,
  fromPi,
  fromRational,
  isKnown,
  mulKnown,
  negateKnown,
  oneValue,
  powKnown,
  undefinedValue,
  unknown,
  zeroValue,
} from './arithmetic.ts';
import type { Field } from './field.ts';
import { callFunction } from './functions.ts';
import type { Graph, GraphNode } from './graph.ts';
import { expOf } from './logarithms.ts';
import { lowerOne } from './lower.ts';
import { powOf, rootOf } from './powers.ts';
import type { KnownValue, Point, Value } from './value.ts';

const seriesLimit = 400n;
const notWanted = unknown('not-covered');

/** Expressions that are evaluated often: lower them once, evaluate at many points. */
export type Prepared = Graph;

export function prepare(expr: Expr, context: CheckContext): Prepared {
  return lowerOne(expr, context);
}

/** What an expression is worth at a point: exact where the parts are, else a ball of `bits` bits. */
export function evaluate(expr: Expr, point: Point, bits: number, context: CheckContext): Value {
  return evaluatePrepared(prepare(expr, context), point, bits, context);
}

export function evaluatePrepared(graph: Prepared, point: Point, bits: number, context: CheckContext): Value {
  const values = evaluateNodes(graph.nodes, point, bits, context);
  return values[graph.root] ?? unknown('not-covered');
}

/** The value of every node, in the order of the nodes; those that are not wanted count as not covered. */
export function evaluateNodes(
  nodes: readonly GraphNode[],
  point: Point,
  bits: number,
  context: CheckContext,
  wanted?: Uint8Array,
): Value[] {
  const field: Field = { bits, complex: context.numbers === 'complex' };
  const values: Value[] = [];
  for (const node of nodes) {
    if (wanted !== undefined && wanted[values.length] === 0) {
      values.push(notWanted);
      continue;
    }
    const value = evaluateNode(node, values, point, field, context);
    values.push(value);
  }
  // The arithmetic itself counts in numbers/; this is what it takes to get there.
  context.budget.spend(nodes.length / 2);
  return values;
}

function evaluateNode(
  node: GraphNode,
  values: readonly Value[],
  point: Point,
  field: Field,
  context: CheckContext,
): Value {
  switch (node.op) {
    case 'number':
      return fromRational(node.value);
    case 'letter':
      return point.get(node.name) ?? unknown('not-covered');
    case 'constant':
      return constantValue(node.name, field);
    case 'opaque':
      return unknown(node.reason);
    case 'add':
    case 'mul':
      return joinAll(node.op, node.args, values, field);
    case 'series':
      return seriesValue(node, values, point, field, context);
    default:
      return applyNode(node, values, field);
  }
}

function constantValue(name: 'pi' | 'e' | 'i' | 'infinity', field: Field): Value {
  switch (name) {
    case 'pi':
      return fromPi(Q.one);
    case 'e':
      return expOf(oneValue, field);
    case 'i':
      return { kind: 'gaussian', re: Q.zero, im: Q.one };
    case 'infinity':
      return unknown('not-covered');
  }
}

function joinAll(op: 'add' | 'mul', args: readonly number[], values: readonly Value[], field: Field): Value {
  let total: Value = op === 'add' ? zeroValue : oneValue;
  for (const arg of args) {
    const next = values[arg] ?? undefinedValue;
    if (!isKnown(total) || !isKnown(next)) total = firstMissing(total, next);
    else total = op === 'add' ? addKnown(total, next, field.bits) : mulKnown(total, next, field.bits);
  }
  return total;
}

type AppliedNode = Exclude<GraphNode, { op: 'number' | 'letter' | 'constant' | 'opaque' | 'add' | 'mul' | 'series' }>;

function applyNode(node: AppliedNode, values: readonly Value[], field: Field): Value {
  const known: KnownValue[] = [];
  let missing: Value | null = null;
  for (const arg of node.args) {
    const value = values[arg] ?? undefinedValue;
    if (isKnown(value)) known.push(value);
    else missing = missing === null ? value : firstMissing(missing, value);
  }
  const [a, b] = known;
  if (missing !== null || a === undefined) return missing ?? undefinedValue;
  switch (node.op) {
    case 'negate':
      return negateKnown(a);
    case 'div':
      return b === undefined ? undefinedValue : divKnown(a, b, field.bits);
    case 'power':
      return powKnown(a, node.exponent, field.bits);
    case 'root':
      return rootOf(a, node.degree, node.times, node.positive, field);
    case 'pow':
      return b === undefined ? undefinedValue : powOf(a, b, node.positive, field);
    case 'call':
      return callFunction(node.name, known, field);
  }
}

/** An empty sum is 0 and an empty product 1 when the upper bound is one below the lower one. */
function seriesValue(
  node: Extract<GraphNode, { op: 'series' }>,
  values: readonly Value[],
  point: Point,
  field: Field,
  context: CheckContext,
): Value {
  const from = values[node.args[0]] ?? undefinedValue;
  const to = values[node.args[1]] ?? undefinedValue;
  if (!isKnown(from) || !isKnown(to)) return firstMissing(from, to);
  if (from.kind !== 'rational' || to.kind !== 'rational') return unknown('not-covered');
  if (from.value.den !== 1n || to.value.den !== 1n) return undefinedValue;
  const low = from.value.num;
  const high = to.value.num;
  if (high < low - 1n) return unknown('no-agreed-meaning');
  if (high - low > seriesLimit) return unknown('limit');
  let total: Value = node.operation === 'sum' ? zeroValue : oneValue;
  const inner = new Map(point);
  for (let k = low; k <= high; k += 1n) {
    inner.set(node.index, fromRational({ num: k, den: 1n }));
    const term = evaluatePrepared(node.body, inner, field.bits, context);
    if (!isKnown(total) || !isKnown(term)) total = firstMissing(total, term);
    else total = node.operation === 'sum' ? addKnown(total, term, field.bits) : mulKnown(total, term, field.bits);
  }
  return total;
}
