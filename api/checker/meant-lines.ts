import type { Line } from '../../shared/maths/expression.ts';
import { lettersOf } from '../../shared/maths/letters.ts';

type Relation = Extract<Line, { kind: 'relation' }>;

/** Reads lines in the light of those before them, where the line by itself leaves open what it says. */
export function readInPlace(line: Line, tex: string, before: readonly Line[]): Line {
  if (line.kind !== 'any' && line.kind !== 'all' && line.kind !== 'relation') return line;
  return joinTogether(numberedValues(line, before), tex, before);
}

/**
 * `y=x^2, y=x+2` may list two values of y or state two equations. It is a system where it is given, stands in a cases
 * block or follows a system.
 */
function joinTogether(line: Line, tex: string, before: readonly Line[]): Line {
  if (line.kind !== 'any' || /\\text|\\lor|\\vee|\\pm|\bor\b/.test(tex)) return line;
  const saysWithLetters = line.parts.every(
    (part) => part.kind === 'relation' && part.sign === '=' && part.left.kind === 'letter' && lettersOf(part.right).length > 0,
  );
  if (!saysWithLetters || new Set(line.parts.map((part) => JSON.stringify(lettersOfLeft(part)))).size > 1) return line;
  const above = before[before.length - 1];
  const isTogether = above === undefined || above.kind === 'all' || tex.includes('\\begin{cases}');
  return isTogether ? { ...line, kind: 'all' } : line;
}

function lettersOfLeft(line: Line): readonly string[] {
  return line.kind === 'relation' ? lettersOf(line.left) : [];
}

/** `x_1=3, x_2=-1` lists the values of x where the lines before are about x and no line before has an x_1. */
function numberedValues(line: Line, before: readonly Line[]): Line {
  const parts = line.kind === 'any' || line.kind === 'all' ? line.parts : [line];
  const letters = parts.map(numberedLetter);
  const [letter] = letters;
  if (!letter || letters.some((other) => other !== letter)) return line;
  const known = before.flatMap(lettersOf);
  if (!known.includes(letter) || known.some((name) => name.startsWith(`${letter}_`))) return line;
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
