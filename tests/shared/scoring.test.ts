import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { chanceSaid, forecastOf, pointsOf, shownPoints, stakesOf, type Truth } from '../../shared/lib/scoring.ts';
import { FINDING_POINTS } from './scoring-cases.ts';

const stepsIn = fc.integer({ min: 2, max: 400 });
const tenthsIn = fc.integer({ min: 0, max: 8 });

/** The definition itself, in floating point: 100 (|E - truth|^2 - |forecast - truth|^2). */
function byDefinition(pick: number | 'none', tenths: number, truth: Truth, steps: number): number {
  const at = truth === 'none' ? 0 : truth;
  const distance = (belief: readonly number[]) =>
    belief.reduce((sum, value, choice) => sum + (value - (choice === at ? 1 : 0)) ** 2, 0);
  return 100 * (distance(forecastOf(null, 0, steps)) - distance(forecastOf(pick, tenths, steps)));
}

describe('points of a finding', () => {
  it.each(FINDING_POINTS)('agrees with the outside table at n = $steps, s = $sureness', (row) => {
    const tenths = Math.round(row.sureness * 10);
    const step = stakesOf(1, tenths, row.steps);
    const none = stakesOf('none', tenths, row.steps);
    expect(step.right).toBe(toFourDecimals(row.stepRight));
    expect(step.anotherStep).toBe(toFourDecimals(row.stepAnotherIsIt));
    expect(step.noFault).toBe(toFourDecimals(row.stepNoneIsIt));
    expect(none.right).toBe(toFourDecimals(row.noFaultRight));
    expect(none.anotherStep).toBe(toFourDecimals(row.noFaultWrong));
  });

  // The worked values of the product's rules, n = 5.
  it.each([
    [2, 39.6, -0.4, -16.4, 10.8, -13.2],
    [5, 82.5, -17.5, -57.5, 22.5, -37.5],
    [8, 105.6, -54.4, -118.4, 28.8, -67.2],
  ])('gives the worked values at %i tenths exactly', (tenths, right, other, none, noneRight, noneWrong) => {
    expect(stakesOf(3, tenths, 5)).toEqual({ right, anotherStep: other, noFault: none });
    expect(stakesOf('none', tenths, 5)).toEqual({ right: noneRight, anotherStep: noneWrong, noFault: null });
  });

  it('follows the definition for every length, pick and truth', () => {
    fc.assert(
      fc.property(stepsIn, tenthsIn, fc.nat(), fc.nat(), (steps, tenths, a, b) => {
        const pick = choice(a, steps);
        const truth = choice(b, steps);
        expect(pointsOf(pick, tenths, truth, steps)).toBeCloseTo(byDefinition(pick, tenths, truth, steps), 3);
      }),
    );
  });

  it('earns most on average for the sureness that one honestly has', () => {
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 40 }), tenthsIn, fc.nat(), (steps, honest, a) => {
        const pick = choice(a, steps);
        const belief = forecastOf(pick, honest, steps);
        const expected = (tenths: number) =>
          belief.reduce((sum, chance, at) => sum + chance * pointsOf(pick, tenths, at === 0 ? 'none' : at, steps), 0);
        const best = Math.max(...Array.from({ length: 9 }, (_, tenths) => expected(tenths)));
        expect(expected(honest)).toBeGreaterThanOrEqual(best - 1e-3);
      }),
    );
  });

  it('never pays for a fixed habit against the even start', () => {
    fc.assert(
      fc.property(stepsIn, tenthsIn, fc.nat(), (steps, tenths, a) => {
        const pick = choice(a, steps);
        const mean = forecastOf(null, 0, steps).reduce(
          (sum, chance, at) => sum + chance * pointsOf(pick, tenths, at === 0 ? 'none' : at, steps),
          0,
        );
        expect(mean).toBeLessThanOrEqual(1e-3);
      }),
    );
  });

  it('gives nothing for "can\'t tell"', () => {
    expect(pointsOf(null, 0, 2, 5)).toBe(0);
    expect(pointsOf(2, 0, 2, 5)).toBe(0);
    expect(pointsOf(null, 0, 'none', 5)).toBe(0);
  });

  it('refuses what is not on the scale and what is never dealt', () => {
    expect(() => pointsOf(1, 9, 1, 5)).toThrow(RangeError);
    expect(() => pointsOf(1, 2.5, 1, 5)).toThrow(RangeError);
    expect(() => pointsOf(1, 2, 1, 1)).toThrow(RangeError);
  });
});

describe('what people see', () => {
  it.each([
    [82.5, 83],
    [-17.5, -18],
    [-57.5, -58],
    [0.4999, 0],
    [-0.4999, 0],
    [-0.5, -1],
    [22.4545, 22],
  ])('shows %d as %i, half away from zero', (points, shown) => {
    expect(shownPoints(points)).toBe(shown);
  });

  it('never shows a minus before nothing', () => {
    expect(Object.is(shownPoints(-0.4), -0)).toBe(false);
  });

  it('knows the chance that a sureness stands for', () => {
    expect(chanceSaid('none', 0, 5)).toBe(0.5);
    expect(chanceSaid(2, 8, 5)).toBeCloseTo(0.82, 10);
    expect(forecastOf(2, 5, 4).reduce((sum, chance) => sum + chance, 0)).toBeCloseTo(1, 12);
  });
});

/** The table keeps six decimals; the points four, half away from zero. */
function toFourDecimals(value: number): number {
  return (Math.sign(value) * Math.round(Math.abs(Math.round(value * 1e6)) / 100)) / 10_000 || 0;
}

function choice(raw: number, steps: number): Truth {
  const at = raw % (steps + 1);
  return at === 0 ? 'none' : at;
}
