import { rational, toNumber, zero, type Rational } from '../numbers/rational.ts';
import { createForms, type Forms } from '../compare/normal-forms.ts';
import { addForms, type Form } from '../numbers/form.ts';
import { evaluatePrepared } from '../values/evaluate.ts';
import type { Graph, GraphBuilder, GraphNode } from '../values/graph.ts';
import { nodeToExpr, numberExpr } from '../values/node-expr.ts';
import type { KnownValue } from '../values/value.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import { listBreaks, type Break } from './breaks.ts';
import { circularArguments, countWaves, isPeriodic, zerosOfCircular } from './circular.ts';
import { isDoubleReady, reachable, toDoubleFunction } from './double-evaluator.ts';
import type { Sign, SignMap } from './fraction-signs.ts';
import { Isolator, type Stretch } from './isolate.ts';
import { degreeIn } from './linear.ts';
import type { LineEnv } from './line-env.ts';
import { isAlgebraic, rootsOfNorm, type NormRoots } from './norm.ts';
import { zerosByKernel } from './kernels.ts';
import { signAtPoint, toKnownValue } from './point-value.ts';
import { approximate, between, rationalNumber, type RealNumber } from './real-number.ts';
import { openIf, simplify, sortNumbers } from './real-set.ts';
import { sampledZeros } from './sampled-zeros.ts';
import { numeratorOf, simplifyForScan } from './simplify-for-scan.ts';
import { Unsettled } from './unsettled.ts';
import type { SolvePart, Zeros } from './zeros.ts';

const defaultWindow = { low: -41, high: 41, isAll: false };

/**
 * The signs of a function that is no rational one: its breaks (zeros of denominators, radicands, arguments of
 * logarithms and bars) split the line, all zeros are found between them, exactly where the function has one kernel or is
 * algebraic, else by intervals; each sign that is answered is confirmed in balls. Where it is not shown that no zero is
 * missing the map is marked as open.
 */
export function scanSigns(graph: Graph, outer: LineEnv, solvePart: SolvePart): SignMap {
  const given = new Map([...outer.given].map(([name, value]) => [name, toNumber(value)] as const));
  outer.context.budget.spend(graph.nodes.length * 4);
  if (!isDoubleReady(graph, outer.letter, given)) throw new Unsettled('not-covered');
  const env = withWindow(graph, outer);
  const breaks = breakPoints(graph, env, solvePart);
  const edges = sortNumbers(breaks.points.filter((p) => isInside(p, env))).points;
  const zeros = zerosOf(graph, edges, env, solvePart);
  const points = sortNumbers([...edges, ...zeros.points]).points.filter((p) => isInside(p, env));
  const sure = new Set<RealNumber>(zeros.sure ? zeros.points : []);
  const signAt = (p: RealNumber): Sign => {
    const other = sure.has(p) ? 0 : (zeros.signAt?.(p) ?? null);
    if (other !== null) return hasValueAt(graph, p, env) ? other : null;
    const found = signAtPoint(graph, env.letter, p, env.given, env.context);
    if (!found) throw new Unsettled('not-settled');
    return found.sign;
  };
  const at = points.map(signAt);
  const signs = samplesBetween(points, env).map(signAt);
  return simplify({ points, at, between: signs, reached: 'sampled', ...openIf(env, breaks, zeros) });
}

function hasValueAt(graph: Graph, at: RealNumber, env: LineEnv): boolean {
  const point = new Map<string, KnownValue>([[env.letter, toKnownValue(at, 160)]]);
  for (const [name, value] of env.given) point.set(name, { kind: 'rational', value });
  return evaluatePrepared(graph, point, 160, env.context).kind !== 'undefined';
}

/**
 * Only what repeats itself is looked at on a stretch of the line; other functions on all of it. Open where the stretch
 * does not stand for all of the line.
 */
function withWindow(graph: Graph, env: LineEnv): LineEnv & { readonly open: boolean } {
  if (env.window?.isAll) return { ...env, open: false };
  if (circularArguments(graph, env.letter).length === 0) return { ...env, window: null, open: false };
  if (isPeriodic(graph, env.letter)) return { ...env, window: env.window ?? defaultWindow, open: env.window === null };
  const hasBreaks = listBreaks(graph).some((item) => item.circular !== undefined);
  return { ...env, window: hasBreaks ? (env.window ?? defaultWindow) : null, open: hasBreaks };
}

function isInside(p: RealNumber, env: LineEnv): boolean {
  if (!env.window) return true;
  const x = approximate(p);
  return x >= env.window.low - 1e-9 && x <= env.window.high + 1e-9;
}

function breakPoints(graph: Graph, env: LineEnv, solvePart: SolvePart): Zeros {
  const points: RealNumber[] = [];
  let open = false;
  const seen = new Set<string>();
  for (const item of listBreaks(graph)) {
    const key = `${item.node} ${item.shift} ${item.circular ?? ''}`;
    if (seen.has(key)) continue;
    seen.add(key);
    const found = pointsOfBreak(graph, item, env, solvePart);
    points.push(...found.points);
    open ||= found.open === true;
  }
  return { points, open };
}

type Points = Pick<SignMap, 'points' | 'open'>;

function pointsOfBreak(graph: Graph, item: Break, env: LineEnv, solvePart: SolvePart): Points {
  if (degreeIn({ nodes: graph.nodes, root: item.node }, env.letter) === 0) return { points: [] };
  if (item.circular) {
    const zeros = zerosOfCircular(graph, item.node, item.circular, env);
    if (zeros) return { points: zeros };
    return solvePart(withNode(graph, { op: 'call', name: item.circular, args: [item.node] }), env);
  }
  if (item.shift === 0) return solvePart({ nodes: graph.nodes, root: item.node }, env);
  const number: GraphNode = { op: 'number', args: [], value: rational(item.shift) };
  const extended = withNode(graph, number);
  return solvePart(withNode(extended, { op: 'add', args: [item.node, extended.root] }), env);
}

function withNode(graph: Graph, node: GraphNode): Graph {
  return { nodes: [...graph.nodes, node], root: graph.nodes.length };
}

function zerosOf(graph: Graph, edges: readonly RealNumber[], env: LineEnv, solvePart: SolvePart): Zeros {
  const stretches = stretchesBetween(graph, edges, env);
  const exact = zerosByNorm(graph, stretches, env) ?? kernelZeros(graph, stretches, env, solvePart);
  if (exact) return exact;
  const isolated = isolatedZeros(graph, stretches, env);
  if (isolated) return { points: isolated, open: false, sure: true };
  const given = new Map([...env.given].map(([name, value]) => [name, toNumber(value)] as const));
  const f = toDoubleFunction(graph, env.letter, given);
  const known = sortNumbers([...edges, ...env.hints.filter((hint) => isZeroAt(graph, hint, env))]).points;
  const waves = env.window ? countWaves(graph, env) : 0;
  return { points: [...known, ...sampledZeros(graph, f, known, env, waves)], open: true };
}

/** What lies between neighbouring edges, with a number in it and the signs of what stands between bars. */
interface OpenStretch extends Stretch {
  readonly sample: Rational;
  readonly signs: ReadonlyMap<number, Sign>;
}

/** The stretches between neighbouring edges on which the function has values. */
function stretchesBetween(graph: Graph, edges: readonly RealNumber[], env: LineEnv): OpenStretch[] {
  const ends = [windowEnd(env, 'low'), ...edges.filter((p) => isWithin(p, env)), windowEnd(env, 'high')];
  return ends.slice(1).flatMap((end, k) => {
    const [from, to] = [ends[k] ?? null, end];
    const sample = between(from, to);
    const here = signAtPoint(graph, env.letter, rationalNumber(sample), env.given, env.context);
    return here?.sign === null ? [] : [{ from, to, sample, signs: barSigns(graph, sample, env) }];
  });
}

function zerosByNorm(graph: Graph, stretches: readonly OpenStretch[], env: LineEnv): Zeros | null {
  if (!isAlgebraic(graph)) return null;
  const points: RealNumber[] = [];
  let found: NormRoots | null = null;
  for (const { sample, signs } of stretches) {
    if (found === null || found.isLocal)
      found = rootsOfNorm(graph, env, { sample, signOf: (node) => signs.get(node) ?? null });
    if (!found) return null;
    if (found.roots !== 'zero') points.push(...found.roots);
  }
  return { points, open: false };
}

/** By its kernel on every stretch; stretches with the same signs between bars have the same one. */
function kernelZeros(
  graph: Graph,
  stretches: readonly OpenStretch[],
  env: LineEnv,
  solvePart: SolvePart,
): Zeros | null {
  const found = new Map<string, Zeros>();
  for (const { signs } of stretches) {
    const key = keyOfSigns(signs);
    if (found.has(key)) continue;
    const zeros = zerosByKernel(graph, env, (node) => signs.get(node) ?? null, solvePart);
    if (!zeros) return null;
    found.set(key, zeros);
  }
  const all = [...found.values()];
  const [only] = all;
  if (only && all.length === 1) return only;
  return { points: all.flatMap((zeros) => zeros.points), open: all.some((zeros) => zeros.open) };
}

function keyOfSigns(signs: ReadonlyMap<number, Sign>): string {
  return [...signs].map(([node, sign]) => `${node}:${sign}`).join();
}

function isZeroAt(graph: Graph, at: RealNumber, env: LineEnv): boolean {
  return isInside(at, env) && signAtPoint(graph, env.letter, at, env.given, env.context)?.sign === 0;
}

/** All zeros on the stretches, by intervals; null where some may be missing. */
function isolatedZeros(graph: Graph, stretches: readonly OpenStretch[], env: LineEnv): RealNumber[] | null {
  const found: RealNumber[] = [];
  const known = new Map<string, Isolator | 'zero' | null>();
  for (const { from, to, sample, signs } of stretches) {
    const key = keyOfSigns(signs);
    if (!known.has(key)) known.set(key, createIsolator(graph, signs, env));
    const isolator = known.get(key) ?? null;
    if (isolator === 'zero') continue;
    if (isolator && isZeroFunction(graph, from, sample, env)) continue;
    const zeros = isolator?.zerosOn({ from, to }) ?? null;
    if (!zeros) return null;
    found.push(...zeros);
  }
  const windowEnds = [windowEnd(env, 'low'), windowEnd(env, 'high')].filter((end) => end !== null);
  return [...found, ...windowEnds.filter((end) => isZeroAt(graph, end, env))];
}

/** sin^2 x + cos^2 x - 1: zero at two places to all digits, and as an identity. */
function isZeroFunction(graph: Graph, from: RealNumber | null, sample: Rational, env: LineEnv): boolean {
  if (env.given.size > 0) return false;
  const places = [rationalNumber(sample), rationalNumber(between(from, rationalNumber(sample)))];
  const isZero = (place: RealNumber): boolean =>
    signAtPoint(graph, env.letter, place, env.given, env.context)?.sign === 0;
  if (!places.every(isZero)) return false;
  const expr = nodeToExpr(graph.nodes, graph.root);
  return expr !== null && compareExpressions(expr, numberExpr(zero), env.context).kind === 'equal';
}

function createIsolator(graph: Graph, signs: ReadonlyMap<number, Sign>, env: LineEnv): Isolator | 'zero' | null {
  const simple = simplifyForScan(graph, env, (node) => signs.get(node) ?? null);
  const root = simple && numeratorOf(simple.builder, simple.root);
  if (!simple || root === null) return null;
  const forms = createForms(simple.builder.nodes, false);
  if (forms.formOf(root)?.size === 0) return 'zero';
  return new Isolator(simple.builder, withoutOpposites(simple.builder, root, forms), env);
}

/** A sum without the terms that cancel each other: e^x + x - x. */
function withoutOpposites(builder: GraphBuilder, root: number, forms: Forms): number {
  const node = builder.nodes[root];
  if (node?.op !== 'add') return root;
  const rest: { arg: number; form: Form | null }[] = [];
  for (const arg of node.args) {
    const form = forms.formOf(arg);
    const at = rest.findIndex((other) => form && other.form && addForms(form, other.form)?.size === 0);
    if (at < 0) rest.push({ arg, form });
    else rest.splice(at, 1);
  }
  return builder.add(rest.map(({ arg }) => arg));
}

/** The signs of what stands between bars, at a sample: they do not change between edges. */
function barSigns(graph: Graph, sample: Rational, env: LineEnv): Map<number, Sign> {
  const signs = new Map<number, Sign>();
  for (const index of reachable(graph)) {
    const node = graph.nodes[index];
    if (node?.op !== 'call' || (node.name !== 'abs' && node.name !== 'sign') || node.args[0] === undefined) continue;
    const inner = { nodes: graph.nodes, root: node.args[0] };
    signs.set(
      node.args[0],
      signAtPoint(inner, env.letter, rationalNumber(sample), env.given, env.context)?.sign ?? null,
    );
  }
  return signs;
}

function isWithin(p: RealNumber, { window }: LineEnv): boolean {
  if (!window) return true;
  const x = approximate(p);
  return x > window.low - 2 ** -12 && x < window.high + 2 ** -12;
}

function samplesBetween(points: readonly RealNumber[], env: LineEnv): RealNumber[] {
  const ends = [windowEnd(env, 'low'), ...points, windowEnd(env, 'high')];
  return ends.slice(1).map((end, k) => rationalNumber(between(ends[k] ?? null, end)));
}

/** A little outside of the window, for zeros at its ends. */
function windowEnd({ window }: LineEnv, side: 'low' | 'high'): RealNumber | null {
  if (!window) return null;
  const value = side === 'low' ? window.low - 2 ** -11 : window.high + 2 ** -11;
  return rationalNumber(rational(BigInt(Math.round(value * 2 ** 20)), 1n << 20n));
}
