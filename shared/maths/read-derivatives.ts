import type { Expr } from './expression.ts';
import type { Reader } from './reader.ts';
import { groupAhead } from './look-ahead.ts';

/** `\frac{d}{dx}`, `\frac{dy}{dx}`, `\frac{\partial f}{\partial x}` and their like; null for an ordinary fraction. */
export function readDerivativeFraction(reader: Reader): Expr | null {
  const sign = derivativeSign(reader);
  if (!sign) return null;
  const { start } = reader.next();
  const isBraced = reader.take('{');
  reader.next();
  const order = readOrder(reader);
  const rest = isBraced && !reader.is('}') ? reader.inside((inner) => inner.grammar.product(inner)) : null;
  if (isBraced) reader.expect('}');
  reader.skip(2);
  const by = readVariable(reader);
  const below = readOrder(reader);
  reader.expect('}');
  if (order !== below) reader.fail(`bad-derivative ${order}`, { start, end: reader.lastEnd });
  return finish(reader, start, by, order, rest, sign === '\\partial');
}

/** `d/dx` and `dy/dx` as typed, at the d. */
export function readPlainDerivative(reader: Reader): Expr | null {
  const { length } = reader.ahead(/aa?\//y);
  if (!length || reader.peek(length).text !== 'd' || reader.peek(length + 1).kind !== 'a') return null;
  const { start } = reader.next();
  const rest = reader.is('/') ? null : reader.grammar.atoms.a!(reader);
  reader.skip(2);
  return finish(reader, start, readVariable(reader), 1, rest, false);
}

function finish(reader: Reader, start: number, by: string, order: number, rest: Expr | null, partial: boolean): Expr {
  if (rest?.kind === 'letter') {
    const rate: Expr = { kind: 'rate', of: rest.name, by, order, span: reader.span(start) };
    return partial ? { ...rate, partial } : rate;
  }
  const operand = rest ?? reader.binding(by, readOperand);
  return { kind: 'derivative', variable: by, order, partial, operand, span: reader.span(start) };
}

/** Brackets hold the whole operand; without them it is the product that follows. */
function readOperand(reader: Reader): Expr {
  const { product, power } = reader.grammar;
  if (!reader.is('([')) return product(reader);
  const operand = power(reader);
  return reader.startsFactor() && reader.choose('operand') ? product(reader, operand) : operand;
}

function readVariable(reader: Reader): string {
  const { text } = reader.next();
  if (!reader.take('_')) return text;
  const index = reader.next();
  return index.text.length === 1 ? `${text}_${index.text}` : reader.fail('bad-derivative dx', index);
}

function readOrder(reader: Reader): number {
  if (!reader.take('^')) return 1;
  const isBraced = reader.take('{');
  if (!reader.is('0')) reader.fail('bad-derivative 2');
  const order = Number((isBraced ? reader.next() : reader.takeDigit()).text);
  if (isBraced) reader.expect('}');
  return order >= 1 && order <= 20 ? order : reader.fail('bad-derivative 2');
}

/** Looks ahead from a `\frac`: the d or rounded d that stands above and below; empty where none does. */
function derivativeSign(reader: Reader): string {
  const isBraced = reader.ahead(/F\{/y) !== '';
  const { kind, text } = reader.peek(isBraced ? 2 : 1);
  if (kind !== 'a' || (text !== 'd' && text !== '\\partial')) return '';
  const below = isBraced ? groupAhead(reader, 1).end + 1 : 2;
  const fits = reader.peek(below + 1).text === text && reader.ahead(/\{.a(?:_.)?(?:\^\{..|\^.)?\}/y, below);
  return fits ? text : '';
}
