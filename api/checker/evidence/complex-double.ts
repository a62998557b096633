/** A complex number in doubles: good for putting candidates aside, never for a ruling. */
export interface Complex {
  readonly re: number;
  readonly im: number;
}

export const missing: Complex = { re: NaN, im: NaN };

export function real(re: number): Complex {
  return { re, im: 0 };
}

export function isFiniteNumber(a: Complex): boolean {
  return Number.isFinite(a.re) && Number.isFinite(a.im);
}

export function plus(a: Complex, b: Complex): Complex {
  return { re: a.re + b.re, im: a.im + b.im };
}

export function minus(a: Complex, b: Complex): Complex {
  return { re: a.re - b.re, im: a.im - b.im };
}

export function times(a: Complex, b: Complex): Complex {
  return { re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re };
}

export function over(a: Complex, b: Complex): Complex {
  if (b.im === 0) return { re: a.re / b.re, im: a.im / b.re };
  const size = b.re * b.re + b.im * b.im;
  return { re: (a.re * b.re + a.im * b.im) / size, im: (a.im * b.re - a.re * b.im) / size };
}

export function sizeOf(a: Complex): number {
  return Math.hypot(a.re, a.im);
}

export function expOf(a: Complex): Complex {
  const size = Math.exp(a.re);
  return a.im === 0 ? real(size) : { re: size * Math.cos(a.im), im: size * Math.sin(a.im) };
}

/** The principal branch. */
export function logOf(a: Complex): Complex {
  return { re: Math.log(sizeOf(a)), im: Math.atan2(a.im, a.re) };
}

export function rootOf(a: Complex): Complex {
  if (a.im === 0) return a.re >= 0 ? real(Math.sqrt(a.re)) : { re: 0, im: Math.sqrt(-a.re) };
  return expOf(times(real(0.5), logOf(a)));
}

export function powerOf(a: Complex, exponent: Complex): Complex {
  if (exponent.im === 0 && Number.isInteger(exponent.re) && Math.abs(exponent.re) <= 64)
    return wholePower(a, exponent.re);
  if (a.im === 0 && exponent.im === 0 && a.re > 0) return real(a.re ** exponent.re);
  if (a.re === 0 && a.im === 0) return exponent.re > 0 ? real(0) : missing;
  return expOf(times(exponent, logOf(a)));
}

function wholePower(a: Complex, exponent: number): Complex {
  if (a.im === 0) return real(a.re ** exponent);
  let result = real(1);
  for (let k = 0; k < Math.abs(exponent); k += 1) result = times(result, a);
  return exponent < 0 ? over(real(1), result) : result;
}

export function sineOf(a: Complex): Complex {
  if (a.im === 0) return real(Math.sin(a.re));
  return { re: Math.sin(a.re) * Math.cosh(a.im), im: Math.cos(a.re) * Math.sinh(a.im) };
}

export function cosineOf(a: Complex): Complex {
  if (a.im === 0) return real(Math.cos(a.re));
  return { re: Math.cos(a.re) * Math.cosh(a.im), im: -Math.sin(a.re) * Math.sinh(a.im) };
}

/** Agreement to about ten digits, measured against the larger of the two. */
export function isNear(a: Complex, b: Complex): boolean {
  const scale = Math.max(1e-3, sizeOf(a), sizeOf(b));
  return sizeOf(minus(a, b)) <= 1e-9 * scale;
}
