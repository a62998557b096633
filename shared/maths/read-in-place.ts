import type { Line, Reading, ReadingFlag, ReadSettings } from './expression.ts';
import { lettersOf } from './letters.ts';
import { readLine } from './read.ts';
import { READ_LIMITS } from './reader.ts';
import { sameLine } from './same.ts';

type Relation = Extract<Line, { kind: 'relation' }>;

/**
 * Reads a line as the checker judges it after the lines before it. Where these settle what the line says, the reading
 * says so by its flags, and the author is asked only where the line by itself can be read in two ways.
 */
export function readInPlace(tex: string, settings: ReadSettings, before: readonly Line[]): Reading {
  const reading = readLine(partWideBlanks(tex), settings);
  if (!reading.ok) return { ok: false, refusal: { ...reading.refusal, tex: tex.slice(0, READ_LIMITS.characters) } };
  const line = lineInPlace(reading.line, tex, before);
  if (line === reading.line) return reading;
  const ways = reading.alternatives.length > 0 ? [reading.line, ...reading.alternatives] : [];
  const alternatives = ways.filter((other) => !sameLine(other, line));
  return { ok: true, line, flags: flagsInPlace(reading.flags, reading.line, line), alternatives };
}

function flagsInPlace(flags: readonly ReadingFlag[], alone: Line, line: Line): readonly ReadingFlag[] {
  const kept = flags.filter((flag) => flag !== 'comma-or' && flag !== 'comma-and');
  const comma: ReadingFlag[] = line.kind === 'any' ? ['comma-or'] : line.kind === 'all' ? ['comma-and'] : [];
  const isNumbered = lettersOf(alone).length > 0 && lettersOf(alone).join() !== lettersOf(line).join();
  return [...kept, ...comma, ...(isNumbered ? (['numbered-values'] as const) : [])];
}

/** The names that a line introduces as functions; later lines read them so. */
export function functionsIn(line: Line): readonly string[] {
  if (line.kind === 'definition') return line.params.length > 0 ? [line.name] : [];
  return line.kind === 'all' || line.kind === 'any' ? line.parts.flatMap(functionsIn) : [];
}

const orderSign = /(?<![a-zA-Z\\])[Oo](?![a-zA-Z])(?=(\s*(?:\\left\s*)?\()?)/g;

/**
 * O and o where they stand for orders of magnitude, as in `x-\frac{x^3}{6}+O(x^5)`: always before a bracket, and no letter
 * of an earlier line; in the first line behind a plus or minus.
 */
export function orderSymbols(tex: string, before: readonly Line[]): readonly string[] {
  if (!/[Oo]\s*(?:\\left\s*)?\(/.test(tex)) return [];
  const uses = [...tex.matchAll(orderSign)].map((found) => ({
    name: found[0],
    isSymbol: found[1] !== undefined && (before.length > 0 || /[-+]\s*$/.test(tex.slice(0, found.index))),
  }));
  return ['O', 'o'].filter((name) => {
    const own = uses.filter((use) => use.name === name);
    return (
      own.length > 0 && own.every(({ isSymbol }) => isSymbol) && !before.some((line) => lettersOf(line).includes(name))
    );
  });
}

/** What a line says in the light of those before it, where the line by itself leaves that open. */
export function lineInPlace(line: Line, tex: string, before: readonly Line[]): Line {
  if (line.kind !== 'any' && line.kind !== 'all' && line.kind !== 'relation') return line;
  return joinApart(joinTogether(numberedValues(line, before), tex, before), tex, before);
}

/** `x-2=0, x+2=0` after a line: equations of one letter are its cases, where nothing says that they hold together. */
function joinApart(line: Line, tex: string, before: readonly Line[]): Line {
  if (line.kind !== 'all' || before.length === 0 || saysTogether.test(tex)) return line;
  if (line.parts.some((part) => part.kind !== 'relation' || part.sign !== '=')) return line;
  const letters = new Set(line.parts.flatMap((part) => lettersOf(part)));
  return letters.size === 1 && before.some((other) => lettersOf(other).includes([...letters][0] as string))
    ? { ...line, kind: 'any' }
    : line;
}

const saysTogether = /\\text|\\mathrm|\\land|\\wedge|\\begin|\\&|\band\b/;

/**
 * `y=x^2, y=x+2` may list two values of y or state two equations. It is a system where it is given, stands in a cases
 * block or follows a system.
 */
function joinTogether(line: Line, tex: string, before: readonly Line[]): Line {
  if (line.kind !== 'any' || /\\text|\\lor|\\vee|\\pm|\bor\b/.test(tex)) return line;
  const saysWithLetters = line.parts.every(
    (part) =>
      part.kind === 'relation' && part.sign === '=' && part.left.kind === 'letter' && lettersOf(part.right).length > 0,
  );
  if (!saysWithLetters || new Set(line.parts.map((part) => JSON.stringify(lettersOfLeft(part)))).size > 1) return line;
  const above = before[before.length - 1];
  const isTogether = above === undefined || above.kind === 'all' || tex.includes('\\begin{cases}');
  return isTogether ? { ...line, kind: 'all' } : line;
}

function lettersOfLeft(line: Line): readonly string[] {
  return line.kind === 'relation' ? lettersOf(line.left) : [];
}

/** `x_1=3, x_2=-1` lists the values of x where the lines before are about x and the first of them has no x_1. */
function numberedValues(line: Line, before: readonly Line[]): Line {
  const parts = line.kind === 'any' || line.kind === 'all' ? line.parts : [line];
  const letters = parts.map(numberedLetter);
  const [letter] = letters;
  if (!letter || letters.some((other) => other !== letter)) return line;
  const known = before.flatMap(lettersOf);
  const first = before[0] ? lettersOf(before[0]) : [];
  if (!known.includes(letter) || first.some((name) => name.startsWith(`${letter}_`))) return line;
  const renamed = parts.map((part): Line => {
    const relation = part as Relation;
    return { ...relation, left: { ...relation.left, kind: 'letter', name: letter } as Relation['left'] };
  });
  return renamed.length === 1 ? (renamed[0] as Line) : { kind: 'any', parts: renamed, span: line.span };
}

function numberedLetter(part: Line): string | null {
  if (part.kind !== 'relation' || part.left.kind !== 'letter') return null;
  if (part.sign !== '=' && part.sign !== 'approx') return null;
  const name = /^([A-Za-z])_(?:\d|\{\d(?:,\d)+\})$/.exec(part.left.name)?.[1] ?? null;
  return name !== null && !lettersOf(part.right).some((other) => other.startsWith(name)) ? name : null;
}

const RELATION = /[=<>]|\\(?:le|ge|ne|leq|geq|neq|approx|in)(?![a-zA-Z])/;

/** `x=0\quad x=-1`: a wide blank between two statements parts them as a comma does. Places in the text stay. */
export function partWideBlanks(tex: string): string {
  if (!tex.includes('quad')) return tex;
  return tex.replace(/\\q?quad(?![a-zA-Z])/g, (blank, at: number) => {
    const before = tex.slice(0, at).trimEnd();
    const after = tex.slice(at + blank.length).trimStart();
    const isParted = /(?:[,;:&]|\\(?:text|mathrm)\{[^}]*\})$/.test(before) || !/^[-+0-9a-zA-Z\\{]/.test(after);
    if (isParted || /^\\(?:text|mathrm|lor|land|vee|wedge|q?quad|[LR]|imp|iff|to)/.test(after)) return blank;
    return RELATION.test(before) && RELATION.test(after) ? `,${' '.repeat(blank.length - 1)}` : blank;
  });
}
