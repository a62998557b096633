import type { NumberExpr, ReadSettings } from './expression.ts';

/** The number in the form in which it was written. */
export function numberText(number: NumberExpr, decimal: ReadSettings['decimal']): string {
  const { numerator, denominator, written, decimals } = number;
  switch (written) {
    case 'integer':
      return String(numerator);
    case 'decimal':
      return withPoint(numerator, denominator, decimals, decimal);
    case 'percent':
      return `${percentText(numerator * 100n, denominator, decimal)}\\%`;
    case 'mixed':
      return mixedText(numerator, denominator);
    case 'repeating':
      return repeatingText(numerator, denominator, decimal);
  }
}

function point(decimal: ReadSettings['decimal']): string {
  return decimal === 'comma' ? '{,}' : '.';
}

function withPoint(numerator: bigint, denominator: bigint, decimals: number, decimal: ReadSettings['decimal']): string {
  const digits = String((numerator * 10n ** BigInt(decimals)) / denominator).padStart(decimals + 1, '0');
  return decimals === 0 ? digits : digits.slice(0, -decimals) + point(decimal) + digits.slice(-decimals);
}

/** A percentage has at most a finite decimal in front of its sign, as only such can be written. */
function percentText(numerator: bigint, denominator: bigint, decimal: ReadSettings['decimal']): string {
  for (let decimals = 0; decimals < 4000; decimals += 1) {
    if ((numerator * 10n ** BigInt(decimals)) % denominator === 0n)
      return withPoint(numerator, denominator, decimals, decimal);
  }
  return repeatingText(numerator, denominator, decimal);
}

function mixedText(numerator: bigint, denominator: bigint): string {
  if (denominator === 1n && numerator > 0n) return `${numerator - 1n}\\frac{1}{1}`;
  return `${numerator / denominator}\\frac{${numerator % denominator}}{${denominator}}`;
}

/** Long division until a remainder comes back. */
function repeatingText(numerator: bigint, denominator: bigint, decimal: ReadSettings['decimal']): string {
  const seen = new Map<bigint, number>();
  let digits = '';
  let remainder = numerator % denominator;
  while (!seen.has(remainder) && digits.length < 4000) {
    seen.set(remainder, digits.length);
    digits += String((remainder * 10n) / denominator);
    remainder = (remainder * 10n) % denominator;
  }
  const from = seen.get(remainder) ?? 0;
  return `${numerator / denominator}${point(decimal)}${digits.slice(0, from)}\\overline{${digits.slice(from)}}`;
}
