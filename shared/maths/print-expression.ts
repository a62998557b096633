import type { Expr, NumberExpr, ProductExpr, ReadSettings, SumExpr } from './expression.ts';
import { numberText } from './print-number.ts';

import { functionOf, hidesWord } from './token-table.ts';

type Decimal = ReadSettings['decimal'];

/** How a decimal point is written, and whether a d beside a letter would be taken for a differential. */
export interface PrintStyle {
  readonly decimal: Decimal;
  readonly guardsD: boolean;
  /** An i is the index or variable here, so it needs no mark that it is not the unit. */
  readonly bindsI?: boolean;
}

/** An expression as TeX with no more brackets than it needs; read again it is the same expression. */
export function printExpr(expr: Expr, decimal: Decimal = 'point'): string {
  return print(expr, { decimal, guardsD: false });
}

export function bracket(text: string): string {
  return `\\left(${text}\\right)`;
}

/** Joins two pieces, with a blank where a command would run into a letter, or `!=` would come about. */
export function glue(left: string, right: string): string {
  const runsOn = isLetter(right.charCodeAt(0)) && endsInCommand(left);
  return runsOn || (left.endsWith('!') && right.startsWith('=')) ? `${left} ${right}` : left + right;
}

/** Looked at from the end, so that building a long text stays linear. */
function endsInCommand(text: string): boolean {
  let at = text.length - 1;
  while (isLetter(text.charCodeAt(at))) at -= 1;
  return at < text.length - 1 && text[at] === '\\';
}

function print(expr: Expr, style: PrintStyle): string {
  switch (expr.kind) {
    case 'number':
      return numberText(expr, style.decimal);
    case 'letter':
      return expr.name === 'i' && !style.bindsI ? '\\mathit{i}' : expr.name;
    case 'constant':
      return CONSTANTS[expr.name];
    case 'sum':
      return printSum(expr, style);
    case 'product':
      return printProduct(expr, style);
    case 'quotient':
      return printQuotient(expr, style);
    case 'power':
      return printPower(expr, style);
    case 'root':
      return printRoot(expr, style);
    case 'call':
      return printCall(expr, style, true);
    case 'log':
      return glue(printLogHead(expr, style), argument(expr.argument, style, true));
    case 'apply':
      return expr.name + "'".repeat(expr.primes) + (expr.args.length > 0 ? bracket(list(expr.args, style)) : '');
    case 'factorial':
      return `${base(expr.operand, style, true)}!`;
    case 'binomial':
      return `\\binom{${print(expr.top, style)}}{${print(expr.bottom, style)}}`;
    case 'matrix': {
      const rows = expr.rows.map((row) => row.map((cell) => print(cell, style)).join('&')).join('\\\\');
      if (!expr.bar) return `\\begin{pmatrix}${rows}\\end{pmatrix}`;
      const columns = `${'c'.repeat(expr.bar)}|${'c'.repeat((expr.rows[0]?.length ?? 0) - expr.bar)}`;
      return `\\left(\\begin{array}{${columns}}${rows}\\end{array}\\right)`;
    }
    default:
      return printCalculus(expr, style);
  }
}

const CONSTANTS = { pi: '\\pi', e: 'e', i: '\\mathrm{i}', infinity: '\\infty' } as const;
const SIGNS = { plus: '+', minus: '-', plusminus: '\\pm', minusplus: '\\mp' } as const;

function list(items: readonly Expr[], style: PrintStyle): string {
  return items.map((item) => print(item, style)).join(style.decimal === 'comma' ? ';' : ',');
}

function printSum(sum: SumExpr, style: PrintStyle): string {
  return sum.terms.reduce((text, { sign, expr }, at) => {
    const isBare = at === 0 && sign === 'plus' && sum.terms.length > 1;
    return glue(text + (isBare ? '' : SIGNS[sign]), term(expr, style));
  }, '');
}

function term(expr: Expr, style: PrintStyle): string {
  return expr.kind === 'sum' ? bracket(print(expr, style)) : print(expr, style);
}

/** Printed without brackets it would take in whatever stands behind it. */
function endsOpen(expr: Expr): boolean {
  switch (expr.kind) {
    case 'series':
    case 'limit':
    case 'derivative':
      return true;
    case 'product':
      return endsOpen(expr.factors[expr.factors.length - 1]!);
    default:
      return false;
  }
}

function printProduct(product: ProductExpr, style: PrintStyle): string {
  const { factors, joins } = product;
  const spaced = runHidesWord(product);
  return factors.reduce((text, factor, at) => {
    const join = at === 0 ? null : (joins[at - 1] ?? 'implicit');
    const after = at < joins.length ? (joins[at] ?? 'implicit') : null;
    const next = factors[at + 1];
    let piece = printFactor(factor, style, next ?? null, after);
    if (join === 'implicit' && needsBracket(piece, factor, factors[at - 1]!)) piece = bracket(piece);
    else if (style.guardsD && factor.kind === 'letter' && factor.name === 'd' && after !== null) piece = bracket(piece);
    const sign = join === 'dot' ? '\\cdot' : join === 'times' ? '\\times' : '';
    return glue(glue(text, sign) + (spaced && join === 'implicit' ? ' ' : ''), piece);
  }, '');
}

/** Beside another factor: digits would join its digits, and a fraction of digits would make a mixed number. */
function needsBracket(piece: string, factor: Expr, before: Expr): boolean {
  return /^\d/.test(piece) || (factor.kind === 'quotient' && factor.written === 'fraction' && before.kind === 'number');
}

function runHidesWord(product: ProductExpr): boolean {
  let run = '';
  for (const factor of product.factors) {
    const isPlain = factor.kind === 'letter' || (factor.kind === 'constant' && factor.name === 'e');
    const name = isPlain
      ? factor.kind === 'letter'
        ? factor.name
        : 'e'
      : factor.kind === 'power' && factor.base.kind === 'letter'
        ? factor.base.name
        : '';
    run += /^[a-zA-Z]/.test(name) ? name.slice(0, 1) : ' ';
  }
  return run.split(' ').some((letters) => letters.length > 1 && hidesWord(letters));
}

function printFactor(factor: Expr, style: PrintStyle, next: Expr | null, join: string | null): string {
  switch (factor.kind) {
    case 'sum':
    case 'product':
      return bracket(print(factor, style));
    case 'quotient':
      return factor.written === 'fraction' ? print(factor, style) : bracket(print(factor, style));
    case 'call':
      return printCall(factor, style, standsApart(next, join));
    case 'log':
      return glue(printLogHead(factor, style), argument(factor.argument, style, standsApart(next, join)));
    case 'power':
      return isFunctionPower(factor.base)
        ? printFunctionPower(factor.base, factor.exponent, style, standsApart(next, join))
        : print(factor, style);
    case 'apply':
      return factor.args.length === 0 && next ? bracket(print(factor, style)) : print(factor, style);
    default:
      return next && endsOpen(factor) ? bracket(print(factor, style)) : print(factor, style);
  }
}

/** An unbracketed argument before this stays what it is: nothing follows, another function, or a sign. */
function standsApart(next: Expr | null, join: string | null): boolean {
  return (
    next === null ||
    join !== 'implicit' ||
    (next.kind === 'call' && TEX_FUNCTIONS.has(next.name)) ||
    next.kind === 'log'
  );
}

function printQuotient(expr: Extract<Expr, { kind: 'quotient' }>, style: PrintStyle): string {
  if (expr.written === 'fraction') {
    const inside = { ...style, guardsD: true };
    return `\\frac{${print(expr.numerator, inside)}}{${print(expr.denominator, inside)}}`;
  }
  const { numerator, denominator } = expr;
  const above =
    numerator.kind === 'sum' || endsOpen(numerator) || endsInFunction(numerator)
      ? bracket(print(numerator, style))
      : print(numerator, style);
  const isLoose =
    ['sum', 'product', 'series', 'limit', 'derivative'].includes(denominator.kind) ||
    (denominator.kind === 'quotient' && denominator.written !== 'fraction');
  const below = isLoose || endsInFunction(denominator) ? bracket(print(denominator, style)) : print(denominator, style);
  const guarded = numerator.kind === 'letter' && numerator.name === 'd' ? bracket(above) : above;
  return glue(guarded + (expr.written === 'slash' ? '/' : '\\div'), below);
}

function endsInFunction(expr: Expr): boolean {
  if (expr.kind === 'product') return endsInFunction(expr.factors[expr.factors.length - 1]!);
  return expr.kind === 'call' || expr.kind === 'log' || (expr.kind === 'power' && isFunctionPower(expr.base));
}

function printPower(expr: Extract<Expr, { kind: 'power' }>, style: PrintStyle): string {
  if (isFunctionPower(expr.base) && !isMinusOne(expr.exponent))
    return printFunctionPower(expr.base, expr.exponent, style, true);
  return base(expr.base, style, false) + script(expr.exponent, style);
}

type FunctionExpr = Extract<Expr, { kind: 'call' | 'log' }>;

function isFunctionPower(expr: Expr): expr is FunctionExpr {
  return expr.kind === 'log' || (expr.kind === 'call' && POWERED.has(expr.name));
}

const POWERED = new Set(
  'sin cos tan cot sec csc sinh cosh tanh coth sech csch ln arcsin arccos arctan arsinh arcosh artanh'.split(' '),
);

function isMinusOne(expr: Expr): boolean {
  const term = expr.kind === 'sum' && expr.terms.length === 1 ? expr.terms[0] : null;
  return (
    term?.sign === 'minus' &&
    term.expr.kind === 'number' &&
    term.expr.written === 'integer' &&
    term.expr.numerator === 1n
  );
}

function printFunctionPower(call: FunctionExpr, exponent: Expr, style: PrintStyle, isLast: boolean): string {
  if (isMinusOne(exponent)) return bracket(print(call, style)) + script(exponent, style);
  const head = call.kind === 'log' ? printLogHead(call, style) : functionCommand(call.name);
  const inner = call.kind === 'log' ? call.argument : call.args[0]!;
  return glue(head + script(exponent, style), argument(inner, style, isLast));
}

function script(expr: Expr, style: PrintStyle): string {
  const text = print(expr, { ...style, guardsD: false });
  return text.length === 1 ? `^${text}` : `^{${text}}`;
}

/** What a power or factorial is put on. */
function base(expr: Expr, style: PrintStyle, isFactorial: boolean): string {
  const text = print(expr, style);
  switch (expr.kind) {
    case 'number':
      return expr.written === 'integer' || expr.written === 'decimal' ? text : bracket(text);
    case 'letter':
    case 'constant':
    case 'root':
    case 'matrix':
    case 'binomial':
      return text;
    case 'apply':
      return expr.args.length > 0 ? text : bracket(text);
    case 'factorial':
      return isFactorial ? bracket(text) : text;
    case 'call':
      return FENCES[expr.name] || expr.name === 'conj' ? text : bracket(text);
    default:
      return bracket(text);
  }
}

function printRoot(expr: Extract<Expr, { kind: 'root' }>, style: PrintStyle): string {
  const degree = expr.degree ? print(expr.degree, style) : null;
  const index = degree === null ? '' : degree.includes(']') ? `[{${degree}}]` : `[${degree}]`;
  return `\\sqrt${index}{${print(expr.radicand, style)}}`;
}

const FENCES: Partial<Record<string, readonly [string, string]>> = {
  abs: ['\\left|', '\\right|'],
  floor: ['\\left\\lfloor ', '\\right\\rfloor '],
  ceil: ['\\left\\lceil ', '\\right\\rceil '],
};
const TEX_FUNCTIONS = new Set(
  'sin cos tan cot sec csc arcsin arccos arctan sinh cosh tanh coth ln exp gcd min max arg det'.split(' '),
);

function functionCommand(name: string): string {
  if (TEX_FUNCTIONS.has(name)) return `\\${name}`;
  const shown = name === 're' ? 'Re' : name === 'im' ? 'Im' : name;
  return `\\operatorname{${functionOf(shown) === name ? shown : name}}`;
}

function printCall(call: Extract<Expr, { kind: 'call' }>, style: PrintStyle, isLast: boolean): string {
  const { name, args } = call;
  const fence = FENCES[name];
  if (fence) return fence[0] + print(args[0]!, style) + fence[1];
  if (name === 'conj') return `\\overline{${print(args[0]!, style)}}`;
  if (name === 'degrees') return `${base(args[0]!, style, false)}^{\\circ}`;
  if (name === 'transpose') return `${base(args[0]!, style, false)}^{\\top}`;
  if (args.length !== 1 || SEVERAL.has(name)) return functionCommand(name) + bracket(list(args, style));
  return glue(functionCommand(name), argument(args[0]!, style, isLast));
}

const SEVERAL = new Set(['gcd', 'lcm', 'min', 'max']);

function printLogHead(log: Extract<Expr, { kind: 'log' }>, style: PrintStyle): string {
  if (!log.base) return '\\log';
  const text = print(log.base, style);
  return `\\log_${text.length === 1 ? text : `{${text}}`}`;
}

/** Without brackets only where it is short and nothing behind it could be drawn in. */
function argument(expr: Expr, style: PrintStyle, isLast: boolean): string {
  const text = print(expr, style);
  if (FENCES[expr.kind === 'call' ? expr.name : '']) return isLast ? text : bracket(text);
  const isShort =
    isSymbol(expr) ||
    (expr.kind === 'product' && isNumberTimesLetter(expr)) ||
    expr.kind === 'root' ||
    (expr.kind === 'quotient' && expr.written === 'fraction');
  return isLast && isShort ? (/^[a-zA-Z0-9]/.test(text) ? ` ${text}` : text) : bracket(text);
}

function isSymbol(expr: Expr): boolean {
  return expr.kind === 'letter' || expr.kind === 'constant' || (expr.kind === 'number' && isPlainNumber(expr));
}

function isPlainNumber(expr: NumberExpr): boolean {
  return expr.written === 'integer' || expr.written === 'decimal';
}

function isNumberTimesLetter(product: ProductExpr): boolean {
  const [first, second] = product.factors;
  return (
    product.factors.length === 2 &&
    product.joins[0] === 'implicit' &&
    first?.kind === 'number' &&
    isPlainNumber(first) &&
    (second?.kind === 'letter' || second?.kind === 'constant') &&
    !(second.kind === 'letter' && second.name === 'd')
  );
}

function printCalculus(
  expr: Extract<Expr, { kind: 'series' | 'derivative' | 'rate' | 'integral' | 'evaluated' | 'limit' }>,
  style: PrintStyle,
): string {
  switch (expr.kind) {
    case 'series': {
      const head = `\\${expr.operation === 'sum' ? 'sum' : 'prod'}_{${expr.index}=${print(expr.from, style)}}^{${print(expr.to, style)}}`;
      return glue(head, term(expr.body, binding(style, expr.index)));
    }
    case 'derivative':
      return printDerivative(expr, style);
    case 'rate': {
      const d = expr.partial ? '\\partial' : 'd';
      const power = expr.order > 1 ? `^{${expr.order}}` : '';
      return `\\frac{${glue(d + power, expr.of)}}{${glue(d, expr.by)}${power}}`;
    }
    case 'integral': {
      const bounds = expr.from && expr.to ? `_{${print(expr.from, style)}}^{${print(expr.to, style)}}` : '';
      const body = term(expr.integrand, { ...style, guardsD: true });
      return `${glue(`\\int${bounds}`, body)}\\,d${expr.variable}`;
    }
    case 'evaluated': {
      const name = expr.variable ? `${expr.variable}=` : '';
      const to = `{${expr.from ? '' : name}${print(expr.to, style)}}`;
      const scripts = expr.from ? `_{${name}${print(expr.from, style)}}^${to}` : `_${to}`;
      return `\\left[${print(expr.operand, style)}\\right]${scripts}`;
    }
    case 'limit': {
      const side = expr.side === 'both' ? '' : expr.side === 'left' ? '^{-}' : '^{+}';
      const to =
        side && expr.to.kind !== 'number' && expr.to.kind !== 'letter' && expr.to.kind !== 'constant'
          ? bracket(print(expr.to, style))
          : print(expr.to, style);
      return glue(`\\lim_{${expr.variable}\\to ${to}${side}}`, term(expr.operand, binding(style, expr.variable)));
    }
  }
}

function binding(style: PrintStyle, name: string): PrintStyle {
  return name === 'i' ? { ...style, bindsI: true } : style;
}

function printDerivative(expr: Extract<Expr, { kind: 'derivative' }>, style: PrintStyle): string {
  const d = expr.partial ? '\\partial' : 'd';
  const power = expr.order > 1 ? `^{${expr.order}}` : '';
  const head = `\\frac{${d}${power}}{${glue(d, expr.variable)}${power}}`;
  const { operand } = expr;
  const isPlain =
    ['letter', 'power', 'quotient', 'root'].includes(operand.kind) &&
    !(operand.kind === 'quotient' && operand.written !== 'fraction');
  return head + (isPlain ? print(operand, style) : bracket(print(operand, style)));
}

function isLetter(code: number): boolean {
  return (code >= 97 && code <= 122) || (code >= 65 && code <= 90);
}
