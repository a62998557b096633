import { rational, toNumber, type Rational } from '../numbers/rational.ts';
import type { CallName, Graph } from '../values/graph.ts';
import type { KnownValue } from '../values/value.ts';
import { toBall } from '../values/arithmetic.ts';
import { ballToNumber } from '../numbers/ball.ts';
import { reachable } from './double-evaluator.ts';
import { degreeIn, linearForm, solveLinear } from './linear.ts';
import type { RealNumber } from './real-number.ts';
import type { LineEnv } from './line-env.ts';

const circularNames: readonly CallName[] = ['sin', 'cos', 'tan', 'cot', 'sec', 'csc'];

/** The arguments of sines, cosines and their kin that depend on the letter. */
export function circularArguments(graph: Graph, letter: string): number[] {
  const found = new Set<number>();
  for (const index of reachable(graph)) {
    const node = graph.nodes[index];
    if (node?.op !== 'call' || !circularNames.includes(node.name) || node.args[0] === undefined) continue;
    if (degreeIn({ nodes: graph.nodes, root: node.args[0] }, letter) > 0) found.add(node.args[0]);
  }
  return [...found];
}

export function knownToNumber(value: KnownValue): number {
  if (value.kind === 'rational') return toNumber(value.value);
  if (value.kind === 'pi') return toNumber(value.value) * Math.PI;
  return ballToNumber(toBall(value, 96).re, 96);
}

/** The zeros of sin or cos of a linear argument inside a window; null where the argument is not linear. */
export function zerosOfCircular(
  graph: Graph,
  argument: number,
  which: 'sin' | 'cos',
  env: LineEnv,
): RealNumber[] | null {
  const inner = { nodes: graph.nodes, root: argument };
  if (!env.window || degreeIn(inner, env.letter) !== 1) return null;
  const form = linearForm(inner, env.letter, env.given, 96, env.context);
  if (!form) return null;
  const slope = knownToNumber(form.slope);
  const offset = knownToNumber(form.offset);
  const ends = [env.window.low, env.window.high].map((x) => (slope * x + offset) / Math.PI);
  const shift = which === 'cos' ? 0.5 : 0;
  const first = Math.floor(Math.min(...ends) - shift) - 1;
  const last = Math.ceil(Math.max(...ends) - shift) + 1;
  if (!(last - first < 2000)) return null;
  const found: RealNumber[] = [];
  for (let k = first; k <= last; k += 1) {
    const turn = which === 'cos' ? rational(2 * k + 1, 2) : rational(k);
    const root = solveLinear(inner, env.letter, env.given, env.context, turnToValue(turn));
    if (root) found.push(root);
  }
  return found;
}

function turnToValue(turn: Rational): KnownValue {
  return turn.num === 0n ? { kind: 'rational', value: turn } : { kind: 'pi', value: turn };
}

/** How often the fastest circular part goes round inside a window. */
export function countWaves(graph: Graph, env: LineEnv): number {
  if (!env.window) return 0;
  const width = env.window.high - env.window.low;
  let most = 0;
  for (const argument of circularArguments(graph, env.letter)) {
    const inner = { nodes: graph.nodes, root: argument };
    const form = degreeIn(inner, env.letter) === 1 ? linearForm(inner, env.letter, env.given, 96, env.context) : null;
    most = Math.max(most, form ? (Math.abs(knownToNumber(form.slope)) * width) / (2 * Math.PI) : 20);
  }
  return most;
}

/** Whether a graph depends on the letter through sines and the like of linear arguments only. */
export function isPeriodic(graph: Graph, letter: string): boolean {
  const free = new Map<number, boolean>();
  // Whether a node depends on the letter outside of circular functions.
  const visit = (index: number): boolean => {
    const known = free.get(index);
    if (known !== undefined) return known;
    const node = graph.nodes[index];
    const isRound = node?.op === 'call' && circularNames.includes(node.name);
    const args = (node?.args ?? []) as readonly number[];
    const result = isRound
      ? args.some((arg) => degreeIn({ nodes: graph.nodes, root: arg }, letter) > 1)
      : node?.op === 'letter'
        ? node.name === letter
        : args.some(visit);
    free.set(index, result);
    return result;
  };
  return !visit(graph.root);
}
