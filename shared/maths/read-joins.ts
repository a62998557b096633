import type { Expr, LetterExpr, Line } from './expression.ts';
import { namesIn } from './names-in.ts';
import { choose, flag, outer, span } from './reader.ts';

export type Join = 'or' | 'and' | 'comma';

export interface Part {
  readonly line: Line;
  /** How it is joined to the part before it. */
  readonly join: Join;
}

type Relation = Extract<Line, { kind: 'relation' }>;

/** Statements with their joins as one line; says what a comma means, or that it could mean two things. */
export const joinParts = (parts: readonly Part[], from: number): Line => {
  const { line, join } = parts.at(-1)!;
  if (!parts[1]) return line;
  // `.. , k in Z` at the end goes with all that stands before it.
  if (line.kind !== 'membership' || join === 'or') return joinByOr(parts, from);
  const joined = joinByOr(parts.slice(0, -1), from);
  flag('comma-and');
  return combine('all', [...(joined.kind === 'all' ? joined.parts : [joined]), line], from);
};

const saysAnd = (parts: readonly Part[]): boolean => parts.some(({ join }, at) => at > 0 && join === 'and');

const combine = (kind: 'any' | 'all', parts: readonly Line[], from: number): Line =>
  parts[1] ? { kind, parts, span: span(from) } : parts[0]!;

/** "and" and commas hold tighter than "or", unless the letters leave it open: then the author is asked. */
const joinByOr = (written: readonly Part[], from: number): Line => {
  const isAnd = saysAnd(written);
  const parts = isAnd ? written : spreadValues(written);
  const groups = splitAt(parts, true);
  const isOpen = isAnd && new Set(groups.map((group) => [...namesIn(group)].sort().join())).size > 1;
  if (isOpen && choose('joins')) {
    const wide = splitAt(parts, false).map((group) => combine('any', linesOf(group), startOf(group)));
    return combine('all', wide, from);
  }
  const lines = groups.map(joinTightly);
  return combine('any', lines[1] ? lines.flatMap((line) => (line.kind === 'any' ? line.parts : line)) : lines, from);
};

/** The parts split at each "or", or at all else. */
const splitAt = (parts: readonly Part[], atOr: boolean): readonly (readonly Part[])[] => {
  const groups: Part[][] = [];
  for (const part of parts) {
    if (groups[0] && (part.join === 'or') !== atOr) groups.at(-1)!.push(part);
    else groups.push([part]);
  }
  return groups;
};

const linesOf = (parts: readonly Part[]): readonly Line[] => parts.map(({ line }) => line);

const startOf = (parts: readonly Part[]): number => parts[0]!.line.span.start;

const joinTightly = (parts: readonly Part[]): Line => {
  const from = startOf(parts);
  const spread = spreadValues(parts);
  const lines = linesOf(spread);
  const [first, second] = lines;
  if (!second) return first!;
  if (saysAnd(parts)) {
    const isOdd = spread !== parts && valuedLetter(first!) === valuedLetter(second);
    return combine(isOdd && choose('comma') ? 'any' : 'all', lines, from);
  }
  const items = lines.flatMap((line) => (line.kind === 'expression' ? line.expr : []));
  const isSet = items.length === lines.length;
  const kind = isSet ? 'any' : commaKind(lines);
  flag(kind === 'any' ? 'comma-or' : 'comma-and');
  const all = combine(kind, lines, from);
  const place = all.span;
  return isSet
    ? { kind: 'membership', letter: null, set: { kind: 'finite', items, span: place }, negated: false, span: place }
    : all;
};

/** `x=2 or 3` and `x,y>0`: the letter and sign stand for each value or letter beside them. */
const spreadValues = (parts: readonly Part[]): readonly Part[] => {
  const first = parts[0]!.line;
  const model = [first, parts.at(-1)!.line].find(isOfLetter);
  if (!model) return parts;
  const { left, sign, right } = model;
  const changed: Part[] = [];
  for (const part of parts) {
    const { line, join } = part;
    if (line === model) {
      changed.push(part);
      continue;
    }
    if (line.kind !== 'expression') return parts;
    const { expr } = line;
    const letter = model === first ? left : expr;
    if (letter.kind !== 'letter' || hasLetter(model === first ? expr : left, letter)) return parts;
    changed.push({ line: relate(letter, sign, model === first ? expr : right), join });
  }
  return changed;
};

const isOfLetter = (line: Line): line is Relation & { readonly left: LetterExpr } =>
  line.kind === 'relation' && line.left.kind === 'letter';

const relate = (left: Expr, sign: Relation['sign'], right: Expr): Line => ({
  kind: 'relation',
  left,
  sign,
  right,
  span: { start: outer(left).start, end: outer(right).end },
});

const hasLetter = (expr: Expr, letter: LetterExpr): boolean => namesIn(expr).has(letter.name);

/** Rule for commas: values of one letter are alternatives, different letters hold together, all else is asked about. */
const commaKind = (lines: readonly Line[]): 'any' | 'all' => {
  const names = new Set(lines.map(valuedLetter));
  const [name = ''] = names;
  const isKnown = !names.has('');
  if (isKnown && names.size === 1) return name.endsWith('!') ? 'all' : 'any';
  const isClear = isKnown ? names.size === lines.length : namesIn(lines).size > 1;
  if (isClear || lines.some(({ kind }) => /^(?:exp|def|alw|mem)/.test(kind))) return 'all';
  return choose('comma') ? 'any' : 'all';
};

/** The letter of `letter = value` (or about; with a ! for not equal), where the value does not hold it; else empty. */
const valuedLetter = (line: Line): string => {
  if (!isOfLetter(line) || hasLetter(line.right, line.left)) return '';
  const { left, sign } = line;
  return sign === '!=' ? `${left.name}!` : /^[=a]/.test(sign) ? left.name : '';
};
