import type { Expr, NumberExpr, ProductExpr, SumExpr } from './expression.ts';
import { printExpr } from './print.ts';

const SIGNS = { plus: 'plus', minus: 'minus', plusminus: 'plus or minus', minusplus: 'minus or plus' } as const;
const CONSTANTS = { pi: 'pi', e: 'e', i: 'the imaginary unit i', infinity: 'infinity' } as const;

/** An expression as English words; where the ear would lose the end of a part, its end is said. */
export function exprInWords(expr: Expr): string {
  switch (expr.kind) {
    case 'number':
      return numberInWords(expr);
    case 'letter':
      return letterInWords(expr.name);
    case 'constant':
      return CONSTANTS[expr.name];
    case 'sum':
      return sumInWords(expr);
    case 'product':
      return productInWords(expr);
    case 'quotient':
      return `${until(expr.numerator)} over ${closed(expr.denominator, 'end of fraction')}`;
    case 'power':
      return powerInWords(expr);
    case 'root':
      return `the ${degreeInWords(expr.degree)} root of ${closed(expr.radicand, 'end of root')}`;
    case 'call':
      return callInWords(expr);
    case 'log':
      return `log${expr.base ? ` base ${exprInWords(expr.base)}` : ''} of ${grouped(expr.argument)}`;
    case 'apply':
      return applyInWords(expr);
    case 'factorial':
      return `${grouped(expr.operand)} factorial`;
    case 'binomial':
      return `${grouped(expr.top)} choose ${grouped(expr.bottom)}`;
    case 'matrix':
      return matrixInWords(expr.rows);
    default:
      return calculusInWords(expr);
  }
}

function numberInWords(number: NumberExpr): string {
  const { numerator, denominator } = number;
  switch (number.written) {
    case 'mixed':
      return `${numerator / denominator} and ${numerator % denominator} over ${denominator}`;
    case 'percent':
      return `${printExpr(number).replace('\\%', '')} percent`;
    case 'repeating':
      return printExpr(number).replace('\\overline{', ' with ').replace('}', ' repeating');
    default:
      return printExpr(number);
  }
}

function letterInWords(name: string): string {
  const [letter = '', sub = ''] = name.split('_');
  const plain = letter
    .replace(/\\(vec|overrightarrow|hat|tilde|mathbf|bm|boldsymbol)\{(.*)\}/, 'vector $2')
    .replaceAll('\\', '');
  return sub ? `${plain} sub ${sub.replace(/[{}\\]/g, '')}` : plain;
}

/** Said in one breath, so that no brackets are needed around it. */
function isShort(expr: Expr): boolean {
  if (expr.kind === 'power') return isShort(expr.base) && isShort(expr.exponent);
  if (expr.kind === 'product') return expr.factors.every((factor) => isShort(factor));
  return expr.kind === 'number' || expr.kind === 'letter' || expr.kind === 'constant';
}

function grouped(expr: Expr): string {
  return isShort(expr) ? exprInWords(expr) : `open bracket ${exprInWords(expr)} close bracket`;
}

function until(expr: Expr): string {
  return isShort(expr) ? exprInWords(expr) : `${exprInWords(expr)},`;
}

function closed(expr: Expr, end: string): string {
  return isShort(expr) ? exprInWords(expr) : `${exprInWords(expr)}, ${end}`;
}

function sumInWords(sum: SumExpr): string {
  return sum.terms
    .map(({ sign, expr }, at) => {
      const words = expr.kind === 'sum' ? grouped(expr) : exprInWords(expr);
      return at === 0 && sign === 'plus' ? words : `${SIGNS[sign]} ${words}`;
    })
    .join(' ');
}

function productInWords(product: ProductExpr): string {
  return product.factors
    .map((factor, at) => {
      const words = factor.kind === 'sum' || factor.kind === 'product' ? grouped(factor) : until(factor);
      const isLast = at === product.factors.length - 1;
      const said = isLast && words.endsWith(',') ? words.slice(0, -1) : words;
      const isSilent = product.joins[at - 1] === 'implicit' && isShort(factor) && factor.kind !== 'number';
      return at === 0 || isSilent ? said : `times ${said}`;
    })
    .join(' ');
}

function powerInWords({ base, exponent }: Extract<Expr, { kind: 'power' }>): string {
  const said =
    base.kind === 'call' || base.kind === 'log' ? `open bracket ${exprInWords(base)} close bracket` : grouped(base);
  if (exponent.kind === 'number' && exponent.written === 'integer') {
    if (exponent.numerator === 2n) return `${said} squared`;
    if (exponent.numerator === 3n) return `${said} cubed`;
  }
  return `${said} to the power ${closed(exponent, 'end of power')}`;
}

function degreeInWords(degree: Expr | null): string {
  if (!degree) return 'square';
  if (degree.kind === 'number' && degree.written === 'integer') {
    if (degree.numerator === 3n) return 'cube';
    if (degree.numerator === 4n) return 'fourth';
  }
  return `${exprInWords(degree)}-th`;
}

const CALLS: Partial<Record<string, string>> = {
  sin: 'sine',
  cos: 'cosine',
  tan: 'tangent',
  cot: 'cotangent',
  sec: 'secant',
  csc: 'cosecant',
  arcsin: 'inverse sine',
  arccos: 'inverse cosine',
  arctan: 'inverse tangent',
  arccot: 'inverse cotangent',
  arcsec: 'inverse secant',
  arccsc: 'inverse cosecant',
  sinh: 'hyperbolic sine',
  cosh: 'hyperbolic cosine',
  tanh: 'hyperbolic tangent',
  coth: 'hyperbolic cotangent',
  sech: 'hyperbolic secant',
  csch: 'hyperbolic cosecant',
  arsinh: 'inverse hyperbolic sine',
  arcosh: 'inverse hyperbolic cosine',
  artanh: 'inverse hyperbolic tangent',
  ln: 'natural log',
  exp: 'the exponential',
  sign: 'the sign',
  floor: 'the floor',
  ceil: 'the ceiling',
  gcd: 'the greatest common divisor',
  lcm: 'the least common multiple',
  min: 'the least',
  max: 'the greatest',
  re: 'the real part',
  im: 'the imaginary part',
  conj: 'the conjugate',
  arg: 'the argument',
  det: 'the determinant',
  transpose: 'the transpose',
};

function callInWords({ name, args }: Extract<Expr, { kind: 'call' }>): string {
  const [first] = args;
  if (name === 'abs' && first) return `the absolute value of ${closed(first, 'end of absolute value')}`;
  if (name === 'degrees' && first) return `${grouped(first)} degrees`;
  const said = args.length === 1 && first ? grouped(first) : args.map(exprInWords).join(' and ');
  return `${CALLS[name] ?? name} of ${said}`;
}

const PRIMES = ['', ' prime', ' double prime', ' triple prime'];

function applyInWords({ name, primes, args }: Extract<Expr, { kind: 'apply' }>): string {
  const inverse = name.endsWith('^{-1}') ? ' inverse' : '';
  const head = letterInWords(name.replace('^{-1}', '')) + inverse + (PRIMES[primes] ?? ` with ${primes} primes`);
  return args.length > 0 ? `${head} of ${args.map(grouped).join(' and ')}` : head;
}

function matrixInWords(rows: readonly (readonly Expr[])[]): string {
  const said = rows.map((row, at) => `row ${at + 1}: ${row.map(exprInWords).join(', ')}`);
  return `${rows.length} by ${rows[0]?.length ?? 0} matrix, ${said.join('; ')}, end of matrix`;
}

const ORDERS = ['', '', 'second ', 'third '];

function calculusInWords(
  expr: Extract<Expr, { kind: 'series' | 'derivative' | 'rate' | 'integral' | 'evaluated' | 'limit' }>,
): string {
  switch (expr.kind) {
    case 'series':
      return `the ${expr.operation} from ${letterInWords(expr.index)} equals ${exprInWords(expr.from)} to ${exprInWords(expr.to)} of ${grouped(expr.body)}`;
    case 'derivative':
      return `the ${orderInWords(expr.order)}${expr.partial ? 'partial ' : ''}derivative by ${letterInWords(expr.variable)} of ${grouped(expr.operand)}`;
    case 'rate':
      return `the ${orderInWords(expr.order)}${expr.partial ? 'partial ' : ''}derivative of ${letterInWords(expr.of)} by ${letterInWords(expr.by)}`;
    case 'integral': {
      const bounds = expr.from && expr.to ? ` from ${exprInWords(expr.from)} to ${exprInWords(expr.to)}` : '';
      return `the integral${bounds} of ${exprInWords(expr.integrand)}, by ${letterInWords(expr.variable)}`;
    }
    case 'evaluated': {
      const at = expr.variable ? `${letterInWords(expr.variable)} equals ` : '';
      const place = expr.from
        ? `from ${at}${exprInWords(expr.from)} to ${exprInWords(expr.to)}`
        : `at ${at}${exprInWords(expr.to)}`;
      return `${grouped(expr.operand)} evaluated ${place}`;
    }
    case 'limit': {
      const side = expr.side === 'both' ? '' : expr.side === 'left' ? ' from below' : ' from above';
      return `the limit as ${letterInWords(expr.variable)} goes to ${exprInWords(expr.to)}${side} of ${grouped(expr.operand)}`;
    }
  }
}

function orderInWords(order: number): string {
  return ORDERS[order] ?? `${order}-th `;
}
