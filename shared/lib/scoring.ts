import { MAX_SURENESS } from '../schemas/finding.ts';

/** What is true of a derivation: its first fault, or that there is none. */
export type Truth = number | 'none';

/** What a reviewer says; null is "can't tell". */
export type Pick = number | 'none' | null;

/** Shortest derivation that is dealt. */
export const LEAST_STEPS = 2;

/**
 * Points of a pick by the quadratic rule (Brier, 1950; proper by Gneiting and Raftery, 2007):
 * 100 * (|E - truth|^2 - |forecast - truth|^2) over the n + 1 choices, where E is one half on "no fault" and 1/(2n) on
 * each step, and the forecast is (1 - s) * E + s * pick. Exact, then kept to four decimals (half away from zero).
 *
 * @param steps n, at least 2.
 * @param tenths How sure, 0 (can't tell) to 8 (certain); s is a tenth of it.
 */
export function pointsOf(pick: Pick, tenths: number, truth: Truth, steps: number): number {
  requireScale(tenths, steps);
  if (pick === null || tenths === 0) return 0;
  // Every term below is a whole number over 4n: 100 * s^2 and 100 * s are whole, and E is 2n or 2 over 4n.
  const whole = 4 * steps;
  const beat = evenStart(truth, steps);
  const b = steps + 1 + whole - 2 * beat;
  let sum = b * (20 * tenths - tenths * tenths);
  if (pick !== truth) {
    const misplaced = whole + evenStart(pick, steps) - beat;
    sum -= 2 * tenths * (10 - tenths) * misplaced + 2 * tenths * tenths * whole;
  }
  return roundedDivision(sum * 10_000, whole) / 10_000;
}

/** The reviewer's belief over the choices [no fault, step 1, ..., step n]. */
export function forecastOf(pick: Pick, tenths: number, steps: number): number[] {
  requireScale(tenths, steps);
  const share = pick === null ? 0 : tenths / 10;
  const even = [0.5, ...Array.from({ length: steps }, () => 1 / (2 * steps))];
  const picked = pick === 'none' ? 0 : pick;
  return even.map((part, choice) => (1 - share) * part + (choice === picked ? share : 0));
}

/** What a pick would earn in each case that can turn out. */
export interface Stakes {
  /** The pick is right. */
  readonly right: number;
  /** Another step is the first fault. */
  readonly anotherStep: number;
  /** There is no fault; null when "no fault" is what was picked. */
  readonly noFault: number | null;
}

/** The rows under the scale: what would be earned and what it could cost. */
export function stakesOf(pick: number | 'none', tenths: number, steps: number): Stakes {
  if (pick === 'none') {
    return {
      right: pointsOf('none', tenths, 'none', steps),
      anotherStep: pointsOf('none', tenths, 1, steps),
      noFault: null,
    };
  }
  const other = pick === 1 ? 2 : 1;
  return {
    right: pointsOf(pick, tenths, pick, steps),
    anotherStep: pointsOf(pick, tenths, other, steps),
    noFault: pointsOf(pick, tenths, 'none', steps),
  };
}

/** Points as people see them: whole, half away from zero. */
export function shownPoints(points: number): number {
  return roundedDivision(tenThousandths(points), 10_000);
}

/** A value of four decimals as a whole number, so that sums are exact. */
export function tenThousandths(points: number): number {
  return Math.round(points * 10_000);
}

/** Chance of being right that a sureness stands for: forecast on the pick itself. */
export function chanceSaid(pick: number | 'none', tenths: number, steps: number): number {
  return forecastOf(pick, tenths, steps)[pick === 'none' ? 0 : pick] ?? 0;
}

/** E of a choice, in units of 1 / (4n). */
function evenStart(choice: Truth, steps: number): number {
  return choice === 'none' ? 2 * steps : 2;
}

/** Nearest whole number to a / b (b > 0), half away from zero. */
export function roundedDivision(a: number, b: number): number {
  const magnitude = Math.abs(a);
  const floor = Math.floor(magnitude / b);
  const rounded = 2 * (magnitude - floor * b) >= b ? floor + 1 : floor;
  return a < 0 && rounded > 0 ? -rounded : rounded;
}

function requireScale(tenths: number, steps: number): void {
  if (!Number.isInteger(steps) || steps < LEAST_STEPS) throw new RangeError(`Not dealt: ${steps} steps`);
  if (!Number.isInteger(tenths) || tenths < 0 || tenths > MAX_SURENESS)
    throw new RangeError(`No such sureness: ${tenths}`);
}
