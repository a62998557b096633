import type { Line, Reading, ReadSettings } from './expression.ts';
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
import { readSum } from './read-expression.ts';
import { readFunction, readLog } from './read-functions.ts';
import { readConstant, readLetter } from './read-letters.ts';
import { readWholeLine } from './read-line.ts';
import { readNumberAtom } from './read-numbers.ts';
import { begin, type Choice, choices, flags, useGrammar } from './reader.ts';
import { refusal } from './tokens.ts';

useGrammar(readSum, {
  0: readNumberAtom,
  a: readLetter,
  e: readConstant,
  i: readConstant,
  o: readConstant,
  '(': readBracket,
  '[': readBracket,
  s: readBracket,
  '{': readBraces,
  '|': readBars,
  '‹': readOpenBracket,
  '⌊': readFenced,
  '⌈': readFenced,
  O: readOverline,
  F: (token) => readDerivativeFraction(token.start) ?? readFraction(token),
  C: readBinomial,
  r: readRoot,
  B: readMatrix,
  f: readFunction,
  l: readLog,
  '∫': readIntegral,
  '∑': readSeries,
  L: readLimit,
});

export const DEFAULT_READ_SETTINGS: ReadSettings = { numbers: 'real', decimal: 'point', functions: [] };

/**
 * Reads one line of TeX, or of plainly typed maths, as what it displays. Never throws, whatever the text: what cannot be
 * read is an error with its place. Where the line can be read in two ways, `alternatives` holds the others.
 */
export const readLine = (tex: string, settings: ReadSettings = DEFAULT_READ_SETTINGS): Reading => {
  const line = attempt(tex, settings);
  if (!line) return { ok: false, refusal };
  const open = choices;
  if (!open[0]) return { ok: true, line, flags, alternatives: [] };
  let others: readonly Line[] | undefined;
  return {
    ok: true,
    line,
    flags,
    // Worked out when they are asked for: the checker never does.
    get alternatives() {
      return (others ??= readOthers(tex, settings, line, open));
    },
  };
};

/** One reading with all decisions taken as usual but one; null where it was refused. */
const attempt = (tex: string, settings: ReadSettings, flip?: Choice): Line | null => {
  try {
    begin(tex, settings, flip);
    return readWholeLine();
  } catch (failure) {
    if (failure !== refusal) throw failure;
    return null;
  }
};

/** The line read again with one decision taken the other way, for each decision that was open. */
const readOthers = (tex: string, settings: ReadSettings, line: Line, open: readonly Choice[]): readonly Line[] => {
  const others = new Map([[shapeOf(line), line]]);
  for (const choice of open) {
    const other = attempt(tex, settings, choice);
    if (other) others.set(shapeOf(other), other);
  }
  return [...others.values()].slice(1);
};

/** The same text for lines that differ only in places and in brackets that change nothing. */
const shapeOf = (line: Line): string => {
  return JSON.stringify(line, (key, value: unknown) => {
    if (key !== 'span' && key !== 'bracketed') return typeof value === 'bigint' ? `${value}` : value;
  });
};
