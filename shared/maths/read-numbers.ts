import type { Expr, NumberExpr } from './expression.ts';
import type { Reader } from './reader.ts';
import type { Token } from './scanner.ts';

/** A number token with the percent sign after it, if any. */
export function readNumberAtom(reader: Reader): Expr {
  const token = reader.next();
  const number = numberFrom(token);
  if (!reader.take('%')) return { ...number, span: reader.span(token.start) };
  reader.flags.add('percent');
  return {
    ...lowest(number.numerator, number.denominator * 100n),
    written: 'percent',
    decimals: 0,
    span: reader.span(token.start),
  };
}

/** The value of the digits: `12`, `3.5`, `0.1(6)`. */
export function numberFrom(token: Pick<Token, 'text' | 'start' | 'end'>): NumberExpr {
  const { text } = token;
  const span = { start: token.start, end: token.end };
  const point = text.indexOf('.');
  if (point < 0)
    return { kind: 'number', numerator: BigInt(text), denominator: 1n, written: 'integer', decimals: 0, span };
  const open = text.indexOf('(');
  const fixed = text.slice(point + 1, open < 0 ? undefined : open);
  const whole = BigInt(text.slice(0, point) + fixed);
  const scale = 10n ** BigInt(fixed.length);
  if (open < 0) return { ...lowest(whole, scale), written: 'decimal', decimals: fixed.length, span };
  const period = text.slice(open + 1, -1);
  const nines = 10n ** BigInt(period.length) - 1n;
  return { ...lowest(whole * nines + BigInt(period), scale * nines), written: 'repeating', decimals: 0, span };
}

function lowest(numerator: bigint, denominator: bigint): Pick<NumberExpr, 'kind' | 'numerator' | 'denominator'> {
  let [a, b] = [numerator, denominator];
  while (b > 0n) [a, b] = [b, a % b];
  return { kind: 'number', numerator: numerator / a, denominator: denominator / a };
}

/** `2\frac12`: a whole number directly followed by a fraction of digits is their sum. */
export function mixedNumber(reader: Reader, whole: Expr, part: Expr): Expr | null {
  if (whole.kind !== 'number' || whole.written !== 'integer' || whole.bracketed) return null;
  if (part.kind !== 'quotient' || part.written !== 'fraction' || part.bracketed) return null;
  const { numerator: top, denominator: bottom } = part;
  if (top.kind !== 'number' || bottom.kind !== 'number' || bottom.numerator === 0n) return null;
  if (top.written !== 'integer' || bottom.written !== 'integer' || top.bracketed || bottom.bracketed) return null;
  reader.flags.add('mixed-number');
  return {
    ...lowest(whole.numerator * bottom.numerator + top.numerator, bottom.numerator),
    written: 'mixed',
    decimals: 0,
    span: reader.span(whole.span.start),
  };
}
