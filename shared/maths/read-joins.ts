import type { Expr, Line, RelationSign } from './expression.ts';
import { namesIn } from './names-in.ts';
import { choose, flag, outer, span } from './reader.ts';

export type Join = 'or' | 'and' | 'comma';

export interface Part {
  readonly line: Line;
  /** How it is joined to the part before it. */
  readonly join: Join;
}

/** Statements with their joins as one line; says what a comma means, or that it could mean two things. */
export function joinParts(parts: readonly Part[], start: number): Line {
  const last = parts[parts.length - 1]!;
  if (parts.length === 1) return last.line;
  // `.. , k in Z` at the end goes with all that stands before it.
  const isCondition = last.line.kind === 'membership' && last.join !== 'or' && parts.length > 1;
  const rest = isCondition ? parts.slice(0, -1) : parts;
  const joined = joinByOr(saysAnd(rest) ? rest : spreadValues(rest), start);
  if (!isCondition) return joined;
  flag('comma-and');
  return combine('all', joined.kind === 'all' ? [...joined.parts, last.line] : [joined, last.line], start);
}

function saysAnd(parts: readonly Part[]): boolean {
  return parts.slice(1).some((part) => part.join === 'and');
}

function combine(kind: 'any' | 'all', parts: readonly Line[], start: number): Line {
  return parts.length === 1 ? parts[0]! : { kind, parts, span: span(start) };
}

/** "and" and commas hold tighter than "or", unless the letters leave it open: then the author is asked. */
function joinByOr(parts: readonly Part[], start: number): Line {
  const groups = splitAt(parts, true);
  if (groups.length === 1) return joinTightly(parts);
  const isOpen = saysAnd(parts) && new Set(groups.map((group) => [...namesIn(group)].sort().join())).size > 1;
  if (isOpen && choose('joins')) {
    const wide = splitAt(parts, false).map((group) => combine('any', linesOf(group), startOf(group)));
    return combine('all', wide, start);
  }
  const lines = groups.map((group) => joinTightly(group));
  const flat = lines.flatMap((line) => (line.kind === 'any' ? line.parts : [line]));
  return combine('any', flat, start);
}

/** The parts split at each "or", or at all else. */
function splitAt(parts: readonly Part[], atOr: boolean): readonly (readonly Part[])[] {
  const groups: Part[][] = [];
  for (const part of parts) {
    const last = groups[groups.length - 1];
    if (last && (part.join === 'or') !== atOr) last.push(part);
    else groups.push([part]);
  }
  return groups;
}

function linesOf(parts: readonly Part[]): readonly Line[] {
  return parts.map((part) => part.line);
}

function startOf(parts: readonly Part[]): number {
  return parts[0]!.line.span.start;
}

function joinTightly(parts: readonly Part[]): Line {
  if (parts.length === 1) return parts[0]!.line;
  const start = startOf(parts);
  const spread = spreadValues(parts);
  const lines = linesOf(spread);
  if (saysAnd(parts)) {
    const isOdd = spread !== parts && valuedLetter(lines[0]!) === valuedLetter(lines[1]!);
    return combine(isOdd && choose('comma') ? 'any' : 'all', lines, start);
  }
  const items = lines.flatMap((line) => (line.kind === 'expression' ? [line.expr] : []));
  const isSet = items.length === lines.length;
  const kind = isSet ? 'any' : commaKind(lines);
  flag(kind === 'any' ? 'comma-or' : 'comma-and');
  if (!isSet) return combine(kind, lines, start);
  const place = span(start);
  return { kind: 'membership', letter: null, set: { kind: 'finite', items, span: place }, negated: false, span: place };
}

/** `x=2 or 3` and `x,y>0`: the letter and sign stand for each value or letter beside them. */
function spreadValues(parts: readonly Part[]): readonly Part[] {
  const first = parts[0]!.line;
  const last = parts[parts.length - 1]!.line;
  if (first.kind === 'relation' && first.left.kind === 'letter') {
    const { left, sign } = first;
    return spreadOver(parts, first, (expr) => (hasLetter(expr, left) ? null : [left, sign, expr]));
  }
  if (last.kind !== 'relation' || last.left.kind !== 'letter') return parts;
  const { left, sign, right } = last;
  return spreadOver(parts, last, (expr) =>
    expr.kind === 'letter' && !hasLetter(left, expr) ? [expr, sign, right] : null,
  );
}

type Sides = readonly [left: Expr, sign: RelationSign, right: Expr];

/** The parts with each but the given one made a relation; unchanged where one of them can be none. */
function spreadOver(parts: readonly Part[], from: Line, sidesOf: (expr: Expr) => Sides | null): readonly Part[] {
  const changed: Part[] = [];
  for (const { line, join } of parts) {
    const sides = line.kind === 'expression' ? sidesOf(line.expr) : null;
    if (!sides && line !== from) return parts;
    changed.push({ line: sides ? relationOf(sides) : line, join });
  }
  return changed;
}

function relationOf([left, sign, right]: Sides): Line {
  const [one, other] = [outer(left), outer(right)];
  const span = { start: Math.min(one.start, other.start), end: Math.max(one.end, other.end) };
  return { kind: 'relation', left, sign, right, span };
}

function hasLetter(expr: Expr, letter: Expr): boolean {
  return letter.kind === 'letter' && namesIn(expr).has(letter.name);
}

/** Rule for commas: values of one letter are alternatives, different letters hold together, all else is asked about. */
function commaKind(lines: readonly Line[]): 'any' | 'all' {
  const names = new Set(lines.map(valuedLetter));
  if (!names.has(null) && names.size === 1) return [...names][0]!.endsWith('!') ? 'all' : 'any';
  const isClear = names.has(null) === false ? names.size === lines.length : namesIn(lines).size > 1;
  if (isClear || lines.some(({ kind }) => /^(?:expression|definition|always|membership)$/.test(kind))) return 'all';
  return choose('comma') ? 'any' : 'all';
}

/** The letter of `letter = value` (or about; with a ! for not equal), where the value does not hold it. */
function valuedLetter(line: Line): string | null {
  if (line.kind !== 'relation' || line.left.kind !== 'letter' || hasLetter(line.right, line.left)) return null;
  if (line.sign === '!=') return `${line.left.name}!`;
  return line.sign === '=' || line.sign === 'approx' ? line.left.name : null;
}
