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
import { readExp, readFunction, readLog } from './read-functions.ts';
import { readConstant, readLetter } from './read-letters.ts';
import { readWholeLine } from './read-line.ts';
import { readNumberAtom } from './read-numbers.ts';
import { readPower } from './read-power.ts';
import { type Choice, type Grammar, READ_LIMITS, Reader } from './reader.ts';
import { sameLine } from './same.ts';
import { ReadFailure } from './scanner.ts';
import { tokenize } from './tokens.ts';

const GRAMMAR: Grammar = {
  sum: readSum,
  product: readProduct,
  power: readPower,
  atoms: {
    number: readNumberAtom,
    letter: readLetter,
    e: readConstant,
    i: readConstant,
    infinity: readConstant,
    '(': readBracket,
    '[': readBracket,
    '{': readBraces,
    '|': readBars,
    'open.': readOpenBracket,
    'floor(': readFenced,
    'ceil(': readFenced,
    over: readOverline,
    frac: (reader) => readDerivativeFraction(reader) ?? readFraction(reader),
    binom: readBinomial,
    sqrt: readRoot,
    begin: readMatrix,
    function: readFunction,
    exp: readExp,
    log: readLog,
    log2: readLog,
    int: readIntegral,
    sum: readSeries,
    prod: readSeries,
    lim: readLimit,
  },
};

export const DEFAULT_READ_SETTINGS: ReadSettings = { numbers: 'real', decimal: 'point', functions: [] };

/**
 * Reads one line of TeX, or of plainly typed maths, as what it displays. Never throws, whatever the text: what cannot be
 * read is an error with its place. Where the line can be read in two ways, `alternatives` holds the others.
 */
export function readLine(tex: string, settings: ReadSettings = DEFAULT_READ_SETTINGS): Reading {
  if (tex.length > READ_LIMITS.characters) {
    const span = { start: READ_LIMITS.characters, end: tex.length };
    return { ok: false, error: { code: 'too-long', span, found: '', expected: [String(READ_LIMITS.characters)] } };
  }
  try {
    const { reader, line } = readOnce(tex, settings, null);
    const alternatives = reader.choices.size > 0 ? readOthers(tex, settings, line, reader.choices) : [];
    return { ok: true, line, flags: [...reader.flags], alternatives };
  } catch (failure) {
    if (!(failure instanceof ReadFailure)) throw failure;
    const { code, span, found, expected } = failure;
    return { ok: false, error: { code, span, found, expected } };
  }
}

function readOnce(tex: string, settings: ReadSettings, flip: Choice | null): { reader: Reader; line: Line } {
  const reader = new Reader(tokenize(tex, settings), settings, GRAMMAR, flip);
  return { reader, line: readWholeLine(reader) };
}

/** The line read again with one decision taken the other way, for each decision that was open. */
function readOthers(tex: string, settings: ReadSettings, line: Line, choices: ReadonlySet<Choice>): readonly string[] {
  const others: Line[] = [];
  for (const choice of choices) {
    try {
      const other = readOnce(tex, settings, choice).line;
      if (![line, ...others].some((known) => sameLine(known, other))) others.push(other);
    } catch (failure) {
      if (!(failure instanceof ReadFailure)) throw failure;
    }
  }
  return others.map((other) => printLine(other, settings.decimal));
}
