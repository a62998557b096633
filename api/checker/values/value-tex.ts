import { ballSign, certainBits, magnitude } from '../numbers/ball.ts';
import type { Ball } from '../numbers/ball.ts';
import * as Q from '../numbers/rational.ts';
import type { Value } from './value.ts';

export const usualDigits = 6;

/** Exact where the value is and short enough to read; else rounded to so many significant digits. */
export function valueTex(value: Value, bits: number, digits = usualDigits): string {
  switch (value.kind) {
    case 'rational':
      return rationalTex(value.value, digits);
    case 'pi':
      return piTex(value.value);
    case 'gaussian':
      return complexTex(Q.isZero(value.re) ? null : rationalTex(value.re, digits), unitTex(value.im, digits));
    case 'ball':
      return value.im === null ? decimalTex(value.re, bits, digits) : complexBallTex(value.re, value.im, bits, digits);
    case 'undefined':
    case 'unknown':
      return '\\text{--}';
  }
}

/** Fractions too long to read are shown as decimals. */
function rationalTex(value: Q.Rational, digits: number): string {
  const tex = Q.toTex(value);
  if (tex.length <= 40) return tex;
  const bits = Math.max(64, Q.bitLength(value.den) - Q.bitLength(value.num) + 64);
  return decimalTex({ mid: (value.num << BigInt(bits)) / value.den, rad: 1n }, bits, digits);
}

function piTex(value: Q.Rational): string {
  const sign = value.num < 0n ? '-' : '';
  const { num, den } = Q.absolute(value);
  const top = num === 1n ? '\\pi' : `${num}\\pi`;
  return den === 1n ? `${sign}${top}` : `${sign}\\frac{${top}}{${den}}`;
}

function unitTex(im: Q.Rational, digits: number): string {
  if (Q.equals(im, Q.one)) return 'i';
  if (Q.equals(im, Q.minusOne)) return '-i';
  return `${rationalTex(im, digits)}i`;
}

function complexTex(re: string | null, im: string): string {
  if (re === null) return im;
  return im.startsWith('-') ? `${re}${im}` : `${re}+${im}`;
}

/** A part that holds zero is left out. */
function complexBallTex(re: Ball, im: Ball, bits: number, digits: number): string {
  const unit = ballSign(im) === 0 ? '0' : `${decimalTex(im, bits, digits)}i`;
  if (ballSign(re) === 0) return unit;
  return unit === '0' ? decimalTex(re, bits, digits) : complexTex(decimalTex(re, bits, digits), unit);
}

/** Rounded to significant digits, all certain where the ball is narrow enough. */
function decimalTex(ball: Ball, bits: number, digits: number): string {
  if (ball.mid === 0n || certainBits(ball) < 4) return '0';
  const sign = ball.mid < 0n ? '-' : '';
  const size = magnitude(ball.mid);
  const exponent = decimalExponent(size, bits);
  if (exponent > Math.max(9, digits - 1) || exponent < -5) return sign + scientificTex(size, bits, exponent, digits);
  const places = Math.max(0, digits - 1 - exponent);
  const scaled = roundShift(size * 10n ** BigInt(places), bits)
    .toString()
    .padStart(places + 1, '0');
  const whole = scaled.slice(0, scaled.length - places);
  const rest = scaled.slice(scaled.length - places).replace(/0+$/, '');
  return sign + (rest === '' ? whole : `${whole}.${rest}`);
}

/** The largest k with 10^k at most the number. */
function decimalExponent(size: bigint, bits: number): number {
  const guess = Math.floor((Q.bitLength(size) - 1 - bits) * Math.log10(2));
  const next = 10n ** BigInt(Math.abs(guess + 1));
  const reaches = guess + 1 >= 0 ? size >= next << BigInt(bits) : size * next >= 1n << BigInt(bits);
  return reaches ? guess + 1 : guess;
}

function roundShift(value: bigint, bits: number): bigint {
  return bits === 0 ? value : (value + (1n << BigInt(bits - 1))) >> BigInt(bits);
}

function scientificTex(size: bigint, bits: number, exponent: number, shown: number): string {
  const places = shown - 1 - exponent;
  const unit = places >= 0 ? 1n << BigInt(bits) : (10n ** BigInt(-places)) << BigInt(bits);
  const scaled = (2n * size * 10n ** BigInt(Math.max(0, places)) + unit) / (2n * unit);
  const digits = scaled.toString();
  const shift = digits.length - shown;
  const rest = digits.slice(1, shown).replace(/0+$/, '');
  return `${digits[0]}${rest === '' ? '' : `.${rest}`}\\cdot 10^{${exponent + shift}}`;
}
