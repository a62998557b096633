import type { Expr, NumberExpr, ReadingFlag, ReadSettings, Span } from './expression.ts';
import { type Complaint, ReadFailure, type Scanner, type Token } from './scanner.ts';
import type { TokenKind } from './token-table.ts';

export const READ_LIMITS = { characters: 4000, levels: 60, nodes: 3000 } as const;

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
  bars: number;
  /** `[` ends an interval such as `]a,b[` instead of opening a bracket. */
  reversed: boolean;
  /** dx ends the integrand here, or may stand as a factor (numerators and brackets within an integrand). */
  dx: '' | 'ends' | 'held';
  /** Within `\lim_{x\to ..}`, where a trailing `^+` tells the side. */
  side: '' | 'argument' | 'limit' | 'left' | 'right';
}

const OUTSIDE: Context = { bars: 0, reversed: false, dx: '', side: '' };

export type Read = (reader: Reader) => Expr;

/** The grammar's parts that call each other; handed over so that no module imports in a circle. */
export interface Grammar {
  readonly sum: Read;
  /** `first`: a factor that was read already. */
  readonly product: (reader: Reader, first?: Expr) => Expr;
  readonly power: Read;
  readonly atoms: Partial<Record<TokenKind, Read>>;
}

/** The place in the tokens and all that the reading gathers on its way. */
export class Reader {
  index = 0;
  token: Token;
  lastEnd = 0;
  depth = 0;
  nodes = 0;
  context = OUTSIDE;
  /** Variable of the innermost integral, once dx was met. */
  variable: string | null = null;
  readonly bound: string[] = [];
  readonly flags = new Set<ReadingFlag>();
  readonly choices = new Set<Choice>();
  functions: readonly string[];
  readonly source: string;
  readonly tokens: readonly Token[];
  /** The kinds of the tokens, one character each. */
  readonly kinds: string;
  readonly settings: ReadSettings;
  readonly grammar: Grammar;
  /** The one decision to take the other way. */
  readonly flip: Choice | null;

  constructor(scanner: Scanner, grammar: Grammar, flip: Choice | null) {
    this.settings = scanner.settings;
    this.source = scanner.source;
    this.tokens = scanner.tokens;
    this.kinds = this.tokens.map((token) => token.kind).join('');
    this.token = this.peek(0);
    this.functions = this.settings.functions;
    this.grammar = grammar;
    this.flip = flip;
    if (scanner.longRun) this.flags.add('letter-product');
  }

  peek(ahead: number): Token {
    return this.tokens[this.index + ahead] ?? this.tokens[this.tokens.length - 1]!;
  }

  next(): Token {
    const { token } = this;
    this.lastEnd = token.end;
    if (token.kind !== '$') this.index += 1;
    this.token = this.peek(0);
    return token;
  }

  skip(count: number): void {
    for (let at = 0; at < count; at += 1) this.next();
  }

  /** Is the token one of these kinds? */
  is(kinds: string): boolean {
    return kinds.includes(this.token.kind);
  }

  /** Takes the token if it is one of these kinds. */
  take(kinds: string): boolean {
    return this.is(kinds) && !!this.next();
  }

  /** The kinds from here on that fit a sticky pattern; empty where they do not. */
  ahead(pattern: RegExp, from = 0): string {
    const start = this.index + from;
    pattern.lastIndex = start;
    return pattern.test(this.kinds) ? this.kinds.slice(start, pattern.lastIndex) : '';
  }

  /** Takes the kinds that fit a sticky pattern, if they do. */
  takeAll(pattern: RegExp): boolean {
    const { length } = this.ahead(pattern);
    this.skip(length);
    return length > 0;
  }

  expect(kind: TokenKind, complaint: Complaint = `missing-bracket ${kind}`): void {
    if (!this.take(kind)) this.fail(complaint);
  }

  fail(complaint: Complaint, from: Span = this.token): never {
    throw new ReadFailure(complaint, this.source, from);
  }

  /** True when the other way is to be taken. */
  choose(choice: Choice): boolean {
    this.choices.add(choice);
    return this.flip === choice;
  }

  span(start: number): Span {
    const span = { start, end: this.lastEnd };
    this.nodes += 1;
    if (this.nodes > READ_LIMITS.nodes) this.fail('too-many-nodes', span);
    return span;
  }

  /** Reads one level down. */
  deeper<T>(read: (reader: Reader) => T): T {
    this.depth += 1;
    if (this.depth > READ_LIMITS.levels) this.fail('too-deep');
    const value = read(this);
    this.depth -= 1;
    return value;
  }

  /** Reads within a bracket or group, where the outer bars and differentials do not count. */
  inside<T>(read: (reader: Reader) => T, change?: Partial<Context>): T {
    const outer = this.context;
    this.context = change ? { ...OUTSIDE, ...change } : OUTSIDE;
    const value = this.deeper(read);
    this.context = outer;
    return value;
  }

  /** Reads up to the bracket that closes the one just taken. */
  enclosed<T>(close: TokenKind, read: (reader: Reader) => T, change?: Partial<Context>, complaint?: Complaint): T {
    const value = this.inside(read, change);
    this.expect(close, complaint);
    return value;
  }

  /** Reads the product that a sign applies to, with a letter bound, so that an i is never the unit. */
  binding(name: string, read: Read): Expr {
    this.bound.push(name);
    const value = this.deeper(read);
    this.bound.pop();
    return value;
  }

  /** Brackets and numerators within an integrand may hold its dx. */
  holding(): Partial<Context> {
    return { dx: this.context.dx && 'held' };
  }

  /** Can the token begin a factor, so that it multiplies what stands before it? */
  startsFactor(): boolean {
    const { token, context } = this;
    const { kind, side } = token;
    if (kind === '|') return side === 'left' || (side === '' && context.bars === 0 && !this.barIsScripted());
    if (kind === '[') return !context.reversed || side === 'left';
    if (kind === '{') return !this.ahead(/\{\}/y);
    if (kind === 'a') return context.dx !== 'ends' || !this.atDifferential();
    return this.grammar.atoms[kind] !== undefined;
  }

  barIsScripted(): boolean {
    return this.ahead(this.context.bars === 0 ? /\|(?:_|\^[^$])/y : /\|_/y) !== '';
  }

  /** At the d of dx, with no dx met before. */
  atDifferential(): boolean {
    if (this.token.text !== 'd' || this.variable !== null || !this.ahead(/a[ai]/y)) return false;
    return this.peek(1).text !== 'd' || this.kinds[this.index + 2] !== 'a';
  }

  /** Splits a number token as TeX does where one digit is an argument: `x^23` is x^2 followed by 3. */
  takeDigit(): Token {
    const { token } = this;
    if (token.text.length === 1) return this.next();
    const [digit] = /^\d[ \t-\r]*(?=\d)/.exec(this.source.slice(token.start, token.end)) ?? this.fail('bad-number {');
    const first = { ...token, text: token.text.slice(0, 1), end: token.start + 1 };
    token.text = token.text.slice(1);
    token.start += digit.length;
    this.lastEnd = first.end;
    return first;
  }
}

/** The span with the brackets, where there are any. */
export function outer(expr: Expr): Span {
  return expr.bracketed ?? expr.span;
}

export function numberOf({ start, end }: Span, numerator: bigint): NumberExpr {
  return { kind: 'number', numerator, denominator: 1n, written: 'integer', decimals: 0, span: { start, end } };
}
