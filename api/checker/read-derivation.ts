import type { Expr, Line, ReadError, ReadSettings } from '../../shared/maths/expression.ts';
import { lettersOf } from '../../shared/maths/letters.ts';
import { readLine } from '../../shared/maths/read.ts';
import { childrenOf, exprsOf } from '../../shared/maths/walk.ts';
import type { DerivationInput } from '../../shared/schemas/verdict.ts';

/** A line as it was read, or why it could not be. */
export type ReadResult =
  | { readonly ok: true; readonly tex: string; readonly line: Line }
  | { readonly ok: false; readonly tex: string; readonly error: ReadError };

export interface ReadDerivation {
  readonly lines: readonly ReadResult[];
  readonly assumptions: readonly Line[];
  readonly numbers: 'real' | 'complex';
  readonly wholeLetters: ReadonlySet<string>;
  readonly settings: ReadSettings;
}

/** Reads all lines, each with the functions that the lines before it introduced. */
export function readDerivation(input: DerivationInput): ReadDerivation {
  const numbers = input.settings.numbers ?? guessNumbers(input);
  const decimal = input.settings.decimal ?? 'point';
  const functions: string[] = [];
  const read = (tex: string): ReadResult => {
    const reading = readLine(tex, { numbers, decimal, functions: [...functions] });
    if (!reading.ok) return { ok: false, tex, error: reading.error };
    for (const name of functionsIn(reading.line)) functions.push(name);
    return { ok: true, tex, line: reading.line };
  };
  const assumed = input.assume.map(read);
  const lines = input.lines.map(read);
  const assumptions = assumed.flatMap((result) => (result.ok ? [result.line] : []));
  const all = [...assumptions, ...lines.flatMap((result) => (result.ok ? [result.line] : []))];
  return {
    lines,
    assumptions,
    numbers,
    wholeLetters: new Set([...assumptions.flatMap(wholeByAssumption), ...all.flatMap(exprsOf).flatMap(wholeByUse)]),
    settings: { numbers, decimal, functions },
  };
}

/** Complex when the given has an i that no sum or subscript binds. */
function guessNumbers(input: DerivationInput): 'real' | 'complex' {
  const first = input.lines[0];
  if (first === undefined || !first.includes('i')) return 'real';
  const reading = readLine(first, { numbers: 'complex', decimal: input.settings.decimal ?? 'point', functions: [] });
  return reading.ok && exprsOf(reading.line).some(hasUnit) ? 'complex' : 'real';
}

function hasUnit(expr: Expr): boolean {
  return (expr.kind === 'constant' && expr.name === 'i') || childrenOf(expr).some(hasUnit);
}

function functionsIn(line: Line): string[] {
  if (line.kind === 'definition' && line.params.length > 0) return [line.name];
  return line.kind === 'all' || line.kind === 'any' ? line.parts.flatMap(functionsIn) : [];
}

function wholeByAssumption(line: Line): readonly string[] {
  if (line.kind === 'all') return line.parts.flatMap(wholeByAssumption);
  if (line.kind !== 'membership' || line.letter?.kind !== 'letter') return [];
  return line.set.kind === 'integers' || line.set.kind === 'naturals' ? [line.letter.name] : [];
}

/** Letters under a factorial, in binomials and in the bounds of sums are whole numbers. */
function wholeByUse(expr: Expr): readonly string[] {
  const inside = childrenOf(expr).flatMap(wholeByUse);
  switch (expr.kind) {
    case 'factorial':
      return [...inside, ...lettersOf(expr.operand)];
    case 'binomial':
      return [...inside, ...lettersOf(expr.top), ...lettersOf(expr.bottom)];
    case 'series':
      return [...inside, ...lettersOf(expr.from), ...lettersOf(expr.to)];
    default:
      return inside;
  }
}
