import { certainBits, magnitude } from '../numbers/ball.ts';
import type { Ball } from '../numbers/ball.ts';
import * as Q from '../numbers/rational.ts';
import type { Value } from './value.ts';

const shownDigits = 6;

/** Exact where the value is; else decimals, all of them certain, with an approximation sign left to the reader. */
export function valueTex(value: Value, bits: number): string {
  switch (value.kind) {
    case 'rational':
      return rationalTex(value.value);
    case 'pi':
      return piTex(value.value);
    case 'gaussian':
      return complexTex(Q.isZero(value.re) ? null : rationalTex(value.re), unitTex(value.im));
    case 'ball':
      return value.im === null ? decimalTex(value.re, bits) : complexTex(decimalTex(value.re, bits), `${decimalTex(value.im, bits)}i`);
    case 'undefined':
    case 'unknown':
      return '\\text{--}';
  }
}

/** Fractions too long to read are shown as decimals. */
function rationalTex(value: Q.Rational): string {
  const tex = Q.toTex(value);
  if (tex.length <= 40) return tex;
  const bits = Math.max(64, Q.bitLength(value.den) - Q.bitLength(value.num) + 64);
  return decimalTex({ mid: (value.num << BigInt(bits)) / value.den, rad: 1n }, bits);
}

function piTex(value: Q.Rational): string {
  const sign = value.num < 0n ? '-' : '';
  const { num, den } = Q.absolute(value);
  const top = num === 1n ? '\\pi' : `${num}\\pi`;
  return den === 1n ? `${sign}${top}` : `${sign}\\frac{${top}}{${den}}`;
}

function unitTex(im: Q.Rational): string {
  if (Q.equals(im, Q.one)) return 'i';
  if (Q.equals(im, Q.minusOne)) return '-i';
  return `${rationalTex(im)}i`;
}

function complexTex(re: string | null, im: string): string {
  if (re === null) return im;
  return im.startsWith('-') ? `${re}${im}` : `${re}+${im}`;
}

/** Rounded to significant digits, all certain where the ball is narrow enough. */
function decimalTex(ball: Ball, bits: number): string {
  if (ball.mid === 0n || certainBits(ball) < 4) return '0';
  const sign = ball.mid < 0n ? '-' : '';
  const size = magnitude(ball.mid);
  const exponent = Math.floor((Q.bitLength(size) - 1 - bits) * Math.log10(2));
  if (exponent > 9 || exponent < -5) return sign + scientificTex(size, bits, exponent);
  const places = Math.max(0, shownDigits - 1 - exponent);
  const scaled = roundShift(size * 10n ** BigInt(places), bits).toString().padStart(places + 1, '0');
  const whole = scaled.slice(0, scaled.length - places);
  const rest = scaled.slice(scaled.length - places).replace(/0+$/, '');
  return sign + (rest === '' ? whole : `${whole}.${rest}`);
}

function roundShift(value: bigint, bits: number): bigint {
  return bits === 0 ? value : (value + (1n << BigInt(bits - 1))) >> BigInt(bits);
}

function scientificTex(size: bigint, bits: number, exponent: number): string {
  const places = shownDigits - 1 - exponent;
  const scaled = places >= 0 ? roundShift(size * 10n ** BigInt(places), bits) : roundShift(size, bits) / 10n ** BigInt(-places);
  const digits = scaled.toString();
  const shift = digits.length - shownDigits;
  const rest = digits.slice(1, shownDigits).replace(/0+$/, '');
  return `${digits[0]}${rest === '' ? '' : `.${rest}`}\\cdot 10^{${exponent + shift}}`;
}
