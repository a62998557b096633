import type { Expr, ProductExpr, SeriesExpr, SumExpr } from '../../../shared/maths/expression.ts';
import { isIndexed } from '../calculus/indexed-letters.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { createGraphBuilder, lettersBelow } from './graph.ts';
import type { Graph, GraphBuilder } from './graph.ts';

const maximumDepth = 400;
const maximumNodes = 60_000;
const maximumTerms = 2_000;
const rationalExponentLimit = 1_000_000;
/** Letters that are read as whole numbers where they stand in an exponent. */
export const usuallyWhole: ReadonlySet<string> = new Set(['k', 'm', 'n']);

interface Lowering {
  readonly builder: GraphBuilder;
  readonly context: CheckContext;
  /** Letters that stand for a node: parameters of own functions and indices of sums. */
  readonly bound: ReadonlyMap<string, number>;
  /** Definitions being replaced, so that a definition by itself ends. */
  readonly open: ReadonlySet<string>;
  /** Shared by all lowerings of one graph. */
  readonly nesting: { depth: number; visits: number };
}

/** Adds the meaning of expressions to one graph; the answer holds the index of each. */
export function lowerAll(exprs: readonly Expr[], context: CheckContext): { builder: GraphBuilder; roots: number[] } {
  let pushed = 0;
  context.budget.spend(12);
  const builder = createGraphBuilder(() => {
    pushed += 1;
    if ((pushed & 63) === 0) context.budget.spend(48);
  });
  const lowering: Lowering = { builder, context, bound: nothingBound, open: noNames, nesting: { depth: 0, visits: 0 } };
  return { builder, roots: exprs.map((expr) => lower(expr, lowering)) };
}

/** Adds one more expression to a graph that is being built. */
export function lowerInto(builder: GraphBuilder, expr: Expr, context: CheckContext): number {
  return lower(expr, { builder, context, bound: nothingBound, open: noNames, nesting: { depth: 0, visits: 0 } });
}

export function lowerOne(expr: Expr, context: CheckContext): Graph {
  const { builder, roots } = lowerAll([expr], context);
  return { nodes: builder.nodes, root: roots[0] ?? 0 };
}

const nothingBound: ReadonlyMap<string, number> = new Map();
const noNames: ReadonlySet<string> = new Set();

function opaque(lowering: Lowering, reason: 'not-covered' | 'limit'): number {
  return lowering.builder.push({ op: 'opaque', args: [], reason });
}

function lower(expr: Expr, at: Lowering): number {
  const { builder, nesting } = at;
  if (nesting.depth > maximumDepth || builder.nodes.length > maximumNodes) return opaque(at, 'limit');
  nesting.depth += 1;
  nesting.visits += 1;
  if ((nesting.visits & 63) === 0) at.context.budget.spend(32);
  const index = lowerKind(expr, at, builder);
  nesting.depth -= 1;
  return index;
}

function lowerKind(expr: Expr, at: Lowering, builder: GraphBuilder): number {
  switch (expr.kind) {
    case 'number':
      return builder.number({ num: expr.numerator, den: expr.denominator });
    case 'letter':
      return lowerLetter(expr.name, at);
    case 'constant':
      return builder.push({ op: 'constant', args: [], name: expr.name });
    case 'sum':
      return lowerSum(expr, at);
    case 'product':
      return lowerProduct(expr, at);
    case 'quotient':
      return builder.div(lower(expr.numerator, at), lower(expr.denominator, at));
    case 'power':
      return lowerPower(lower(expr.base, at), lower(expr.exponent, at), hasDecimal(expr.exponent), at);
    case 'root':
      return lowerRoot(
        lower(expr.radicand, at),
        expr.degree === null ? 2 : lower(expr.degree, at),
        expr.degree === null,
        at,
      );
    case 'call':
      return lowerCall(expr.name, expr.args, at);
    case 'log': {
      const base = expr.base === null ? builder.number(Q.rational(10)) : lower(expr.base, at);
      return builder.push({ op: 'call', name: 'log', args: [base, lower(expr.argument, at)] });
    }
    case 'factorial':
      return builder.push({ op: 'call', name: 'factorial', args: [lower(expr.operand, at)] });
    case 'binomial':
      return builder.push({ op: 'call', name: 'binomial', args: [lower(expr.top, at), lower(expr.bottom, at)] });
    case 'apply':
      return lowerApply(expr.name, expr, at);
    case 'series':
      return lowerSeries(expr, at);
    default:
      return lowerReduced(expr, at);
  }
}

function lowerLetter(name: string, at: Lowering): number {
  const bound = at.bound.get(name);
  if (bound !== undefined) return bound;
  const definition = at.context.definitions.letters.get(name);
  if (definition === undefined || at.open.has(name)) return at.builder.push({ op: 'letter', args: [], name });
  return lower(definition, { ...at, open: new Set(at.open).add(name) });
}

function lowerSum(expr: SumExpr, at: Lowering): number {
  const args: number[] = [];
  for (const term of expr.terms) {
    if (term.sign !== 'plus' && term.sign !== 'minus') return opaque(at, 'not-covered');
    const value = lower(term.expr, at);
    args.push(term.sign === 'plus' ? value : at.builder.negate(value));
  }
  return args.length === 1 ? (args[0] ?? 0) : at.builder.add(args);
}

function lowerProduct(expr: ProductExpr, at: Lowering): number {
  return at.builder.mul(expr.factors.map((factor) => lower(factor, at)));
}

function hasDecimal(expr: Expr): boolean {
  switch (expr.kind) {
    case 'number':
      return expr.written === 'decimal' || expr.written === 'percent';
    case 'sum':
      return expr.terms.some((term) => hasDecimal(term.expr));
    case 'product':
      return expr.factors.some(hasDecimal);
    case 'quotient':
      return hasDecimal(expr.numerator) || hasDecimal(expr.denominator);
    default:
      return false;
  }
}

function lowerPower(base: number, exponent: number, decimal: boolean, at: Lowering): number {
  const { builder } = at;
  const value = builder.valueOf(exponent);
  const node = builder.nodes[base];
  if (node?.op === 'constant' && node.name === 'e') return builder.push({ op: 'call', name: 'exp', args: [exponent] });
  if (value === null)
    return builder.push({ op: 'pow', args: [base, exponent], positive: needsPositiveBase(base, exponent, at) });
  const limit = BigInt(rationalExponentLimit);
  if (value.num > limit || value.num < -limit || value.den > 1000n) return opaque(at, 'limit');
  if (value.den === 1n) return builder.power(base, Number(value.num));
  return pushRoot(base, Number(value.den), Number(value.num), decimal, at);
}

function needsPositiveBase(base: number, exponent: number, at: Lowering): boolean {
  if (at.context.numbers === 'complex') return false;
  const isWhole = (name: string): boolean => at.context.wholeLetters.has(name) || usuallyWhole.has(name);
  return lettersBelow(at.builder.nodes, base).size > 0 && ![...lettersBelow(at.builder.nodes, exponent)].every(isWhole);
}

function lowerRoot(radicand: number, degree: number, isSquare: boolean, at: Lowering): number {
  if (isSquare) return pushRoot(radicand, 2, 1, false, at);
  const value = at.builder.valueOf(degree);
  if (value === null) {
    const inverse = at.builder.div(at.builder.number(Q.one), degree);
    return at.builder.push({
      op: 'pow',
      args: [radicand, inverse],
      positive: needsPositiveBase(radicand, inverse, at),
    });
  }
  if (value.den !== 1n || value.num < 1n) return opaque(at, 'not-covered');
  if (value.num > 1000n) return opaque(at, 'limit');
  return value.num === 1n ? radicand : pushRoot(radicand, Number(value.num), 1, false, at);
}

function pushRoot(radicand: number, degree: number, times: number, positive: boolean, at: Lowering): number {
  const value = at.builder.valueOf(radicand);
  if (value !== null && value.num > 0n && Math.abs(times) < 50) {
    const root = Q.exactRoot(value, degree);
    if (root !== null) return at.builder.number(Q.pow(root, times));
  }
  return at.builder.push({ op: 'root', args: [radicand], degree, times, positive });
}

function lowerCall(name: Extract<Expr, { kind: 'call' }>['name'], args: readonly Expr[], at: Lowering): number {
  if (name === 'det' || name === 'transpose')
    return lowerReduced({ kind: 'call', name, args, span: { start: 0, end: 0 } }, at);
  // Among real numbers a bar over a letter is a name of its own, such as a mean.
  if (name === 'conj' && at.context.numbers === 'real' && args[0]?.kind === 'letter')
    return at.builder.push({ op: 'letter', args: [], name: `\\bar{${args[0].name}}` });
  const lowered = args.map((arg) => lower(arg, at));
  if (name === 'degrees') {
    const pi = at.builder.push({ op: 'constant', args: [], name: 'pi' });
    return at.builder.mul([...lowered, pi, at.builder.number(Q.rational(1, 180))]);
  }
  const [a] = lowered;
  const isWritten = a !== undefined && lowered.length === 1 && inverseHyperbolic.has(name);
  const written = isWritten ? lowerInverseHyperbolic(name, a, at) : null;
  return written ?? at.builder.push({ op: 'call', name, args: lowered });
}

const inverseHyperbolic: ReadonlySet<string> = new Set(['arsinh', 'arcosh', 'artanh']);

/** By logarithms, so that they meet the logarithms that people write for them: DLMF 4.37. */
function lowerInverseHyperbolic(name: string, a: number, at: Lowering): number | null {
  const { builder } = at;
  const one = builder.number(Q.one);
  const log = (arg: number): number => builder.push({ op: 'call', name: 'ln', args: [arg] });
  const root = (arg: number): number => pushRoot(arg, 2, 1, false, at);
  const square = (): number => builder.power(a, 2);
  switch (name) {
    case 'arsinh':
      return log(builder.add([a, root(builder.add([square(), one]))]));
    case 'arcosh': {
      if (at.context.numbers === 'real')
        return log(builder.add([a, root(builder.add([square(), builder.number(Q.minusOne)]))]));
      const parts = [root(builder.add([a, one])), root(builder.add([a, builder.number(Q.minusOne)]))];
      return log(builder.add([a, builder.mul(parts)]));
    }
    case 'artanh': {
      const difference = builder.add([
        log(builder.add([one, a])),
        builder.negate(log(builder.add([one, builder.negate(a)]))),
      ]);
      return builder.mul([builder.number(Q.rational(1, 2)), difference]);
    }
    default:
      return null;
  }
}

function lowerApply(name: string, expr: Extract<Expr, { kind: 'apply' }>, at: Lowering): number {
  const own = at.context.definitions.functions.get(name);
  if (expr.primes > 0 || own === undefined || own.params.length !== expr.args.length) return lowerReduced(expr, at);
  if (at.open.has(`${name}()`)) return opaque(at, 'not-covered');
  const bound = new Map<string, number>();
  own.params.forEach((param, k) => {
    const arg = expr.args[k];
    if (arg !== undefined) bound.set(param, lower(arg, at));
  });
  return lower(own.value, { ...at, bound, open: new Set(at.open).add(`${name}()`) });
}

/** A sum between known bounds is written out; else it stays a node that is added up at each point. */
function lowerSeries(expr: SeriesExpr, at: Lowering): number {
  const from = lower(expr.from, at);
  const to = lower(expr.to, at);
  const low = at.builder.valueOf(from);
  const high = at.builder.valueOf(to);
  if (low !== null && high !== null && isIndexed(expr)) return opaque(at, 'not-covered');
  if (low !== null && high !== null) {
    if (low.den !== 1n || high.den !== 1n) return opaque(at, 'not-covered');
    if (high.num - low.num >= BigInt(maximumTerms)) return lowerReduced(expr, at, 'limit');
    const terms: number[] = [];
    for (let k = low.num; k <= high.num; k += 1n) {
      at.context.budget.spend(1);
      const bound = new Map(at.bound).set(expr.index, at.builder.number({ num: k, den: 1n }));
      terms.push(lower(expr.body, { ...at, bound }));
    }
    return expr.operation === 'sum' ? at.builder.add(terms) : at.builder.mul(terms);
  }
  const reduced = at.context.reduceCalculus?.(expr, at.context) ?? null;
  if (reduced !== null && reduced.kind !== 'series') return lower(reduced, at);
  if (at.bound.size > 0 || isIndexed(expr)) return opaque(at, 'not-covered');
  return at.builder.push({
    op: 'series',
    args: [from, to],
    operation: expr.operation,
    index: expr.index,
    body: lowerOne(expr.body, withoutLetter(at.context, expr.index)),
  });
}

function withoutLetter(context: CheckContext, letter: string): CheckContext {
  if (!context.definitions.letters.has(letter)) return context;
  const letters = new Map(context.definitions.letters);
  letters.delete(letter);
  return { ...context, definitions: { ...context.definitions, letters } };
}

function lowerReduced(expr: Expr, at: Lowering, reason: 'not-covered' | 'limit' = 'not-covered'): number {
  const reduced = at.context.reduceCalculus?.(expr, at.context) ?? null;
  if (reduced === null || reduced.kind === expr.kind) return opaque(at, reason);
  return lower(reduced, at);
}
