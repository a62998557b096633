import type { Ball } from '../numbers/ball.ts';
import type { Rational } from '../numbers/rational.ts';

/** What an expression is worth at a point. */
export type Value =
  | RationalValue
  | PiValue
  | GaussianValue
  | BallValue
  /** Certainly no value there. */
  | { readonly kind: 'undefined' }
  | UnknownValue;

export interface RationalValue {
  readonly kind: 'rational';
  readonly value: Rational;
}
/** `value` times pi; never zero. */
export interface PiValue {
  readonly kind: 'pi';
  readonly value: Rational;
}
/** A complex number with rational parts; `im` is never zero. */
export interface GaussianValue {
  readonly kind: 'gaussian';
  readonly re: Rational;
  readonly im: Rational;
}
/** A number known to within the radius of the ball; `im` null for a real number. */
export interface BallValue {
  readonly kind: 'ball';
  readonly re: Ball;
  readonly im: Ball | null;
}
export interface UnknownValue {
  readonly kind: 'unknown';
  /** 'precision': more bits may tell; the others stay unknown. */
  readonly reason: 'precision' | 'not-covered' | 'no-agreed-meaning' | 'limit';
}

export type KnownValue = RationalValue | PiValue | GaussianValue | BallValue;

/** Values of the letters. */
export type Point = ReadonlyMap<string, KnownValue>;
