import type { Line, Reading, ReadSettings } from './expression.ts';
import { printLine } from './print.ts';
import {
  readBars,
  readBinomial,
  readBraces,
  readBracket,
  readFenced,
  readFraction,
  readMatrix,
  readOpenBracket,
  readOverline,
  readRoot,
} from './read-atoms.ts';
import { readIntegral, readLimit, readSeries } from './read-calculus.ts';
import { readDerivativeFraction } from './read-derivatives.ts';
import { readProduct, readSum } from './read-expression.ts';
import { readFunction, readLog } from './read-functions.ts';
import { readConstant, readLetter } from './read-letters.ts';
import { readWholeLine } from './read-line.ts';
import { readNumberAtom } from './read-numbers.ts';
import { readPower } from './read-power.ts';
import { type Choice, type Grammar, READ_LIMITS, Reader } from './reader.ts';
import { ReadFailure } from './scanner.ts';
import { tokenize } from './tokens.ts';

const GRAMMAR: Grammar = {
  sum: readSum,
  product: readProduct,
  power: readPower,
  atoms: {
    0: readNumberAtom,
    a: readLetter,
    e: readConstant,
    i: readConstant,
    '∞': readConstant,
    '(': readBracket,
    '[': readBracket,
    '{': readBraces,
    '|': readBars,
    '‹': readOpenBracket,
    '⌊': readFenced,
    '⌈': readFenced,
    O: readOverline,
    F: (reader) => readDerivativeFraction(reader) ?? readFraction(reader),
    C: readBinomial,
    '√': readRoot,
    B: readMatrix,
    f: readFunction,
    l: readLog,
    '∫': readIntegral,
    '∑': readSeries,
    '∏': readSeries,
    L: readLimit,
  },
};

export const DEFAULT_READ_SETTINGS: ReadSettings = { numbers: 'real', decimal: 'point', functions: [] };

/**
 * Reads one line of TeX, or of plainly typed maths, as what it displays. Never throws, whatever the text: what cannot be
 * read is an error with its place. Where the line can be read in two ways, `alternatives` holds the others.
 */
export function readLine(tex: string, settings: ReadSettings = DEFAULT_READ_SETTINGS): Reading {
  const result = attempt(tex, settings, null);
  if (result instanceof ReadFailure) return { ok: false, error: result.error };
  const { reader, line } = result;
  return { ok: true, line, flags: [...reader.flags], alternatives: readOthers(reader, line) };
}

/** One reading with all decisions taken as usual but one. */
function attempt(
  tex: string,
  settings: ReadSettings,
  flip: Choice | null,
): { reader: Reader; line: Line } | ReadFailure {
  const most = READ_LIMITS.characters;
  try {
    if (tex.length > most) throw new ReadFailure(`too-long ${most}`, '', { start: most, end: tex.length });
    const reader = new Reader(tokenize(tex, settings), GRAMMAR, flip);
    return { reader, line: readWholeLine(reader) };
  } catch (failure) {
    if (failure instanceof ReadFailure) return failure;
    throw failure;
  }
}

/** The line read again with one decision taken the other way, for each decision that was open. */
function readOthers({ source, settings, choices }: Reader, line: Line): readonly string[] {
  if (choices.size === 0) return [];
  const print = (other: Line) => printLine(other, settings.decimal);
  const known = new Set([print(line)]);
  for (const choice of choices) {
    const other = attempt(source, settings, choice);
    if (!(other instanceof ReadFailure)) known.add(print(other.line));
  }
  return [...known].slice(1);
}
