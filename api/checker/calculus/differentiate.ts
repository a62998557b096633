import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { Unsettled } from '../solving/unsettled.ts';
import {
  addExprs,
  callOf,
  divExprs,
  isZeroExpr,
  mulExprs,
  negateExpr,
  numberOf,
  oneExpr,
  powExprs,
  rationalExpr,
  rationalOf,
  subExprs,
  wherever,
  zeroExpr,
} from './build.ts';
import { slopeOf } from './differentiate-call.ts';
import { rateExpr, rateNamed } from './rates.ts';
import { substitute } from './substitute.ts';

interface Scope {
  readonly variable: string;
  readonly context: CheckContext;
  readonly partial: boolean;
  readonly isConstant: (node: Expr) => boolean;
}

const mostNodes = 20_000;

/**
 * The derivative by a letter. Letters that the derivation takes dy/dx of depend on it, others are constants; a partial one
 * takes all others for constants. It has a value only where the derivative exists. Throws Unsettled.
 */
export function differentiate(expr: Expr, variable: string, context: CheckContext, partial = false): Expr {
  let spent = 0;
  const scope: Scope = { variable, context, partial, isConstant: constantTest(variable, context, partial) };
  const visit = (node: Expr): Expr => {
    if ((spent += 1) > mostNodes) throw new Unsettled('limit');
    if ((spent & 63) === 0) context.budget.spend(64);
    return scope.isConstant(node) ? zeroExpr : rule(node, scope, visit);
  };
  const result = visit(expr);
  if (isLargerThan(result, largestResult)) throw new Unsettled('limit');
  return result;
}

const largestResult = 6_000;

/** Parts that occur several times are counted as often: so they are when the expression is evaluated. */
function isLargerThan(expr: Expr, most: number): boolean {
  let count = 0;
  const open = [expr];
  for (let node = open.pop(); node !== undefined; node = open.pop()) {
    if ((count += 1) > most) return true;
    open.push(...childrenOf(node));
  }
  return false;
}

/** A derivative of higher order. */
export function differentiateTimes(
  expr: Expr,
  variable: string,
  order: number,
  context: CheckContext,
  partial = false,
): Expr {
  let result = expr;
  for (let k = 0; k < order; k += 1) result = differentiate(result, variable, context, partial);
  return result;
}

function constantTest(variable: string, context: CheckContext, partial: boolean): (node: Expr) => boolean {
  const known = new Map<Expr, boolean>();
  const isConstant = (node: Expr): boolean => {
    const found = known.get(node);
    if (found !== undefined) return found;
    const answer = !lettersBelow(node).some((name) => moves(name, variable, context, partial));
    known.set(node, answer);
    return answer;
  };
  const lettersBelow = (node: Expr): readonly string[] => {
    if (node.kind === 'letter') return [node.name];
    if (bindsOrNames(node)) return [...lettersOf(node), ...openVariables(node), ...ownLetters(node, context)];
    return childrenOf(node).every(isConstant) ? [] : [variable];
  };
  return isConstant;
}

function bindsOrNames(node: Expr): boolean {
  return ['series', 'limit', 'integral', 'derivative', 'evaluated', 'rate', 'apply'].includes(node.kind);
}

/** An indefinite integral depends on its variable, whatever stands under it. */
function openVariables(node: Expr): readonly string[] {
  const inside = childrenOf(node).flatMap(openVariables);
  return node.kind === 'integral' && !node.from ? [node.variable, ...inside] : inside;
}

/** The free letters of own functions that occur. */
function ownLetters(node: Expr, context: CheckContext, depth = 0): readonly string[] {
  const inside = childrenOf(node).flatMap((part) => ownLetters(part, context, depth));
  const own = node.kind === 'apply' ? context.definitions.functions.get(node.name) : undefined;
  if (!own || depth > 8) return inside;
  const free = lettersOf(own.value).filter(
    (name) => node.kind === 'apply' && (node.args.length === 0 || !own.params.includes(name)),
  );
  return [...inside, ...free, ...ownLetters(own.value, context, depth + 1)];
}

function moves(name: string, variable: string, context: CheckContext, partial: boolean): boolean {
  if (name === variable) return true;
  const definition = context.definitions.letters.get(name);
  if (definition !== undefined)
    return lettersOf(definition).some((inner) => inner !== name && moves(inner, variable, context, partial));
  if (partial) return false;
  const rate = rateNamed(name);
  if (rate) return rate.by === variable;
  return context.calculus?.dependents.get(name) === variable;
}

type Visit = (node: Expr) => Expr;

function rule(node: Expr, scope: Scope, visit: Visit): Expr {
  switch (node.kind) {
    case 'letter':
      return ofLetter(node.name, scope, visit);
    case 'sum':
      return addExprs(...node.terms.map((term) => signed(term.sign, visit(term.expr))));
    case 'product':
      return ofProduct(node.factors, visit);
    case 'quotient':
      return ofQuotient(node.numerator, node.denominator, scope, visit);
    case 'power':
      return ofPower(node, scope, visit);
    case 'root':
      return ofRoot(node, scope, visit);
    case 'call':
      return ofCall(node, scope, visit);
    case 'log':
      return ofLog(node, scope, visit);
    case 'series':
      return ofSeries(node, scope, visit);
    case 'matrix':
      return { ...node, rows: node.rows.map((row) => row.map(visit)) };
    case 'apply':
      return ofApply(node, scope, visit);
    case 'integral':
      return ofIntegral(node, scope, visit);
    case 'derivative':
    case 'evaluated':
    case 'limit':
    case 'rate':
      return visit(scope.context.reduceCalculus?.(node, scope.context) ?? unsettled());
    default:
      return unsettled();
  }
}

function unsettled(): never {
  throw new Unsettled('not-covered');
}

function signed(sign: string, expr: Expr): Expr {
  if (sign === 'plus') return expr;
  return sign === 'minus' ? negateExpr(expr) : unsettled();
}

function ofLetter(name: string, scope: Scope, visit: Visit): Expr {
  if (name === scope.variable) return oneExpr;
  const definition = scope.context.definitions.letters.get(name);
  if (definition !== undefined) return visit(definition);
  const rate = rateNamed(name);
  if (rate) return rateExpr({ ...rate, order: rate.order + 1 });
  return rateExpr({ of: name, by: scope.variable, order: 1 });
}

function ofProduct(factors: readonly Expr[], visit: Visit): Expr {
  return addExprs(
    ...factors.map((factor, k) => {
      const slope = visit(factor);
      return isZeroExpr(slope) ? zeroExpr : mulExprs(slope, ...factors.filter((_, j) => j !== k));
    }),
  );
}

function ofQuotient(top: Expr, bottom: Expr, scope: Scope, visit: Visit): Expr {
  const du = visit(top);
  if (scope.isConstant(bottom)) return divExprs(du, bottom);
  const dv = visit(bottom);
  if (isZeroExpr(du)) return negateExpr(divExprs(mulExprs(top, dv), powExprs(bottom, numberOf(2))));
  return divExprs(subExprs(mulExprs(du, bottom), mulExprs(top, dv)), powExprs(bottom, numberOf(2)));
}

function ofPower(node: Extract<Expr, { kind: 'power' }>, scope: Scope, visit: Visit): Expr {
  const { base, exponent } = node;
  if (scope.isConstant(exponent)) {
    const times = rationalOf(exponent);
    const lower: Expr = times
      ? { ...node, exponent: rationalExpr(Q.sub(times, Q.one)) }
      : { ...node, exponent: subExprs(exponent, oneExpr) };
    const rest = times && Q.equals(times, Q.one) ? oneExpr : times && Q.equals(times, Q.rational(2)) ? base : lower;
    return mulExprs(exponent, rest, visit(base));
  }
  if (base.kind === 'constant' && base.name === 'e') return mulExprs(node, visit(exponent));
  if (scope.isConstant(base)) return mulExprs(node, callOf('ln', base), visit(exponent));
  const growth = addExprs(
    mulExprs(visit(exponent), callOf('ln', base)),
    divExprs(mulExprs(exponent, visit(base)), base),
  );
  return mulExprs(node, growth);
}

function ofRoot(node: Extract<Expr, { kind: 'root' }>, scope: Scope, visit: Visit): Expr {
  const { degree, radicand } = node;
  if (degree === null) return divExprs(visit(radicand), mulExprs(numberOf(2), node));
  if (!scope.isConstant(degree)) return unsettled();
  return divExprs(visit(radicand), mulExprs(degree, powExprs(node, subExprs(degree, oneExpr))));
}

function ofCall(node: Extract<Expr, { kind: 'call' }>, scope: Scope, visit: Visit): Expr {
  const [u] = node.args;
  if (u === undefined || node.args.length !== 1) return unsettled();
  if (node.name === 'transpose') return { ...node, args: [visit(u)] };
  // ln|u| has the derivative u'/u on both sides of zero.
  if (node.name === 'ln' && scope.context.numbers === 'real' && u.kind === 'call' && u.name === 'abs' && u.args[0]) {
    return divExprs(visit(u.args[0]), u.args[0]);
  }
  const slope = slopeOf(node.name, u, scope.context.numbers === 'real');
  return slope === null ? unsettled() : mulExprs(slope, visit(u));
}

function ofLog(node: Extract<Expr, { kind: 'log' }>, scope: Scope, visit: Visit): Expr {
  const base = node.base ?? numberOf(10);
  const [top, bottom] = [callOf('ln', node.argument), callOf('ln', base)];
  if (!scope.isConstant(base)) return ofQuotient(top, bottom, scope, visit);
  return wherever(node, divExprs(visit(node.argument), mulExprs(node.argument, bottom)));
}

function ofSeries(node: Extract<Expr, { kind: 'series' }>, scope: Scope, visit: Visit): Expr {
  if (node.operation !== 'sum' || node.index === scope.variable) return unsettled();
  if (!scope.isConstant(node.from) || !scope.isConstant(node.to)) return unsettled();
  return { ...node, body: visit(node.body) };
}

/** A function of the derivation's own: its body at the arguments. */
function ofApply(node: Extract<Expr, { kind: 'apply' }>, scope: Scope, visit: Visit): Expr {
  return visit(bodyOf(node, scope.context));
}

/** f(a) or f'(a) written out; throws Unsettled where f is not known. */
export function bodyOf(node: Extract<Expr, { kind: 'apply' }>, context: CheckContext): Expr {
  const own = context.definitions.functions.get(node.name);
  if (!own || (own.params.length !== node.args.length && node.args.length > 0)) return unsettled();
  if (node.primes > 0 && own.params.length !== 1) return unsettled();
  const [only] = own.params;
  let body = own.value;
  if (node.primes > 0 && only !== undefined) {
    if (node.primes > 12) throw new Unsettled('limit');
    body = differentiateTimes(body, only, node.primes, context);
  }
  if (node.args.length === 0) return body;
  return substituteAll(body, own.params, node.args);
}

function substituteAll(body: Expr, params: readonly string[], args: readonly Expr[]): Expr {
  // By way of letters of their own, so that f(y, x) does not mix its letters up.
  const middle = params.map((_, k) => `\\arg_{${k + 1}}`);
  let result = body;
  params.forEach(
    (param, k) => (result = substitute(result, param, { kind: 'letter', name: middle[k] as string, span: body.span })),
  );
  args.forEach((arg, k) => (result = substitute(result, middle[k] as string, arg)));
  return result;
}

/** Leibniz' rule; the derivative of an indefinite integral is its integrand times that of its variable. */
function ofIntegral(node: Extract<Expr, { kind: 'integral' }>, scope: Scope, visit: Visit): Expr {
  const { from, to, integrand, variable } = node;
  if (!from || !to) {
    if (!moves(variable, scope.variable, scope.context, scope.partial)) {
      return scope.isConstant(integrand) ? zeroExpr : unsettled();
    }
    if (variable !== scope.variable && lettersOf(integrand).includes(scope.variable)) return unsettled();
    return mulExprs(integrand, visit({ kind: 'letter', name: variable, span: node.span }));
  }
  const ends = subExprs(
    mulExprs(substitute(integrand, variable, to), visit(to)),
    mulExprs(substitute(integrand, variable, from), visit(from)),
  );
  if (variable === scope.variable || scope.isConstant(integrand)) return ends;
  return addExprs(ends, { ...node, integrand: visit(integrand) });
}
