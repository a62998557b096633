import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { SLIP_KINDS } from '../../../shared/schemas/finding.ts';
import { createContext } from '../../../api/checker/context.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import { allSlips } from '../../../api/checker/slips/catalogue.ts';
import { nameSlip } from '../../../api/checker/slips/name-slip.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { embeddedCases } from './embedded-cases.ts';
import { otherCases } from './other-cases.ts';
import document from './slip-cases.json';

const r = String.raw;

function slipOf(above: string, below: string): string | null {
  const verdict = checkDerivation({ lines: [above, below], assume: [], settings: {} });
  return verdict.steps[0]?.evidence.slip?.id ?? null;
}

/** Pairs on which the checker rules no fault: a note, a remark, a sign that stands for two values. They are named all the same when asked. */
const noFault = new Set(['slip-063', 'slip-073', 'slip-116', 'slip-122', 'slip-125', 'slip-129']);

function nameOf(above: string, below: string): string | null {
  const [first, second] = [readLine(above), readLine(below)];
  if (!first.ok || !second.ok) return null;
  return nameSlip(first.line, second.line, createContext(), () => false)?.id ?? null;
}

describe('the catalogue', () => {
  it('has each slip once, with a kind of the short list, a name and a source', () => {
    expect(new Set(allSlips.map((slip) => slip.id)).size).toBe(allSlips.length);
    for (const slip of allSlips) {
      expect(SLIP_KINDS).toContain(slip.kind);
      expect(slip.id).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*$/);
      expect(slip.source.length).toBeGreaterThan(5);
    }
  });

  it('covers every documented mistake that can be put as two lines', () => {
    expect(document.cases.length + document.notTwoLines.length).toBe(131);
    for (const { slip } of document.cases) expect(allSlips.map(({ id }) => id)).toContain(slip);
  });
});

describe('naming a slip', { timeout: 120_000 }, () => {
  const failing = document.cases.filter(({ entry }) => !noFault.has(entry));

  it('names the right one for every documented mistake that is a fault', () => {
    const missed = failing.filter(({ before, wrong, slip }) => slipOf(before, wrong) !== slip);
    expect(
      missed.map(({ entry, before, wrong }) => `${entry}: ${before} to ${wrong}: ${slipOf(before, wrong)}`),
    ).toEqual([]);
  });

  it.each(document.cases.filter(({ entry }) => noFault.has(entry)))(
    '$entry: names it as well where the step is no fault by the rules',
    ({ before, wrong, slip }) => {
      expect(nameOf(before, wrong)).toBe(slip);
    },
  );

  it.each(otherCases)('names what happened from %s to %s', (above, below, begins) => {
    expect(slipOf(above, below)).toMatch(new RegExp(`^${begins}`));
  });

  it('names the right one inside longer lines', () => {
    const wanted = new Map(document.cases.map(({ entry, slip }) => [entry, slip]));
    const missed = embeddedCases.flatMap(([entry, above, below, unknown]) => {
      const { steps } = checkDerivation({ lines: [above, below], assume: [], settings: unknown ? { unknown } : {} });
      const found = steps[0]?.ruling === 'fails' ? (steps[0].evidence.slip?.id ?? null) : nameOf(above, below);
      return found === wanted.get(entry) ? [] : [`${entry}: ${above} to ${below}: ${found}`];
    });
    expect(missed).toEqual([]);
  });

  it.each([
    [r`\cos(3t)+x^2`, r`x^2+4\cos^3t+3\cos t`],
    [r`\frac{13x+18}{(x+1)(x+2)}-7`, r`\frac{8}{x+2}+\frac{3}{x+1}-7`],
    [r`\frac{3^{n+1}}{3^n}`, '1'],
    [r`\frac{\sqrt a-3}{a-9}`, r`\frac{0}{\sqrt a+3}`],
    ['|1-x|', '|x+1|'],
    [r`\ln7776-x^2`, r`5\ln6+x^2`],
    ['|2x-8|=6', r`2x-8=6\text{ or }2x+8=-6`],
  ])('names none for what only happens to come to the same, from %s to %s', (above, below) => {
    expect(slipOf(above, below)).toBeNull();
  });

  it('names none where no rule explains the line', () => {
    expect(slipOf('3(x+2)', '71x-19')).toBeNull();
    expect(slipOf('x^2-5x+6=0', 'x=17')).toBeNull();
  });

  it('does not depend on the names of the letters', () => {
    const letters = fc.constantFrom('t', 'u', 'v', 'w', 'y', 'z', 'p', 'q');
    const onlyX = failing.filter(
      ({ before, wrong }) => !/[a-wyz]/.test(before.replaceAll(/\\[a-z]+/g, '') + wrong.replaceAll(/\\[a-z]+/g, '')),
    );
    fc.assert(
      fc.property(fc.constantFrom(...onlyX), letters, ({ before, wrong, slip }, name) => {
        const renamed = (tex: string): string =>
          tex.replaceAll(/\\[a-zA-Z]+|x/g, (token) => (token === 'x' ? ` ${name}` : token));
        expect(slipOf(renamed(before), renamed(wrong))).toBe(slip);
      }),
      { seed: 5, numRuns: 40 },
    );
  });

  it('names none on a step that holds', () => {
    const small = fc.integer({ min: 1, max: 9 });
    fc.assert(
      fc.property(small, small, small, (a, b, c) => {
        const verdict = checkDerivation({
          lines: [`${a}x-${b}(x-${c})`, `${a}x-${b}x+${b * c}`, `(${a}-${b})x+${b * c}`],
          assume: [],
          settings: {},
        });
        expect(verdict.outcome).toBe('sound');
        expect(verdict.steps.every((step) => step.evidence.slip === undefined)).toBe(true);
      }),
      { seed: 11, numRuns: 60 },
    );
  });
});
