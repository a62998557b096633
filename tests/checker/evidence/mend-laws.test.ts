import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Verdict } from '../../../shared/schemas/verdict.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

/** A given, a line that is right, and a line after it; then one number, sign or letter of the middle line is changed. */
interface Corrupted {
  readonly lines: readonly string[];
}

const small = fc.integer({ min: 2, max: 9 });
const name = fc.constantFrom('x', 'y', 't', 'n');

const rightLines = fc.oneof(
  fc
    .tuple(name, small, small, small)
    .map(([x, a, b, c]) => [
      `${a}(${b}${x}+${c})-${b}${x}`,
      `${a * b}${x}+${a * c}-${b}${x}`,
      `${a * b - b}${x}+${a * c}`,
    ]),
  fc.tuple(name, small, small).map(([x, a, b]) => [`(${x}+${a})(${x}-${b})`, `${x}^2-${b}${x}+${a}${x}-${a * b}`]),
  fc
    .tuple(name, small, small, small)
    .map(([x, a, b, c]) => [`${a}${x}+${b}=${c}`, `${a}${x}=${c - b}`, `${x}=\\frac{${c - b}}{${a}}`]),
  fc
    .tuple(name, small, small)
    .map(([x, a, b]) => [`(${x}-${a})(${x}-${b + 8})=0`, `${x}=${a}\\text{ or }${x}=${b + 8}`]),
  fc.tuple(name, small, small).map(([x, a, b]) => [`-${a}${x}<${a * b}`, `${x}>-${b}`]),
  fc.tuple(name, small, small).map(([x, a, b]) => [`\\frac{d}{d${x}}(${a}${x}^3+${b}${x})`, `${3 * a}${x}^2+${b}`]),
  fc
    .tuple(name, small, small)
    .map(([x, a, b]) => [`\\frac{${a}}{${x}}+\\frac{${b}}{${x}}`, `\\frac{${a}+${b}}{${x}}`, `\\frac{${a + b}}{${x}}`]),
);

/** Changes the digit, sign or relation that stands at some place of a line, where there is one. */
function corrupt(tex: string, at: number): string {
  const tokens = [...tex.matchAll(/(?<![a-zA-Z\\])\d+|[+-]|<|>/g)];
  const token = tokens[at % Math.max(1, tokens.length)];
  if (!token) return tex;
  const [text] = token;
  const swapped: Record<string, string> = { '+': '-', '-': '+', '<': '>', '>': '<' };
  const changed = swapped[text] ?? String(Number(text) + 3);
  return tex.slice(0, token.index) + changed + tex.slice(token.index + text.length);
}

const corrupted: fc.Arbitrary<Corrupted> = fc.tuple(rightLines, fc.nat(12)).map(([lines, at]) => {
  const [given, first, ...rest] = lines;
  return { lines: [given ?? '', corrupt(first ?? '', at), ...rest] };
});

function check(lines: readonly string[]): Verdict {
  return checkDerivation({ lines, assume: [], settings: {} });
}

function rulingOf(lines: readonly string[]): string | undefined {
  return check(lines).steps[lines.length - 2]?.ruling;
}

const runs = { seed: 23, numRuns: 120 };

describe('laws of the evidence', { timeout: 60_000 }, () => {
  it('a mended line always holds, and so does the line with its wrong part replaced', () => {
    let mendedCount = 0;
    let faults = 0;
    fc.assert(
      fc.property(corrupted, ({ lines }) => {
        const verdict = check(lines);
        for (const { step, ruling, evidence } of verdict.steps) {
          if (ruling !== 'fails') {
            expect(evidence.mended ?? evidence.wrongPart ?? evidence.slip ?? evidence.mendedEnding).toBeUndefined();
            continue;
          }
          faults += 1;
          const before = lines.slice(0, step);
          const { mended, wrongPart } = evidence;
          if (!mended) continue;
          mendedCount += 1;
          expect(rulingOf([...before, mended.line])).toBe('holds');
          for (const { start, end } of mended.changed) expect(start < end && end <= mended.line.length).toBe(true);
          if (!wrongPart) continue;
          const tex = lines[step] ?? '';
          expect(tex.slice(wrongPart.span.start, wrongPart.span.end).trim()).toBe(wrongPart.is);
          const bare = wrongPart.span.start === 0 ? wrongPart.shouldBe.replace(/^\+/, '') : wrongPart.shouldBe;
          const replaced = `${tex.slice(0, wrongPart.span.start)} ${bare} ${tex.slice(wrongPart.span.end)}`;
          expect(rulingOf([...before, replaced])).toBe('holds');
        }
      }),
      runs,
    );
    expect(mendedCount / faults).toBeGreaterThan(0.95);
  });

  it('every line of a mended ending holds from the one before', () => {
    fc.assert(
      fc.property(corrupted, ({ lines }) => {
        const { firstFault, steps } = check(lines);
        const ending = firstFault === null ? undefined : steps[firstFault - 1]?.evidence.mendedEnding;
        if (firstFault === null || !ending) return;
        expect(ending).toHaveLength(lines.length - firstFault);
        expect(check([...lines.slice(0, firstFault), ...ending]).outcome).toBe('sound');
      }),
      runs,
    );
  });

  it('the same derivation gives the same evidence, whatever was checked in between', () => {
    fc.assert(
      fc.property(corrupted, corrupted, ({ lines }, other) => {
        const first = check(lines);
        check(other.lines);
        check(['\\frac{x+9}{x+6}', '\\frac{3}{2}']);
        expect(check(lines)).toEqual(first);
      }),
      { ...runs, numRuns: 40 },
    );
  });
});
