import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import * as Q from '../numbers/rational.ts';
import { Unsettled } from '../solving/unsettled.ts';
import {
  addExprs,
  callOf,
  divExprs,
  mulExprs,
  numberOf,
  oneExpr,
  piExpr,
  rationalOf,
  subExprs,
  zeroExpr,
} from './build.ts';
import { bodyOf, differentiateTimes } from './differentiate.ts';
import { expandExtreme, expandFactorial, expandFloor, expandIntegral } from './expand-pieces.ts';
import { isFree } from './integrand.ts';
import { isOrder } from './order-symbol.ts';
import {
  addSeries,
  boundedSeries,
  composeSeries,
  constantSeries,
  expSeries,
  inverseSeries,
  isOnlyBounded,
  lnSeries,
  mulSeries,
  negateSeries,
  rationalPower,
  scaleSeries,
  signOfCoefficient,
  splitBySize,
  unitScale,
  type Expansion,
  type Series,
} from './series-ring.ts';
import { substitute } from './substitute.ts';

/** The expansion of an expression once the letter is a series; throws Unsettled. */
export function expand(expr: Expr, variable: string, at: Series, context: Expansion): Series {
  const visit = (node: Expr): Series => {
    context.budget.spend(4);
    return expandNode(node, { variable, at, context, visit });
  };
  return visit(expr);
}

interface ExpandJob {
  readonly variable: string;
  readonly at: Series;
  readonly context: Expansion;
  readonly visit: (node: Expr) => Series;
}

function expandNode(node: Expr, job: ExpandJob): Series {
  const { variable, at, context, visit } = job;
  switch (node.kind) {
    case 'letter': {
      if (node.name === variable) return at;
      const definition = context.definitions.letters.get(node.name);
      return definition ? visit(definition) : constantSeries(node);
    }
    case 'number':
      return constantSeries(node);
    case 'constant':
      if (node.name === 'infinity') throw new Unsettled('not-covered');
      return constantSeries(node);
    case 'sum':
      return node.terms.reduce((total, term) => {
        if (term.sign !== 'plus' && term.sign !== 'minus') throw new Unsettled('not-covered');
        const next = visit(term.expr);
        return addSeries(total, term.sign === 'plus' ? next : negateSeries(next), context);
      }, constantSeries(zeroExpr));
    case 'product':
      return node.factors.map(visit).reduce((total, next) => mulSeries(total, next, context));
    case 'quotient':
      return mulSeries(visit(node.numerator), inverseSeries(visit(node.denominator), context), context);
    case 'power':
      return expandPower(node.base, node.exponent, job);
    case 'root':
      return expandPower(node.radicand, node.degree ? divExprs(oneExpr, node.degree) : numberOf(1, 2), job);
    case 'log':
      return visit(divExprs(callOf('ln', node.argument), callOf('ln', node.base ?? numberOf(10))));
    case 'call':
      return expandCall(node, job);
    case 'factorial':
      return isFree(node, variable) ? constantSeries(node) : expandFactorial(visit(node.operand), context);
    case 'binomial':
      return isFree(node, variable) ? constantSeries(node) : visit(throughFactorials(node));
    case 'apply':
      return isOrder(node, context) ? expandOrder(node, job) : visit(bodyOf(node, context));
    default: {
      if (isFree(node, variable)) return constantSeries(node);
      const reduced = context.reduceCalculus?.(node, context);
      if (reduced && reduced.kind !== node.kind) return visit(reduced);
      if (node.kind !== 'integral') throw new Unsettled('not-covered');
      return expandIntegral(
        node,
        variable,
        visit,
        (integrand, letter, path) => expand(integrand, letter, path, context),
        context,
      );
    }
  }
}

/** n over k; a k that stays small is multiplied out elsewhere. */
function throughFactorials({ top, bottom, span }: Extract<Expr, { kind: 'binomial' }>): Expr {
  const factorialOf = (operand: Expr): Expr => ({ kind: 'factorial', operand, span });
  const rest = subExprs(top, bottom);
  return divExprs(factorialOf(top), mulExprs(factorialOf(bottom), factorialOf(rest)));
}

/** All of O(u); o(u) is what lies between that and each smaller power of the letter or of its logarithm. */
function expandOrder(node: Extract<Expr, { kind: 'apply' }>, { visit }: ExpandJob): Series {
  const size = visit(node.args[0] as Expr).terms[0]?.scale;
  if (!size) throw new Unsettled('not-covered');
  return boundedSeries(node.name === 'O' ? size : { ...size, q: size.q - 2 ** -20 });
}

function expandPower(base: Expr, exponent: Expr, { context, visit, variable }: ExpandJob): Series {
  const r = rationalOf(exponent);
  if (r) return rationalPower(visit(base), r, context);
  if (!lettersOf(base).includes(variable) && !lettersOf(exponent).includes(variable))
    return constantSeries({ kind: 'power', base, exponent, span: base.span });
  if (base.kind === 'constant' && base.name === 'e') return expSeries(visit(exponent), context);
  return expSeries(mulSeries(visit(exponent), lnSeries(visit(base), context), context), context);
}

function expandCall(node: Extract<Expr, { kind: 'call' }>, job: ExpandJob): Series {
  const { context, visit } = job;
  const [u] = node.args;
  if ((node.name === 'max' || node.name === 'min') && node.args.length > 0)
    return expandExtreme(node.name, node.args.map(visit), context);
  if (u === undefined || node.args.length !== 1) throw new Unsettled('not-covered');
  if (!lettersOf(node).includes(job.variable) && context.definitions.letters.size === 0) return constantSeries(node);
  switch (node.name) {
    case 'exp':
      return expSeries(visit(u), context);
    case 'ln':
      return lnSeries(visit(u), context);
    case 'sin':
    case 'cos':
      return expandCircular(node.name, visit(u), context);
    case 'abs':
    case 'sign':
      return expandBars(node.name, visit(u), context);
    case 'arctan':
      return expandArctan(visit(u), context);
    case 'floor':
    case 'ceil':
      return expandFloor(node.name, visit(u), context);
    default: {
      const other = rewritten(node.name, u);
      return other ? visit(other) : expandTaylor(node.name, visit(u), context);
    }
  }
}

const half = numberOf(1, 2);

/** Functions by way of those that are expanded directly. */
function rewritten(name: Extract<Expr, { kind: 'call' }>['name'], u: Expr): Expr | null {
  const exp = (sign: 1 | -1): Expr => callOf('exp', mulExprs(numberOf(sign), u));
  const of = (other: 'sin' | 'cos' | 'sinh' | 'cosh'): Expr => callOf(other, u);
  switch (name) {
    case 'tan':
      return divExprs(of('sin'), of('cos'));
    case 'cot':
      return divExprs(of('cos'), of('sin'));
    case 'sec':
      return divExprs(oneExpr, of('cos'));
    case 'csc':
      return divExprs(oneExpr, of('sin'));
    case 'sinh':
      return mulExprs(half, subExprs(exp(1), exp(-1)));
    case 'cosh':
      return mulExprs(half, addExprs(exp(1), exp(-1)));
    case 'tanh':
      return divExprs(of('sinh'), of('cosh'));
    case 'coth':
      return divExprs(of('cosh'), of('sinh'));
    case 'sech':
      return divExprs(oneExpr, of('cosh'));
    case 'csch':
      return divExprs(oneExpr, of('sinh'));
    case 'arccos':
      return subExprs(divExprs(piExpr, numberOf(2)), callOf('arcsin', u));
    case 'degrees':
      return mulExprs(u, divExprs(piExpr, numberOf(180)));
    default:
      return null;
  }
}

/** A sine or cosine of what grows is bounded, and no more is known. */
function expandCircular(name: 'sin' | 'cos', a: Series, context: Expansion): Series {
  if (context.numbers === 'real' && isOnlyBounded(a, context)) return boundedSeries(unitScale);
  const { large, constant, small } = splitBySize(a, context);
  if (large.length > 0) {
    if (context.numbers === 'complex') throw new Unsettled('not-covered');
    return boundedSeries(unitScale);
  }
  const sine = composeSeries(
    (k) => (k % 2 === 0 ? zeroExpr : numberOf(k % 4 === 1 ? 1 : -1, factorial(k))),
    small,
    context,
  );
  const cosine = composeSeries(
    (k) => (k % 2 === 1 ? zeroExpr : numberOf(k % 4 === 0 ? 1 : -1, factorial(k))),
    small,
    context,
  );
  if (constant === null) return name === 'sin' ? sine : cosine;
  const [s, c] = [callOf('sin', constant), callOf('cos', constant)];
  if (name === 'sin') return addSeries(scaleSeries(cosine, s, context), scaleSeries(sine, c, context), context);
  return addSeries(scaleSeries(cosine, c, context), negateSeries(scaleSeries(sine, s, context)), context);
}

function factorial(k: number): bigint {
  let product = 1n;
  for (let j = 2; j <= k; j += 1) product *= BigInt(j);
  return product;
}

function expandBars(name: 'abs' | 'sign', a: Series, context: Expansion): Series {
  if (context.numbers === 'complex') throw new Unsettled('not-covered');
  const [lead] = a.terms;
  if (!lead && a.error && name === 'abs') return a;
  if (!lead) throw new Unsettled('not-settled');
  if (name === 'abs' && lettersOf(lead.coef).length > 0)
    return scaleSeries(a, divExprs(callOf('abs', lead.coef), lead.coef), context);
  const known = signOfCoefficient(lead.coef, context);
  if (name === 'sign') return constantSeries(numberOf(known));
  return known < 0 ? negateSeries(a) : a;
}

/** arctan(c + d) = arctan c + arctan(d / (1 + c^2 + c d)); beyond all bounds it is pi/2 less that of the inverse. */
function expandArctan(a: Series, context: Expansion): Series {
  if (context.numbers === 'real' && isOnlyBounded(a, context)) return boundedSeries(unitScale);
  const { large, constant, small } = splitBySize(a, context);
  if (large[0]) {
    const known = signOfCoefficient(large[0].coef, context);
    const rest = negateSeries(expandArctan(inverseSeries(a, context), context));
    return addSeries(constantSeries(mulExprs(numberOf(known, 2), piExpr)), rest, context);
  }
  const tail = (z: Series): Series =>
    composeSeries((k) => (k % 2 === 0 ? zeroExpr : numberOf(k % 4 === 1 ? 1 : -1, k)), z, context);
  if (constant === null) return tail(small);
  const bottom = addSeries(
    constantSeries(addExprs(oneExpr, mulExprs(constant, constant))),
    scaleSeries(small, constant, context),
    context,
  );
  const z = mulSeries(small, inverseSeries(bottom, context), context);
  return addSeries(constantSeries(callOf('arctan', constant)), tail(z), context);
}

const mostTaylor = 5;
const smooth: ReadonlySet<string> = new Set(['arcsin', 'arsinh', 'artanh', 'arccot', 'arcsec', 'arccsc', 'arcosh']);

/** Taylor's series at an inner point of the domain, as far as its derivatives have values. */
function expandTaylor(name: Extract<Expr, { kind: 'call' }>['name'], a: Series, context: Expansion): Series {
  const { large, constant, small } = splitBySize(a, context);
  if (!smooth.has(name) || large.length > 0) throw new Unsettled('not-covered');
  const taylorOrder = Math.min(mostTaylor, context.steps);
  const letter = 'z_{0}';
  const call = callOf(name, { kind: 'letter', name: letter, span: { start: 0, end: 0 } });
  const at = constant ?? zeroExpr;
  const size = small.terms[0]?.scale ?? small.error;
  let total = constantSeries(callOf(name, at));
  let power = constantSeries(oneExpr);
  for (let k = 1; k <= taylorOrder; k += 1) {
    power = mulSeries(power, small, context);
    const slope = substitute(differentiateTimes(call, letter, k, context), letter, at);
    total = addSeries(total, scaleSeries(power, divExprs(slope, numberOf(factorial(k))), context), context);
  }
  if (!size) return total;
  const beyond = rationalPower(
    { terms: [{ coef: oneExpr, scale: size }], error: null },
    Q.rational(taylorOrder + 1),
    context,
  ).terms[0];
  return addSeries(total, boundedSeries(beyond?.scale ?? size), context);
}
