import type { Expr, FunctionName } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { charge } from '../numbers/work.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { Definitions } from '../context.ts';
import {
  cosineOf,
  expOf,
  isFiniteNumber,
  logOf,
  minus,
  missing,
  over,
  plus,
  powerOf,
  real,
  rootOf,
  sineOf,
  sizeOf,
  times,
  type Complex,
} from './complex-double.ts';
import { derive } from './derive.ts';

/** Values of the letters in doubles, and what stands for letters that were defined. */
export interface Place {
  readonly letters: ReadonlyMap<string, Complex>;
  readonly definitions: Definitions;
}

const i: Complex = { re: 0, im: 1 };
const mostTerms = 60;

/** The value of an expression in doubles, NaN where it has none or none is known: only ever used to put candidates aside. */
export function estimate(expr: Expr, at: Place): Complex {
  switch (expr.kind) {
    case 'number':
      return real(Number(expr.numerator) / Number(expr.denominator));
    case 'letter':
      return letterValue(expr.name, at);
    case 'constant':
      return expr.name === 'i' ? i : expr.name === 'infinity' ? missing : real(expr.name === 'pi' ? Math.PI : Math.E);
    case 'sum':
      return expr.terms.reduce((total, term) => {
        if (term.sign === 'plus') return plus(total, estimate(term.expr, at));
        return term.sign === 'minus' ? minus(total, estimate(term.expr, at)) : missing;
      }, real(0));
    case 'product':
      return expr.factors.reduce((total, factor) => times(total, estimate(factor, at)), real(1));
    case 'quotient':
      return over(estimate(expr.numerator, at), estimate(expr.denominator, at));
    case 'power':
      return powerOf(estimate(expr.base, at), estimate(expr.exponent, at));
    case 'root':
      return rootValue(expr, at);
    case 'call':
      return callValue(
        expr.name,
        expr.args.map((arg) => estimate(arg, at)),
      );
    case 'log':
      return over(logOf(estimate(expr.argument, at)), expr.base ? logOf(estimate(expr.base, at)) : real(Math.LN10));
    case 'factorial':
      return real(factorial(estimate(expr.operand, at).re));
    case 'binomial': {
      const [n, k] = [estimate(expr.top, at).re, estimate(expr.bottom, at).re];
      return real(factorial(n) / (factorial(k) * factorial(n - k)));
    }
    default:
      return calculusValue(expr, at);
  }
}

function letterValue(name: string, at: Place): Complex {
  const found = at.letters.get(name);
  if (found) return found;
  const definition = at.definitions.letters.get(name);
  if (!definition) return missing;
  const letters = new Map(at.definitions.letters);
  letters.delete(name);
  return estimate(definition, { letters: at.letters, definitions: { ...at.definitions, letters } });
}

function rootValue(expr: Extract<Expr, { kind: 'root' }>, at: Place): Complex {
  const inside = estimate(expr.radicand, at);
  if (!expr.degree) return rootOf(inside);
  const degree = estimate(expr.degree, at);
  if (inside.im === 0 && inside.re < 0 && Math.abs(degree.re % 2) === 1)
    return real(-((-inside.re) ** (1 / degree.re)));
  return powerOf(inside, over(real(1), degree));
}

function factorial(n: number): number {
  if (!Number.isInteger(n) || n < 0 || n > 100) return NaN;
  let result = 1;
  for (let k = 2; k <= n; k += 1) result *= k;
  return result;
}

function realOnly(f: (x: number) => number): (a: Complex) => Complex {
  return (a) => (a.im === 0 ? real(f(a.re)) : missing);
}

const functions: Partial<Record<FunctionName, (a: Complex) => Complex>> = {
  sin: sineOf,
  cos: cosineOf,
  tan: (a) => over(sineOf(a), cosineOf(a)),
  cot: (a) => over(cosineOf(a), sineOf(a)),
  sec: (a) => over(real(1), cosineOf(a)),
  csc: (a) => over(real(1), sineOf(a)),
  arcsin: realOnly(Math.asin),
  arccos: realOnly(Math.acos),
  arctan: realOnly(Math.atan),
  arccot: realOnly((x) => Math.PI / 2 - Math.atan(x)),
  sinh: realOnly(Math.sinh),
  cosh: realOnly(Math.cosh),
  tanh: realOnly(Math.tanh),
  arsinh: realOnly(Math.asinh),
  arcosh: realOnly(Math.acosh),
  artanh: realOnly(Math.atanh),
  ln: logOf,
  exp: expOf,
  abs: (a) => real(sizeOf(a)),
  sign: realOnly(Math.sign),
  floor: realOnly(Math.floor),
  ceil: realOnly(Math.ceil),
  re: (a) => real(a.re),
  im: (a) => real(a.im),
  conj: (a) => ({ re: a.re, im: -a.im }),
  arg: (a) => real(Math.atan2(a.im, a.re)),
  degrees: (a) => times(a, real(Math.PI / 180)),
};

function callValue(name: FunctionName, args: readonly Complex[]): Complex {
  const [first] = args;
  const apply = functions[name];
  return apply && first && args.length === 1 ? apply(first) : missing;
}

type CalculusExpr = Exclude<
  Expr,
  {
    kind:
      | 'number'
      | 'letter'
      | 'constant'
      | 'sum'
      | 'product'
      | 'quotient'
      | 'power'
      | 'root'
      | 'call'
      | 'log'
      | 'factorial'
      | 'binomial';
  }
>;

function calculusValue(expr: CalculusExpr, at: Place): Complex {
  if (estimateCost(expr) > mostNested) return missing;
  switch (expr.kind) {
    case 'derivative':
      return expr.order === 1 ? derivativeValue(expr, at) : missing;
    case 'evaluated': {
      const name = expr.variable ?? lettersOf(expr.operand)[0];
      if (!expr.from || !name) return missing;
      return minus(
        estimate(expr.operand, moved(at, name, estimate(expr.to, at))),
        estimate(expr.operand, moved(at, name, estimate(expr.from, at))),
      );
    }
    case 'integral':
      return integralValue(expr, at);
    case 'series':
      return seriesValue(expr, at);
    case 'apply': {
      const own = at.definitions.functions.get(expr.name);
      if (!own || expr.primes > 0 || own.params.length !== expr.args.length) return missing;
      const letters = new Map(at.letters);
      own.params.forEach((param, k) => letters.set(param, estimate(expr.args[k] as Expr, at)));
      const functionsLeft = new Map(at.definitions.functions);
      functionsLeft.delete(expr.name);
      return estimate(own.value, { letters, definitions: { ...at.definitions, functions: functionsLeft } });
    }
    case 'limit':
      return limitValue(expr, at);
    case 'rate':
    case 'matrix':
      return missing;
  }
}

/** From values near the place, or far out, by the rule of Richardson; good to some ten digits where the limit is a plain one. */
function limitValue(expr: Extract<Expr, { kind: 'limit' }>, at: Place): Complex {
  const value = moving(expr.operand, expr.variable, at);
  const [first] = expr.to.kind === 'sum' ? expr.to.terms : [];
  const far = expr.to.kind === 'constant' ? expr.to : first?.expr;
  if (far?.kind === 'constant' && far.name === 'infinity') {
    const out = first?.sign === 'minus' ? -farOut : farOut;
    return extrapolated([value(out), value(2 * out), value(4 * out)]);
  }
  const place = estimate(expr.to, at).re;
  const near = (h: number): Complex =>
    expr.side === 'both'
      ? times(plus(value(place + h), value(place - h)), real(0.5))
      : value(expr.side === 'left' ? place - h : place + h);
  return extrapolated([near(nearBy), near(nearBy / 2), near(nearBy / 4)]);
}

const farOut = 1024;
const nearBy = 2 ** -9;

/** What values at h, h/2 and h/4 tend to, where the error falls as h and h squared. */
function extrapolated([a, b, c]: readonly [Complex, Complex, Complex]): Complex {
  const [one, two] = [minus(times(b, real(2)), a), minus(times(c, real(2)), b)];
  return minus(times(two, real(4 / 3)), times(one, real(1 / 3)));
}

const analytic: ReadonlySet<string> = new Set(['sin', 'cos', 'tan', 'cot', 'sec', 'csc', 'ln', 'exp', 'degrees']);
const step = 1e-20;

function isAnalytic(expr: Expr): boolean {
  if (expr.kind === 'call' && !analytic.has(expr.name)) return false;
  const isKnown = ![
    'integral',
    'derivative',
    'limit',
    'series',
    'apply',
    'evaluated',
    'factorial',
    'binomial',
  ].includes(expr.kind);
  return isKnown && childrenOf(expr).every(isAnalytic);
}

/** By a step along the imaginary axis (Squire & Trapp 1998), which loses no digits; else by the rules. */
function derivativeValue({ operand, variable }: Extract<Expr, { kind: 'derivative' }>, at: Place): Complex {
  const place = at.letters.get(variable);
  if (place?.im === 0 && isAnalytic(operand)) {
    const value = estimate(operand, moved(at, variable, { re: place.re, im: step }));
    return Math.abs(value.im) < 1e-6 ? real(value.im / step) : missing;
  }
  const derived = derive(operand, variable);
  return derived ? estimate(derived, at) : missing;
}

/** Limits, sums and integrals within each other take too long from here on, in nodes. */
const mostNested = 20_000;

function moved(at: Place, letter: string, value: Complex): Place {
  return { ...at, letters: new Map(at.letters).set(letter, value) };
}

/** The value as a function of one letter. */
function moving(expr: Expr, letter: string, at: Place): (x: number) => Complex {
  const letters = new Map(at.letters);
  const place: Place = { ...at, letters };
  return (x) => {
    letters.set(letter, real(x));
    return estimate(expr, place);
  };
}

function seriesValue(expr: Extract<Expr, { kind: 'series' }>, at: Place): Complex {
  const [low, high] = [estimate(expr.from, at).re, estimate(expr.to, at).re];
  if (!Number.isInteger(low) || !Number.isInteger(high) || high - low > mostTerms) return missing;
  let total = real(expr.operation === 'sum' ? 0 : 1);
  const term = moving(expr.body, expr.index, at);
  for (let k = low; k <= high; k += 1) {
    // Sums within sums are looked at more often than the cost that was told before says.
    charge(1);
    const value = term(k);
    total = expr.operation === 'sum' ? plus(total, value) : times(total, value);
  }
  return total;
}

const costs = new WeakMap<Expr, number>();

/** The work of one estimate, in nodes: what stands under an integral or a sum is looked at many times. */
export function estimateCost(expr: Expr): number {
  const known = costs.get(expr);
  if (known !== undefined) return known;
  const cost = findCost(expr);
  costs.set(expr, cost);
  return cost;
}

function findCost(expr: Expr): number {
  const inside = childrenOf(expr).reduce((cost, part) => cost + estimateCost(part), 1);
  if (expr.kind === 'integral') return inside * gauss.length * panels;
  if (expr.kind === 'derivative' || expr.kind === 'limit') return inside * 6;
  if (expr.kind === 'evaluated') return inside * 2;
  return expr.kind === 'series' ? inside * 8 : inside;
}

/** Nodes and weights of Gauss and Legendre with five points. */
const gauss: readonly (readonly [number, number])[] = [
  [0, 0.5688888888888889],
  [0.5384693101056831, 0.47862867049936647],
  [-0.5384693101056831, 0.47862867049936647],
  [0.906179845938664, 0.23692688505618908],
  [-0.906179845938664, 0.23692688505618908],
];
const panels = 12;

function integralValue(expr: Extract<Expr, { kind: 'integral' }>, at: Place): Complex {
  if (!expr.from || !expr.to) return missing;
  const [low, high] = [estimate(expr.from, at).re, estimate(expr.to, at).re];
  const half = (high - low) / (2 * panels);
  let total = real(0);
  const height = moving(expr.integrand, expr.variable, at);
  for (let panel = 0; panel < panels; panel += 1) {
    const middle = low + half * (2 * panel + 1);
    for (const [node, weight] of gauss) {
      const value = height(middle + half * node);
      total = plus(total, times(value, real(weight * half)));
    }
  }
  return isFiniteNumber(total) ? total : missing;
}
