import type { Expr, Line, RelationSign, Span } from './expression.ts';
import { namesIn } from './names-in.ts';
import { outer, type Reader } from './reader.ts';

export type Join = 'or' | 'and' | 'comma';

export interface Part {
  readonly line: Line;
  /** How it is joined to the part before it. */
  readonly join: Join;
}

/** Statements with their joins as one line; says what a comma means, or that it could mean two things. */
export function joinParts(reader: Reader, parts: readonly Part[], start: number): Line {
  const [condition, rest] = splitCondition(parts);
  const saysAnd = rest.slice(1).some((part) => part.join === 'and');
  const joined = joinByOr(reader, saysAnd ? rest : spreadValues(rest), start);
  if (!condition) return joined;
  reader.flags.add('comma-and');
  return combine(reader, 'all', joined.kind === 'all' ? [...joined.parts, condition] : [joined, condition], start);
}

function combine(reader: Reader, kind: 'any' | 'all', parts: readonly Line[], start: number): Line {
  return parts.length === 1 ? parts[0]! : { kind, parts, span: reader.span(start) };
}

/** "and" and commas hold tighter than "or", unless the letters leave it open: then the author is asked. */
function joinByOr(reader: Reader, parts: readonly Part[], start: number): Line {
  const groups = splitAt(parts, (join) => join === 'or');
  if (groups.length === 1) return joinTightly(reader, parts);
  const isOpen = parts.slice(1).some((part) => part.join === 'and') && new Set(groups.map(lettersIn)).size > 1;
  if (isOpen && reader.choose('joins')) {
    const wide = splitAt(parts, (join) => join !== 'or').map((group) =>
      combine(
        reader,
        'any',
        group.map((part) => part.line),
        spanOf(group).start,
      ),
    );
    return combine(reader, 'all', wide, start);
  }
  const lines = groups.map((group) => joinTightly(reader, group));
  return combine(
    reader,
    'any',
    lines.flatMap((line) => (line.kind === 'any' ? line.parts : [line])),
    start,
  );
}

function splitAt(parts: readonly Part[], splits: (join: Join) => boolean): readonly (readonly Part[])[] {
  const groups: Part[][] = [];
  for (const part of parts) {
    const last = groups[groups.length - 1];
    if (last && !splits(part.join)) last.push(part);
    else groups.push([part]);
  }
  return groups;
}

function lettersIn(parts: readonly Part[]): string {
  return [...namesIn(parts)].sort().join(' ');
}

function spanOf(parts: readonly Part[]): Span {
  return { start: parts[0]!.line.span.start, end: parts[parts.length - 1]!.line.span.end };
}

function joinTightly(reader: Reader, parts: readonly Part[]): Line {
  const { start } = spanOf(parts);
  if (parts.length === 1) return parts[0]!.line;
  const spread = spreadValues(parts);
  const lines = spread.map((part) => part.line);
  if (parts.slice(1).some((part) => part.join === 'and')) {
    const isOdd = spread !== parts && valuedLetter(lines[0]!) === valuedLetter(lines[1]!);
    return combine(reader, isOdd && reader.choose('comma') ? 'any' : 'all', lines, start);
  }
  const kind = commaKind(reader, lines);
  return kind === 'set' ? bareSet(reader, lines, start) : combine(reader, kind, lines, start);
}

/** `.. , k in Z` at the end goes with all that stands before it. */
function splitCondition(parts: readonly Part[]): [Line | null, readonly Part[]] {
  const last = parts[parts.length - 1];
  if (!last || last.line.kind !== 'membership' || last.join === 'or' || parts.length < 2) return [null, parts];
  return [last.line, parts.slice(0, -1)];
}

/** `x=2 or 3` and `x,y>0`: the letter and sign stand for each value or letter beside them. */
function spreadValues(parts: readonly Part[]): readonly Part[] {
  const first = parts[0]!.line;
  const last = parts[parts.length - 1]!.line;
  if (first.kind === 'relation' && isLetter(first.left)) {
    const { left, sign } = first;
    return spreadOver(parts, parts.slice(1), (expr) => (hasLetter(expr, left) ? null : [left, sign, expr]));
  }
  if (last.kind !== 'relation' || !isLetter(last.left)) return parts;
  const { left, sign, right } = last;
  return spreadOver(parts, parts.slice(0, -1), (expr) =>
    isLetter(expr) && !hasLetter(left, expr) ? [expr, sign, right] : null,
  );
}

type Sides = readonly [left: Expr, sign: RelationSign, right: Expr];

function spreadOver(
  parts: readonly Part[],
  bare: readonly Part[],
  sidesOf: (expr: Expr) => Sides | null,
): readonly Part[] {
  const changed: Part[] = [];
  for (const part of parts) {
    const sides = part.line.kind === 'expression' && bare.includes(part) ? sidesOf(part.line.expr) : null;
    if (!sides && bare.includes(part)) return parts;
    changed.push(sides ? { line: relationOf(sides), join: part.join } : part);
  }
  return changed;
}

function relationOf([left, sign, right]: Sides): Line {
  const [one, other] = [outer(left), outer(right)];
  const span = { start: Math.min(one.start, other.start), end: Math.max(one.end, other.end) };
  return { kind: 'relation', left, sign, right, span };
}

function isLetter(expr: Expr): boolean {
  return expr.kind === 'letter';
}

function hasLetter(expr: Expr, letter: Expr): boolean {
  return letter.kind === 'letter' && namesIn(expr).has(letter.name);
}

/** Rule for commas: values of one letter are alternatives, different letters hold together, all else is asked about. */
function commaKind(reader: Reader, lines: readonly Line[]): 'any' | 'all' | 'set' {
  if (lines.every((line) => line.kind === 'expression')) {
    reader.flags.add('comma-or');
    return 'set';
  }
  const names = new Set(lines.map(valuedLetter));
  if (!names.has(null) && names.size === 1) return flagged(reader, isUnequal(lines[0]) ? 'all' : 'any');
  if (!names.has(null) && names.size === lines.length) return flagged(reader, 'all');
  if (
    lines.some(
      (line) =>
        line.kind === 'expression' ||
        line.kind === 'definition' ||
        line.kind === 'always' ||
        line.kind === 'membership',
    )
  ) {
    return flagged(reader, 'all');
  }
  if (namesIn(lines).size > 1 && names.has(null)) return flagged(reader, 'all');
  return flagged(reader, reader.choose('comma') ? 'any' : 'all');
}

function flagged(reader: Reader, kind: 'any' | 'all'): 'any' | 'all' {
  reader.flags.add(kind === 'any' ? 'comma-or' : 'comma-and');
  return kind;
}

/** The letter of `letter = value` (or not equal, or about), where the value does not hold it. */
function valuedLetter(line: Line): string | null {
  if (line.kind !== 'relation' || line.left.kind !== 'letter' || hasLetter(line.right, line.left)) return null;
  return line.sign === '=' || line.sign === 'approx' || line.sign === '!='
    ? `${line.left.name}${line.sign === '!=' ? '!' : ''}`
    : null;
}

function isUnequal(line: Line | undefined): boolean {
  return line?.kind === 'relation' && line.sign === '!=';
}

function bareSet(reader: Reader, lines: readonly Line[], start: number): Line {
  const items = lines.flatMap((line) => (line.kind === 'expression' ? [line.expr] : []));
  const span = reader.span(start);
  return { kind: 'membership', letter: null, set: { kind: 'finite', items, span }, negated: false, span };
}
