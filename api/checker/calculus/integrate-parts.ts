import type { Expr } from '../../../shared/maths/expression.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import {
  addExprs,
  callOf,
  divExprs,
  isZeroExpr,
  letterOf,
  mulExprs,
  negateExpr,
  numberOf,
  oneExpr,
  powExprs,
  rationalExpr,
  sqrtExpr,
  subExprs,
  zeroExpr,
} from './build.ts';
import { linearIn, polynomialExpr, type Factor } from './integrand.ts';

type CallExpr = Extract<Expr, { kind: 'call' }>;

/** The antiderivative of a named function at u, for du; null where the table has none. DLMF 4.26, 4.40. */
export function antiderivativeOfCall(name: CallExpr['name'], u: Expr): Expr | null {
  const of = (other: CallExpr['name']): Expr => callOf(other, u);
  const log = (expr: Expr): Expr => callOf('ln', callOf('abs', expr));
  const square = mulExprs(u, u);
  switch (name) {
    case 'exp':
      return of('exp');
    case 'sin':
      return negateExpr(of('cos'));
    case 'cos':
      return of('sin');
    case 'tan':
      return negateExpr(log(of('cos')));
    case 'cot':
      return log(of('sin'));
    case 'sec':
      return log(addExprs(of('sec'), of('tan')));
    case 'csc':
      return negateExpr(log(addExprs(of('csc'), of('cot'))));
    case 'sinh':
      return of('cosh');
    case 'cosh':
      return of('sinh');
    case 'tanh':
      return callOf('ln', of('cosh'));
    case 'coth':
      return log(of('sinh'));
    case 'ln':
      return subExprs(mulExprs(u, of('ln')), u);
    case 'arctan':
      return subExprs(mulExprs(u, of('arctan')), divExprs(callOf('ln', addExprs(oneExpr, square)), numberOf(2)));
    case 'arcsin':
      return addExprs(mulExprs(u, of('arcsin')), sqrtExpr(subExprs(oneExpr, square)));
    case 'arccos':
      return subExprs(mulExprs(u, of('arccos')), sqrtExpr(subExprs(oneExpr, square)));
    case 'abs':
      return divExprs(mulExprs(u, of('abs')), numberOf(2));
    default:
      return null;
  }
}

/** The antiderivative of the square of a function, or of its inverse square, at u. */
export function antiderivativeOfSquare(name: CallExpr['name'], times: Rational, u: Expr): Expr | null {
  const of = (other: CallExpr['name']): Expr => callOf(other, u);
  if (Q.equals(times, Q.rational(-2))) {
    if (name === 'cos') return of('tan');
    if (name === 'sin') return negateExpr(of('cot'));
    if (name === 'cosh') return of('tanh');
    if (name === 'sinh') return negateExpr(of('coth'));
  }
  if (!Q.equals(times, Q.rational(2))) return null;
  if (name === 'sec') return of('tan');
  if (name === 'csc') return negateExpr(of('cot'));
  if (name === 'tan') return subExprs(of('tan'), u);
  if (name === 'cot') return negateExpr(addExprs(of('cot'), u));
  if (name === 'sech') return of('tanh');
  if (name === 'csch') return negateExpr(of('coth'));
  return null;
}

const cycle: Partial<Record<CallExpr['name'], { sign: 1 | -1; name: CallExpr['name'] }>> = {
  exp: { sign: 1, name: 'exp' },
  sin: { sign: -1, name: 'cos' },
  cos: { sign: 1, name: 'sin' },
  sinh: { sign: 1, name: 'cosh' },
  cosh: { sign: 1, name: 'sinh' },
};

/** A polynomial times an exponential, sine or cosine of something linear: by parts until the polynomial is gone. */
export function integrateByParts(coefs: readonly Expr[], call: CallExpr, letter: string): Expr | null {
  const linear = call.args[0] ? linearIn(call.args[0], letter) : null;
  if (!linear || !cycle[call.name]) return null;
  const x = letterOf(letter);
  const terms: Expr[] = [];
  let polynomial = [...coefs];
  let current = call;
  let sign = 1;
  let scale: Expr = oneExpr;
  while (polynomial.some((coef) => !isZeroExpr(coef))) {
    const next = cycle[current.name];
    if (!next) return null;
    scale = divExprs(scale, linear.slope);
    current = { ...current, name: next.name };
    terms.push(mulExprs(numberOf(sign * next.sign), scale, polynomialExpr(polynomial, x), current));
    sign = -sign * next.sign;
    polynomial = polynomial.slice(1).map((coef, k) => mulExprs(numberOf(k + 1), coef));
  }
  return addExprs(...terms);
}

/** x^r times a whole power of ln(c x). */
export function integratePowerLog(r: Rational, times: number, log: CallExpr, letter: string): Expr | null {
  const linear = log.args[0] ? linearIn(log.args[0], letter) : null;
  if (!linear || !isZeroExpr(linear.constant)) return null;
  const x = letterOf(letter);
  if (Q.equals(r, Q.minusOne)) return divExprs(powExprs(log, numberOf(times + 1)), numberOf(times + 1));
  const next = Q.add(r, Q.one);
  const power = powExprs(x, rationalExpr(next));
  const head = mulExprs(divExprs(power, rationalExpr(next)), times === 0 ? oneExpr : powExprs(log, numberOf(times)));
  if (times === 0) return head;
  const rest = integratePowerLog(r, times - 1, log, letter);
  return rest && subExprs(head, mulExprs(divExprs(numberOf(times), rationalExpr(next)), rest));
}

/** exp(a x + b) times the sine or cosine of c x + d. */
export function integrateWave(exp: CallExpr, wave: CallExpr, letter: string): Expr | null {
  const a = exp.args[0] && linearIn(exp.args[0], letter)?.slope;
  const c = wave.args[0] && linearIn(wave.args[0], letter)?.slope;
  if (!a || !c || !wave.args[0]) return null;
  const other = callOf(wave.name === 'sin' ? 'cos' : 'sin', wave.args[0]);
  const top = addExprs(mulExprs(a, wave), mulExprs(numberOf(wave.name === 'sin' ? -1 : 1), c, other));
  return divExprs(mulExprs(exp, top), addExprs(mulExprs(a, a), mulExprs(c, c)));
}

interface Wave {
  readonly coef: Expr;
  readonly name: 'sin' | 'cos';
  readonly argument: Expr;
}

/** A product of whole powers of sines and cosines of something linear as a sum of single ones. */
export function productOfWaves(factors: readonly Factor[], letter: string): Expr | null {
  let waves: Wave[] = [{ coef: oneExpr, name: 'cos', argument: zeroExpr }];
  for (const { base, times } of factors) {
    if (
      base.kind !== 'call' ||
      (base.name !== 'sin' && base.name !== 'cos') ||
      times.den !== 1n ||
      times.num < 0n ||
      times.num > 8n
    )
      return null;
    const argument = base.args[0];
    if (!argument || !linearIn(argument, letter)) return null;
    for (let k = 0n; k < times.num; k += 1n) {
      waves = waves.flatMap((wave) =>
        timesWave(wave, { coef: oneExpr, name: base.name === 'sin' ? 'sin' : 'cos', argument }),
      );
      if (waves.length > 512) return null;
    }
  }
  const x = letterOf(letter);
  return addExprs(
    ...waves.map(({ coef, name, argument }) => {
      const linear = linearIn(argument, letter);
      if (!linear) return mulExprs(coef, callOf(name, argument), x);
      const whole = name === 'sin' ? negateExpr(callOf('cos', argument)) : callOf('sin', argument);
      return mulExprs(coef, divExprs(whole, linear.slope));
    }),
  );
}

function timesWave(a: Wave, b: Wave): Wave[] {
  const coef = mulExprs(numberOf(1, 2), a.coef, b.coef);
  const plus = collected(a.argument, b.argument, 1);
  const minus = collected(a.argument, b.argument, -1);
  if (a.name === 'cos' && b.name === 'cos')
    return [
      { coef, name: 'cos', argument: minus },
      { coef, name: 'cos', argument: plus },
    ];
  if (a.name === 'sin' && b.name === 'sin')
    return [
      { coef, name: 'cos', argument: minus },
      { coef: negateExpr(coef), name: 'cos', argument: plus },
    ];
  const sign = a.name === 'sin' ? 1 : -1;
  return [
    { coef, name: 'sin', argument: plus },
    { coef: mulExprs(numberOf(sign), coef), name: 'sin', argument: minus },
  ];
}

/** a + b or a - b, by coefficients, so that what cancels is gone. */
function collected(a: Expr, b: Expr, sign: 1 | -1): Expr {
  return addExprs(a, sign === 1 ? b : negateExpr(b));
}
