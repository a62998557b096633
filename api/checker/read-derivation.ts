import type { Expr, Line, ReadError, ReadSettings } from '../../shared/maths/expression.ts';
import { lettersOf } from '../../shared/maths/letters.ts';
import { readLine } from '../../shared/maths/read.ts';
import { functionsIn, lineInPlace, orderSymbols, partWideBlanks } from '../../shared/maths/read-in-place.ts';
import { childrenOf, exprsOf } from '../../shared/maths/walk.ts';
import { explainRefusal } from '../../shared/maths/refusals.ts';
import { nameDifferentials } from './calculus/name-differentials.ts';
import { mayHaveCalculus, nameRates, usualVariable } from './calculus/name-rates.ts';
import * as Q from './numbers/rational.ts';
import { radiiOf, realLettersOf, speaksOfComplex } from './real-letters.ts';
import { letterExpr, numberExpr } from './values/node-expr.ts';
import { relationLine } from './values/truth.ts';
import type { DerivationInput } from '../../shared/schemas/verdict.ts';

/** A line as it was read, or why it could not be. */
export type ReadResult =
  | { readonly ok: true; readonly tex: string; readonly line: Line }
  | { readonly ok: false; readonly tex: string; readonly error: ReadError };

export interface ReadDerivation {
  readonly lines: readonly ReadResult[];
  readonly assumptions: readonly Line[];
  /** False where an assumption could not be read: then nothing is certain to fail. */
  readonly knowsAssumptions: boolean;
  readonly numbers: 'real' | 'complex';
  readonly wholeLetters: ReadonlySet<string>;
  /** Letters that stand for real numbers though the numbers are complex. */
  readonly realLetters: ReadonlySet<string>;
  readonly settings: ReadSettings;
}

const noLetters: ReadonlySet<string> = new Set();

/** Reads all lines, each with the functions that the lines before it introduced. */
export function readDerivation(input: DerivationInput): ReadDerivation {
  const numbers = input.settings.numbers ?? guessNumbers(input);
  const decimal = input.settings.decimal ?? 'point';
  const functions: string[] = [];
  const defined = new Set<string>();
  const by = usualVariable(input.lines);
  const before: Line[] = [];
  const read = (tex: string): ReadResult => {
    const found = readLine(partWideBlanks(tex), {
      numbers,
      decimal,
      functions: [...functions, ...orderSymbols(tex, before)],
    });
    if (!found.ok) return { ok: false, tex, error: explainRefusal(found.refusal) };
    const reading = { ...found, line: letAll(found.line) };
    for (const name of functionsIn(reading.line)) functions.push(name);
    for (const name of definedIn(reading.line)) defined.add(name);
    return { ok: true, tex, line: mayHaveCalculus(tex) ? nameRates(reading.line, defined, by) : reading.line };
  };
  const assumed = input.assume.map(read);
  const asRead = input.lines.map((tex): ReadResult => {
    const result = read(tex);
    if (!result.ok) return result;
    const line = lineInPlace(result.line, tex, before);
    before.push(line);
    return { ...result, line };
  });
  const lines = input.lines.some(mayHaveCalculus) ? withDifferentials(asRead) : asRead;
  const assumptions = assumed.flatMap((result) => (result.ok ? [result.line] : []));
  const wholeLetters = new Set(assumptions.flatMap(wholeByAssumption));
  // Only these forms make a letter whole: most derivations have none of them, and are not walked for it.
  if (input.lines.some((tex) => /!|binom|choose|\\sum|\\prod/.test(tex))) {
    for (const result of lines)
      if (result.ok) for (const expr of exprsOf(result.line)) addWholeByUse(expr, wholeLetters);
  }
  const written = numbers === 'complex' ? lines.flatMap((result) => (result.ok ? [result.line] : [])) : [];
  const moduli = radiiOf(written).map((name) => relationLine(letterExpr(name), '>=', numberExpr(Q.zero)));
  return {
    lines,
    assumptions: [...assumptions, ...moduli],
    knowsAssumptions: assumptions.length === assumed.length,
    numbers,
    wholeLetters,
    realLetters: numbers === 'complex' ? realLettersOf(written) : noLetters,
    settings: { numbers, decimal, functions },
  };
}

/** "Let a=2, b=3": what follows the first definition is defined as well. */
function letAll(line: Line): Line {
  const first = line.kind === 'all' ? line.parts[0] : undefined;
  if (line.kind !== 'all' || first?.kind !== 'definition' || first.params.length > 0) return line;
  return {
    ...line,
    parts: line.parts.map((part): Line => {
      if (part.kind !== 'relation' || part.sign !== '=' || part.left.kind !== 'letter') return part;
      return { kind: 'definition', name: part.left.name, params: [], value: part.right, span: part.span };
    }),
  };
}

function withDifferentials(lines: readonly ReadResult[]): readonly ReadResult[] {
  const named = nameDifferentials(lines.map((result) => (result.ok ? result.line : null)));
  return lines.map((result, k) => (result.ok ? { ...result, line: named[k] ?? result.line } : result));
}

/** Complex when the given has an i that no sum or subscript binds, or asks for the parts of z or w. */
function guessNumbers(input: DerivationInput): 'real' | 'complex' {
  const first = input.lines[0];
  if (first === undefined || !(hasLetterI(first) || /bar|overline|Re|Im|arg/.test(first))) return 'real';
  const reading = readLine(first, { numbers: 'complex', decimal: input.settings.decimal ?? 'point', functions: [] });
  return reading.ok && exprsOf(reading.line).some(speaksOfComplex) ? 'complex' : 'real';
}

/** Whether an i is written, apart from the names of commands. */
export function hasLetterI(tex: string): boolean {
  return tex.includes('i') && tex.replace(/\\[a-zA-Z]+/g, '').includes('i');
}

function definedIn(line: Line): string[] {
  if (line.kind === 'all' || line.kind === 'any') return line.parts.flatMap(definedIn);
  return line.kind === 'definition' ? [line.name] : [];
}

function wholeByAssumption(line: Line): readonly string[] {
  if (line.kind === 'all') return line.parts.flatMap(wholeByAssumption);
  if (line.kind !== 'membership' || line.letter?.kind !== 'letter') return [];
  return line.set.kind === 'integers' || line.set.kind === 'naturals' ? [line.letter.name] : [];
}

/** Letters under a factorial, in binomials and in the bounds of sums are whole numbers. */
function addWholeByUse(expr: Expr, found: Set<string>): void {
  const add = (inside: Expr): void => lettersOf(inside).forEach((name) => found.add(name));
  if (expr.kind === 'factorial') add(expr.operand);
  if (expr.kind === 'binomial') [expr.top, expr.bottom].forEach(add);
  if (expr.kind === 'series') [expr.from, expr.to].forEach(add);
  for (const child of childrenOf(expr)) addWholeByUse(child, found);
}
