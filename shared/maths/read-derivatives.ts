import type { Expr } from './expression.ts';
import type { Reader } from './reader.ts';
import type { Token } from './scanner.ts';

/** `\frac{d}{dx}`, `\frac{dy}{dx}`, `\frac{\partial f}{\partial x}` and their like; null for an ordinary fraction. */
export function readDerivativeFraction(reader: Reader): Expr | null {
  const shape = derivativeShape(reader);
  if (!shape) return null;
  const { start } = reader.token;
  reader.next();
  const braced = reader.take('{');
  reader.next();
  const above = readOrder(reader);
  const rest = braced && !reader.is('}') ? readRest(reader) : null;
  if (braced) reader.expect('}', 'missing-bracket', '}');
  reader.next();
  reader.next();
  const by = readVariable(reader);
  const below = readOrder(reader);
  reader.expect('}', 'missing-bracket', '}');
  if (above !== below) reader.fail('bad-derivative', [String(above)], { start, end: reader.lastEnd });
  return finish(reader, { start, by, order: above, partial: shape.text === '\\partial', rest });
}

/** `d/dx` and `dy/dx` as typed, at the d. */
export function readPlainDerivative(reader: Reader): Expr | null {
  const isOperator = reader.peek(1).kind === '/';
  const slash = isOperator ? 1 : 2;
  if (!isOperator && (reader.peek(1).kind !== 'letter' || reader.peek(2).kind !== '/')) return null;
  if (reader.peek(slash + 1).text !== 'd' || reader.peek(slash + 2).kind !== 'letter') return null;
  const { start } = reader.next();
  const rest = isOperator ? null : reader.grammar.atoms.letter!(reader);
  reader.next();
  reader.next();
  const by = readVariable(reader);
  return finish(reader, { start, by, order: 1, partial: false, rest });
}

interface Operator {
  readonly start: number;
  readonly by: string;
  readonly order: number;
  readonly partial: boolean;
  readonly rest: Expr | null;
}

function finish(reader: Reader, operator: Operator): Expr {
  const { start, by, order, partial, rest } = operator;
  if (rest?.kind === 'letter') {
    const rate: Expr = { kind: 'rate', of: rest.name, by, order, span: reader.span(start) };
    return partial ? { ...rate, partial } : rate;
  }
  const operand = rest ?? reader.binding(by, () => readOperand(reader));
  return { kind: 'derivative', variable: by, order, partial, operand, span: reader.span(start) };
}

function readRest(reader: Reader): Expr {
  return reader.inside((inner) => inner.grammar.product(inner));
}

/** Brackets hold the whole operand; without them it is the product that follows. */
function readOperand(reader: Reader): Expr {
  reader.enter();
  const { kind } = reader.token;
  let operand: Expr;
  if (kind !== '(' && kind !== '[') operand = reader.grammar.product(reader);
  else {
    operand = reader.grammar.power(reader);
    if (reader.startsFactor() && reader.choose('operand')) operand = reader.grammar.product(reader, operand);
  }
  reader.leave();
  return operand;
}

function readVariable(reader: Reader): string {
  const { token } = reader;
  reader.next();
  if (!reader.is('_')) return token.text;
  reader.next();
  const digit = reader.next();
  return digit.text.length === 1 ? `${token.text}_${digit.text}` : reader.fail('bad-derivative', ['dx'], digit);
}

function readOrder(reader: Reader): number {
  if (!reader.take('^')) return 1;
  const braced = reader.take('{');
  if (!reader.is('number')) return reader.fail('bad-derivative', ['2']);
  const { text } = braced ? reader.next() : reader.takeDigit();
  if (braced) reader.expect('}', 'missing-bracket', '}');
  const order = Number(text);
  return order >= 1 && order <= 20 ? order : reader.fail('bad-derivative', ['2']);
}

/** Looks ahead from a `\frac`: the d or rounded d that stands above and below, if so. */
function derivativeShape(reader: Reader): Token | null {
  let at = 1;
  const braced = reader.peek(at).kind === '{';
  if (braced) at += 1;
  const top = reader.peek(at);
  if (top.kind !== 'letter' || (top.text !== 'd' && top.text !== '\\partial')) return null;
  at += 1;
  if (braced) at = closing(reader, at) + 1;
  if (reader.peek(at).kind !== '{' || reader.peek(at + 1).text !== top.text || reader.peek(at + 2).kind !== 'letter') {
    return null;
  }
  let end = at + 3;
  if (reader.peek(end).kind === '_') end += 2;
  if (reader.peek(end).kind === '^') end += reader.peek(end + 1).kind === '{' ? 4 : 2;
  return reader.peek(end).kind === '}' ? top : null;
}

/** Index, ahead of here, of the brace that closes the group that is open at `from`. */
function closing(reader: Reader, from: number): number {
  let depth = 1;
  for (let at = from; ; at += 1) {
    const { kind } = reader.peek(at);
    if (kind === '{') depth += 1;
    else if (kind === '}') depth -= 1;
    if (depth === 0 || kind === 'end-of-line') return at;
  }
}
