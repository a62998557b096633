import type { Expr, ReadErrorCode, ReadingFlag, ReadSettings, Span } from './expression.ts';
import { isDigit, isBlank, ReadFailure, type Scanner, type Token } from './scanner.ts';
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
  /** dx ends the integrand here. */
  endsAtDifferential: boolean;
  /** dx may stand as a factor here (numerators and brackets within an integrand). */
  holdsDifferential: boolean;
  /** Within `\lim_{x\to ..}`, where a trailing `^+` tells the side. */
  side: '' | 'argument' | 'limit' | 'left' | 'right';
}

const OUTSIDE: Context = { bars: 0, reversed: false, endsAtDifferential: false, holdsDifferential: false, side: '' };

/** The grammar's parts that call each other; handed over so that no module imports in a circle. */
export interface Grammar {
  readonly sum: (reader: Reader) => Expr;
  /** `first`: a factor that was read already. */
  readonly product: (reader: Reader, first?: Expr) => Expr;
  readonly power: (reader: Reader) => Expr;
  readonly atoms: Partial<Record<TokenKind, (reader: Reader) => Expr>>;
}

/** The place in the tokens and all that the reading gathers on its way. */
export class Reader {
  index = 0;
  token: Token;
  lastEnd = 0;
  depth = 0;
  nodes = 0;
  context: Context = OUTSIDE;
  /** Variable of the innermost integral, once dx was met. */
  differential: { variable: string | null } = { variable: null };
  readonly bound: string[] = [];
  readonly flags = new Set<ReadingFlag>();
  readonly choices = new Set<Choice>();
  functions: readonly string[];
  readonly source: string;
  readonly tokens: readonly Token[];

  constructor(
    scanner: Scanner,
    readonly settings: ReadSettings,
    readonly grammar: Grammar,
    /** The one decision to take the other way. */
    readonly flip: Choice | null,
  ) {
    this.source = scanner.source;
    this.tokens = scanner.tokens;
    this.token = this.peek(0);
    this.functions = settings.functions;
    if (scanner.longRun) this.flags.add('letter-product');
  }

  peek(ahead: number): Token {
    return this.tokens[this.index + ahead] ?? this.tokens[this.tokens.length - 1]!;
  }

  next(): Token {
    const { token } = this;
    this.lastEnd = token.end;
    if (token.kind !== 'end-of-line') this.index += 1;
    this.token = this.peek(0);
    return token;
  }

  is(kind: TokenKind): boolean {
    return this.token.kind === kind;
  }

  /** Takes the token if it is of that kind. */
  take(kind: TokenKind): boolean {
    if (this.token.kind !== kind) return false;
    this.next();
    return true;
  }

  expect(kind: TokenKind, code: ReadErrorCode, expected: string): void {
    if (!this.take(kind)) this.fail(code, [expected]);
  }

  fail(code: ReadErrorCode, expected: readonly string[], from: Span = this.token): never {
    throw new ReadFailure(
      code,
      { start: from.start, end: from.end },
      this.source.slice(from.start, from.end),
      expected,
    );
  }

  /** True when the other way is to be taken. */
  choose(choice: Choice): boolean {
    this.choices.add(choice);
    return this.flip === choice;
  }

  span(start: number): Span {
    this.nodes += 1;
    if (this.nodes > READ_LIMITS.nodes) this.fail('too-many-nodes', [], { start, end: this.lastEnd });
    return { start, end: this.lastEnd };
  }

  /** One level down; `leave` goes up again. */
  enter(): void {
    this.depth += 1;
    if (this.depth > READ_LIMITS.levels) this.fail('too-deep', []);
  }

  leave(): void {
    this.depth -= 1;
  }

  /** Reads within a bracket or group, where the outer bars and differentials do not count. */
  inside<T>(read: (reader: Reader) => T, change?: Partial<Context>): T {
    const outer = this.context;
    this.context = change ? { ...OUTSIDE, ...change } : OUTSIDE;
    this.enter();
    const value = read(this);
    this.leave();
    this.context = outer;
    return value;
  }

  /** Reads with some letters bound, so that an i among them is never the unit. */
  binding<T>(name: string, read: () => T): T {
    this.bound.push(name);
    const value = read();
    this.bound.pop();
    return value;
  }

  /** Can the token begin a factor, so that it multiplies what stands before it? */
  startsFactor(): boolean {
    const { kind, side } = this.token;
    switch (kind) {
      case '|':
        return side === 'left' || (side === '' && this.context.bars === 0 && !this.barIsScripted());
      case '[':
        return !this.context.reversed || side === 'left';
      case '{':
        return this.peek(1).kind !== '}';
      case 'letter':
        return !(this.context.endsAtDifferential && this.atDifferential());
      default:
        return this.grammar.atoms[kind] !== undefined;
    }
  }

  barIsScripted(): boolean {
    const after = this.peek(1).kind;
    return after === '_' || (after === '^' && this.peek(2).kind !== 'end-of-line' && this.context.bars === 0);
  }

  /** At the d of dx, with no dx met before. */
  atDifferential(): boolean {
    if (this.token.text !== 'd' || this.differential.variable !== null) return false;
    const variable = this.peek(1);
    if (variable.kind !== 'letter' && variable.kind !== 'i') return false;
    return variable.text !== 'd' || this.peek(2).kind !== 'letter';
  }

  /** Splits a number token as TeX does where one digit is an argument: `x^23` is x^2 followed by 3. */
  takeDigit(): Token {
    const { token } = this;
    if (token.text.length === 1) return this.next();
    const digit: Token = { ...token, text: token.text[0] ?? '', end: token.start + 1 };
    let rest = token.start + 1;
    while (isBlank(this.source.charCodeAt(rest))) rest += 1;
    const isSplit = isDigit(this.source.charCodeAt(token.start)) && isDigit(this.source.charCodeAt(rest));
    if (!isSplit) this.fail('bad-number', ['{'], token);
    token.text = token.text.slice(1);
    token.start = rest;
    this.lastEnd = digit.end;
    return digit;
  }

  /** Goes back to an earlier place; no number between may have been split. */
  rewind(index: number): void {
    this.index = index;
    this.token = this.peek(0);
    this.lastEnd = index > 0 ? (this.tokens[index - 1]?.end ?? 0) : 0;
  }
}

/** The span with the brackets, where there are any. */
export function outer(expr: Expr): Span {
  return expr.bracketed ?? expr.span;
}

export function numberOf(token: Span, value: bigint): Expr {
  return {
    kind: 'number',
    numerator: value,
    denominator: 1n,
    written: 'integer',
    decimals: 0,
    span: { start: token.start, end: token.end },
  };
}
