import type { Expr, NumberExpr, ReadingFlag, ReadSettings, Span } from './expression.ts';
import type { TokenKind } from './token-table.ts';
import {
  type Complaint,
  kinds,
  hasLongRun,
  MOST_CHARACTERS,
  refuse,
  source,
  type Token,
  tokenize,
  tokens,
} from './tokens.ts';

const MOST_LEVELS = 60;
const MOST_NODES = 3000;
export const READ_LIMITS = { characters: MOST_CHARACTERS, levels: MOST_LEVELS, nodes: MOST_NODES } as const;

/** A decision that the text leaves open; the reader takes one way and remembers that there is another. */
export type Choice =
  | 'slash'
  | 'bars'
  | 'argument'
  | 'argument-slash'
  | 'argument-power'
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
let bound: string[];
let nodes: number;

/** The grammar's parts that call each other; handed over so that no module imports in a circle. */
export let sum: Read;
export let atoms: Atoms;

export function useGrammar(readSum: Read, readAtoms: Atoms): void {
  sum = readSum;
  atoms = readAtoms;
}

/** Goes to the beginning of a line. */
export function begin(tex: string, settings: ReadSettings, flipped?: Choice): void {
  tokenize(tex, settings);
  index = lastEnd = depth = nodes = 0;
  context = OUTSIDE;
  variable = null;
  functions = settings.functions;
  flags = hasLongRun ? ['letter-product'] : [];
  choices = [];
  flip = flipped;
  bound = [];
  look();
}

function look(): void {
  token = tokens[index]!;
  ({ kind, start } = token);
}

export function peek(ahead: number): Token {
  return tokens[index + ahead] ?? tokens.at(-1)!;
}

export function next(): Token {
  const taken = token;
  lastEnd = taken.end;
  if (kind !== '$') index += 1;
  look();
  return taken;
}

export function skip(count: number): void {
  for (let left = count; left > 0; left -= 1) next();
}

/** Is the token one of these kinds? */
export function is(some: string): boolean {
  return some.includes(kind);
}

/** Takes the token if it is one of these kinds. */
export function take(some: string): boolean {
  return is(some) && !!next();
}

/** Takes the token, which has to be one of these kinds. */
export function expect(some: string, complaint: Complaint = `missing-bracket ${some}`): Token {
  return is(some) ? next() : fail(complaint);
}

/** The kinds from here on that fit a sticky pattern; empty where they do not. */
export function ahead(pattern: RegExp, from = 0): string {
  const first = index + from;
  pattern.lastIndex = first;
  return pattern.test(kinds) ? kinds.slice(first, pattern.lastIndex) : '';
}

/** Takes the kinds that fit a sticky pattern, if they do. */
export function takeAll(pattern: RegExp): string {
  const found = ahead(pattern);
  skip(found.length);
  return found;
}

export function fail(complaint: Complaint, from: Span = token): never {
  return refuse(complaint, from.start, from.end);
}

export function flag(what: ReadingFlag): void {
  if (!flags.includes(what)) flags.push(what);
}

/** True when the other way is to be taken. */
export function choose(choice: Choice): boolean {
  if (!choices.includes(choice)) choices.push(choice);
  return flip === choice;
}

/** The span of a node that ends here. */
export function span(from: number): Span {
  const found = { start: from, end: lastEnd };
  nodes += 1;
  if (nodes > MOST_NODES) fail('too-many-nodes', found);
  return found;
}

export function checkDepth(levels: number): void {
  if (levels > MOST_LEVELS) fail('too-deep');
}

/** Reads one level down. */
export function deeper<Result>(read: Read<Result>): Result {
  depth += 1;
  checkDepth(depth);
  const value = read();
  depth -= 1;
  return value;
}

/** Reads within a bracket or group, where the outer bars and differentials do not count. */
export function inside<Result>(read: Read<Result>, within = OUTSIDE): Result {
  const before = context;
  context = within;
  const value = deeper(read);
  context = before;
  return value;
}

/** Reads up to the bracket that closes the one just taken. */
export function enclosed<Result>(
  close: TokenKind,
  read: Read<Result>,
  within?: Context,
  complaint?: Complaint,
): Result {
  const value = inside(read, within);
  expect(close, complaint);
  return value;
}

/** Brackets and numerators within an integrand may hold its dx. */
export function holding(): Context {
  return context.dx ? HOLDING : OUTSIDE;
}

/** Reads what a sign applies to, with a letter bound, so that an i is never the unit. */
export function binding(name: string, read: Read): Expr {
  bound.push(name);
  const value = deeper(read);
  bound.pop();
  return value;
}

export function isBound(name: string): boolean {
  return bound.includes(name);
}

/** Reads with other letters as functions. */
export function withFunctions<Result>(names: readonly string[], read: Read<Result>): Result {
  const before = functions;
  functions = names;
  const value = read();
  functions = before;
  return value;
}

/** Reads an integrand, and gives the letter of its dx. */
export function integrating(read: Read): readonly [integrand: Expr, variable: string] {
  const before = variable;
  variable = null;
  const integrand = inside(read, { ...context, dx: 'ends' });
  const found = variable ?? fail('bad-integral dx');
  variable = before;
  return [integrand, found];
}

/** Takes the d of dx and the letter after it. */
export function takeDifferential(): void {
  next();
  variable = next().text;
}

/** At the d of dx, with no dx met before. */
export function atDifferential(): boolean {
  if (token.text !== 'd' || variable !== null || !ahead(/a[ai]/y)) return false;
  return peek(1).text !== 'd' || kinds[index + 2] !== 'a';
}

/** Can the token begin a factor, so that it multiplies what stands before it? */
export function startsFactor(): boolean {
  const { side } = token;
  if (kind === '|') return side === 'l' || (side === '' && context.bars === 0 && !barIsScripted());
  if (kind === '[') return !context.reversed || side === 'l';
  if (kind === '{') return !ahead(/\{\}/y);
  if (kind === 'a') return context.dx !== 'ends' || !atDifferential();
  return atoms[kind] !== undefined;
}

export function barIsScripted(): boolean {
  return ahead(context.bars === 0 ? /\|(?:_|\^[^$])/y : /\|_/y) !== '';
}

/** Splits a number token as TeX does where one digit is an argument: `x^23` is x^2 followed by 3. */
export function takeDigit(): Token {
  const { text } = token;
  if (text.length === 1) return next();
  const [digit] = /^\d[ \t-\r]*(?=\d)/.exec(source.slice(start, token.end)) ?? fail('bad-number {');
  const first = { ...token, text: text.slice(0, 1), end: start + 1 };
  token.text = text.slice(1);
  token.start += digit.length;
  lastEnd = first.end;
  look();
  return first;
}

/** The span with the brackets, where there are any. */
export function outer(expr: Expr): Span {
  return expr.bracketed ?? expr.span;
}

export function numberOf(place: Span, numerator: bigint): NumberExpr {
  return { kind: 'number', numerator, denominator: 1n, written: 'integer', decimals: 0, span: place };
}
