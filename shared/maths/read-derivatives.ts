import type { Expr } from './expression.ts';
import { readAtom } from './read-arguments.ts';
import { readProduct } from './read-expression.ts';
import { readPower } from './read-power.ts';
import {
  ahead,
  binding,
  choose,
  expect,
  fail,
  groupAhead,
  inside,
  is,
  lastEnd,
  next,
  peek,
  skip,
  span,
  start,
  startsFactor,
  take,
  takeDigit,
} from './reader.ts';

/** `\frac{d}{dx}`, `\frac{dy}{dx}`, `\frac{\partial f}{\partial x}` and their like; null for an ordinary fraction. */
export const readDerivativeFraction = (from: number): Expr | null => {
  const sign = derivativeSign();
  if (!sign) return null;
  const isBraced = take('{');
  next();
  const order = readOrder();
  const rest = isBraced && !is('}') ? inside(readProduct) : null;
  if (isBraced) expect('}');
  skip(2);
  const by = readVariable();
  const below = readOrder();
  const inner = sign === '\\partial' ? readFurther() : [];
  expect('}');
  const total = inner.reduce((sum, one) => sum + one.order, below);
  if (order !== total) fail(`order ${order}`, { start: from, end: lastEnd });
  if (inner.length === 0) return finish(from, by, order, rest, sign === '\\partial');
  const operand = inner.reduceRight<Expr | null>((part, one) => finish(from, one.by, one.order, part, true), rest);
  return { kind: 'derivative', variable: by, order: below, partial: true, operand: operand as Expr, span: span(from) };
};

/** The letters behind the first one below a mixed partial derivative; the last one comes first when it is carried out. */
const readFurther = (): { by: string; order: number }[] => {
  const found: { by: string; order: number }[] = [];
  while (is('a')) {
    if (next().text !== '\\partial') fail('order dx');
    found.push({ by: readVariable(), order: readOrder() });
  }
  return found;
};

/** `d/dx` and `dy/dx` as typed, behind the d. */
export const readPlainDerivative = (from: number): Expr | null => {
  const { length } = ahead(/a?\//y);
  if (!length || peek(length).text !== 'd' || peek(length + 1).kind !== 'a') return null;
  const rest = is('/') ? null : readAtom();
  skip(2);
  return finish(from, readVariable(), 1, rest, false);
};

const finish = (from: number, by: string, order: number, rest: Expr | null, partial: boolean): Expr => {
  if (rest?.kind === 'letter') {
    const rate: Expr = { kind: 'rate', of: rest.name, by, order, span: span(from) };
    return partial ? { ...rate, partial } : rate;
  }
  const operand = rest ?? binding(by, readOperand);
  return { kind: 'derivative', variable: by, order, partial, operand, span: span(from) };
};

/** Brackets hold the whole operand; without them it is the product that follows. */
const readOperand = (): Expr => {
  if (!is('([')) return readProduct();
  const from = start;
  const operand = readPower();
  return startsFactor() && choose('operand') ? readProduct(from, operand) : operand;
};

const readVariable = (): string => {
  const { text } = next();
  if (!take('_')) return text;
  const index = next();
  return index.text[1] ? fail('order dx', index) : `${text}_${index.text}`;
};

const readOrder = (): number => {
  if (!take('^')) return 1;
  const isBraced = take('{');
  if (!is('0')) fail('order 2');
  const order = Number((isBraced ? next() : takeDigit()).text);
  if (isBraced) expect('}');
  return order >= 1 && order <= 20 ? order : fail('order 2');
};

/** Looks ahead from behind a `\frac`: the d or rounded d that stands above and below; empty where none does. */
const derivativeSign = (): string => {
  const isBraced = is('{');
  const { kind, text } = peek(isBraced ? 1 : 0);
  if (kind !== 'a' || (text !== 'd' && text !== '\\partial')) return '';
  const below = isBraced ? groupAhead().end + 1 : 1;
  const fits =
    peek(below + 1).text === text &&
    ahead(text === 'd' ? /\{.a(?:_.)?(?:\^\{..|\^.)?\}/y : /\{(?:aa(?:_.)?(?:\^\{..|\^.)?)+\}/y, below);
  return fits ? text : '';
};
