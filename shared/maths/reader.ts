import type { Complaint, Expr, NumberExpr, ReadingFlag, ReadSettings, Span } from './expression.ts';
import type { TokenKind } from './token-table.ts';
import { kinds, hasLongRun, MOST_CHARACTERS, refuse, source, type Token, tokenize, tokens } from './tokens.ts';

const MOST_LEVELS = 60;
const MOST_NODES = 3000;
export const READ_LIMITS = { characters: MOST_CHARACTERS, levels: MOST_LEVELS, nodes: MOST_NODES } as const;

/** A decision that the text leaves open; the reader takes one way and remembers that there is another. */
export type Choice =
  | 'slash'
  | 'bars'
  | 'argument'
  | 'quotient'
  | 'power'
  | 'operand'
  | 'comma'
  | 'unit'
  | 'evaluated'
  | 'interval'
  | 'definition'
  | 'factorial'
  | 'unequal'
  | 'joins';

/** What depends on where the reader stands; kept and put back around every bracket and group. */
export interface Context {
  /** Plain bars that are open here. */
  readonly bars: number;
  /** `[` ends an interval such as `]a,b[` instead of opening a bracket. */
  readonly reversed: boolean;
  /** dx ends the integrand here, or may stand as a factor (numerators and brackets within an integrand). */
  readonly dx: '' | 'ends' | 'held';
  /** Within `\lim_{x\to ..}`, where a trailing `^+` tells the side. */
  side: '' | 'argument' | 'limit' | 'left' | 'right';
}

export const OUTSIDE: Context = { bars: 0, reversed: false, dx: '', side: '' };
const HOLDING: Context = { ...OUTSIDE, dx: 'held' };

export type Read<Result = Expr> = () => Result;
export type Atoms = Partial<Record<TokenKind, (token: Token) => Expr>>;

/** One line is read at a time, so the place in it and all that the reading gathers are the state of the module. */
export let token: Token;
export let kind: TokenKind;
/** Where the token begins, and where the one before it ended. */
export let start: number;
export let lastEnd: number;
export let index: number;
export let depth: number;
export let context: Context;
/** Variable of the innermost integral, once dx was met. */
export let variable: string | null;
/** Letters that name functions here. */
export let functions: readonly string[];
export let flags: ReadingFlag[];
export let choices: Choice[];
/** The one decision to take the other way. */
export let flip: Choice | undefined;
/** Letters that a sum, a limit or a derivative binds here. */
export let bound: readonly string[];
let nodes: number;

/** The grammar's parts that call each other; handed over so that no module imports in a circle. */
export let sum: Read;
export let atoms: Atoms;

export const useGrammar = (readSum: Read, readAtoms: Atoms): void => {
  sum = readSum;
  atoms = readAtoms;
};

/** From here on, a letter names a function. */
export const introduce = (name: string): void => {
  functions = [...functions, name];
};

/** Goes to the beginning of a line. */
export const begin = (tex: string, settings: ReadSettings, flipped?: Choice): void => {
  tokenize(tex, settings);
  index = lastEnd = depth = nodes = 0;
  context = OUTSIDE;
  variable = null;
  functions = settings.functions;
  flags = hasLongRun ? ['letter-product'] : [];
  bound = choices = [];
  flip = flipped;
  look();
};

const look = (): void => {
  token = tokens[index]!;
  ({ kind, start } = token);
};

export const peek = (ahead: number): Token => tokens[index + ahead] ?? tokens.at(-1)!;

export const next = (): Token => {
  const taken = token;
  lastEnd = taken.end;
  if (kind !== '$') index += 1;
  look();
  return taken;
};

export const skip = (count: number): void => {
  for (let left = count; left > 0; left -= 1) next();
};

/** Is the token one of these kinds? */
export const is = (some: string): boolean => some.includes(kind);

/** Takes the token if it is one of these kinds. */
export const take = (some: string): boolean => is(some) && !!next();

/** Takes the token, which has to be one of these kinds. */
export const expect = (some: string, complaint: Complaint = some): Token => (is(some) ? next() : fail(complaint));

/** The kinds from here on that fit a sticky pattern; empty where they do not. */
export const ahead = (pattern: RegExp, from = 0): string => {
  const first = index + from;
  pattern.lastIndex = first;
  return pattern.test(kinds) ? kinds.slice(first, pattern.lastIndex) : '';
};

/** Takes the kinds that fit a sticky pattern, if they do. */
export const takeAll = (pattern: RegExp): string => {
  const found = ahead(pattern);
  skip(found.length);
  return found;
};

export const fail: (complaint: Complaint, from?: Span) => never = (complaint, from = token) =>
  refuse(complaint, from.start, from.end);

export const flag = (what: ReadingFlag): void => {
  if (!flags.includes(what)) flags.push(what);
};

/** True when the other way is to be taken. */
export const choose = (choice: Choice): boolean => {
  if (!choices.includes(choice)) choices.push(choice);
  return flip === choice;
};

/** The span of a node that ends here. */
export const span = (from: number): Span => {
  const found = { start: from, end: lastEnd };
  nodes += 1;
  if (nodes > MOST_NODES) fail('nodes', found);
  return found;
};

export const checkDepth = (levels: number): void => {
  if (levels > MOST_LEVELS) fail('levels');
};

/** Reads one level down; where the reading stands is put back afterwards. */
export const deeper = <Result>(read: Read<Result>, within = context, binding = bound): Result => {
  const before = context;
  const outerBound = bound;
  context = within;
  bound = binding;
  depth += 1;
  checkDepth(depth);
  const value = read();
  depth -= 1;
  context = before;
  bound = outerBound;
  return value;
};

/** Reads within a bracket or group, where the outer bars and differentials do not count. */
export const inside = <Result>(read: Read<Result>, within = OUTSIDE): Result => deeper(read, within);

/** Reads up to the bracket that closes the one just taken. */
export const enclosed = <Result>(
  close: TokenKind,
  read: Read<Result>,
  within?: Context,
  complaint?: Complaint,
): Result => {
  const value = inside(read, within);
  expect(close, complaint);
  return value;
};

/** Brackets and numerators within an integrand may hold its dx. */
export const holding = (): Context => (context.dx ? HOLDING : OUTSIDE);

/** Reads what a sign applies to, with a letter bound, so that an i is never the unit. */
export const binding = (name: string, read: Read): Expr => deeper(read, context, [...bound, name]);

/** Reads an integrand, and gives the letter of its dx. */
export const integrating = (read: Read): readonly [integrand: Expr, variable: string] => {
  const before = variable;
  variable = null;
  const integrand = inside(read, { ...context, dx: 'ends' });
  const found = variable ?? fail('dx');
  variable = before;
  return [integrand, found];
};

/** Takes dx, and reads what stands behind it; the 1 of `\int dx` where nothing does. */
export const behindDifferential = (read: Read): Expr => {
  const from = start;
  takeDifferential();
  return startsFactor() ? read() : numberOf(span(from), 1n);
};

/** Takes the d of dx and the letter after it. */
export const takeDifferential = (): void => {
  next();
  variable = next().text;
};

/** At the d of dx, with no dx met before. */
export const atDifferential = (): boolean =>
  token.text === 'd' && variable === null && ahead(/a[ai]/y) !== '' && (peek(1).text !== 'd' || peek(2).kind !== 'a');

/** Do the braces of a set that open some tokens ahead hold square brackets, so that they are brackets too? */
export const bracesAreBrackets = (from = 0): boolean => {
  if (peek(from).kind !== 's') return false;
  const { inner } = groupAhead(from);
  return /\[\](?!_|\^.\}?_)/.test(inner) && !/[,;]/.test(inner);
};

/**
 * The bracket that opens some tokens ahead: the kinds directly within it, nested brackets left empty, and where it ends.
 * Where it is not closed, that is at the end of the line.
 */
export const groupAhead = (from = 0): { readonly inner: string; readonly end: number } => {
  let depth = 0;
  let inner = '';
  for (let end = from; ; end += 1) {
    const { kind } = peek(end);
    if (')]}z⌋⌉'.includes(kind)) depth -= 1;
    if (kind === '$' || (depth <= 0 && end > from)) return { inner, end };
    if (depth === 1) inner += kind;
    if ('([{s⌊⌈'.includes(kind)) depth += 1;
  }
};

/** Can the token begin a factor, so that it multiplies what stands before it? */
export const startsFactor = (): boolean => {
  const { side } = token;
  if (kind === '|') return side === 'l' || (side === '' && context.bars === 0 && !barIsScripted());
  if (kind === '[') return !context.reversed || side === 'l';
  if (kind === '{') return !ahead(/\{\}/y);
  if (kind === 's') return bracesAreBrackets();
  if (kind === 'a') return context.dx !== 'ends' || !atDifferential();
  return atoms[kind] !== undefined;
};

export const barIsScripted = (): boolean => ahead(context.bars === 0 ? /\|(?:_|\^[^$])/y : /\|_/y) !== '';

/** Splits a number token as TeX does where one digit is an argument: `x^23` is x^2 followed by 3. */
export const takeDigit = (): Token => {
  const { text } = token;
  if (!text[1]) return next();
  const [digit] = /^\d[ \t-\r]*(?=\d)/.exec(source.slice(start, token.end)) ?? fail('digit');
  const first = { ...token, text: text[0]!, end: start + 1 };
  token.text = text.slice(1);
  token.start += digit.length;
  lastEnd = first.end;
  look();
  return first;
};

/** The span with the brackets, where there are any. */
export const outer = (expr: Expr): Span => expr.bracketed ?? expr.span;

export const numberOf = (place: Span, numerator: bigint): NumberExpr => ({
  kind: 'number',
  numerator,
  denominator: 1n,
  written: 'integer',
  decimals: 0,
  span: place,
});

/** What a single minus stands before, as in `-1`; null for all else. */
export const negated = (expr: Expr): Expr | null => {
  const [term, more] = expr.kind === 'sum' ? expr.terms : [];
  return term?.sign === 'minus' && !more ? term.expr : null;
};
