import type { ReadError, ReadErrorCode, ReadSettings, Span } from './expression.ts';
import type { TokenKind } from './token-table.ts';

export interface Token {
  readonly kind: TokenKind;
  /** Digits, the letter or the function in its canonical spelling; the words of a `\text`. */
  text: string;
  start: number;
  readonly end: number;
  /** A spacing command such as `\,` stands before it. */
  readonly gap: boolean;
  /** Which of `\left` and `\right` sized it. */
  readonly side: Side;
}

export type Side = '' | 'left' | 'right';

/** An error's code and, parted by blanks, what was expected. */
export type Complaint = ReadErrorCode | `${ReadErrorCode} ${string}`;

/** Thrown inside the reader only; `readLine` turns it into a value. */
export class ReadFailure extends Error {
  readonly error: ReadError;

  constructor(complaint: Complaint, source: string, { start, end }: Span) {
    super(complaint);
    // The blank in `\to 0` parts nothing.
    const [code, ...expected] = complaint.split(/ (?!0)/);
    this.error = { code: code as ReadErrorCode, span: { start, end }, found: source.slice(start, end), expected };
  }
}

export const BLANKS = /[ \t-\r]+/y;

/** The text being cut into tokens. */
export class Scanner {
  at = 0;
  gap = false;
  side: Side = '';
  /** A run of four letters or more that names no function. */
  longRun = false;
  /** Closing braces that group nothing. */
  readonly passedOver = new Set<number>();
  readonly tokens: Token[] = [];
  readonly source: string;
  readonly settings: ReadSettings;

  constructor(source: string, settings: ReadSettings) {
    this.source = source;
    this.settings = settings;
  }

  push(kind: TokenKind, text: string, start: number, end = this.at): void {
    this.tokens.push({ kind, text, start, end, gap: this.gap, side: this.side });
    this.gap = false;
    this.side = '';
  }

  fail(complaint: Complaint, start: number, end = this.at): never {
    throw new ReadFailure(complaint, this.source, { start, end });
  }

  /** Takes what fits the sticky pattern here; empty where nothing does. */
  take(pattern: RegExp): string {
    const { source, at } = this;
    pattern.lastIndex = at;
    if (!pattern.test(source)) return '';
    this.at = pattern.lastIndex;
    return source.slice(at, this.at);
  }

  /** The braced text after a command, without its braces; a single character or command where there are none. */
  rawArgument(): string {
    this.take(BLANKS);
    const start = this.at;
    if (!this.take(/\{/y)) return this.take(/\\(?:[a-zA-Z]+|[^])|[^]/y);
    for (let depth = 1; depth > 0;) {
      const piece = this.take(/\\?[^]/y);
      if (!piece) this.fail('missing-bracket }', start);
      if (piece === '{') depth += 1;
      if (piece === '}') depth -= 1;
    }
    return this.source.slice(start + 1, this.at - 1);
  }
}

export function isLetter(code: number): boolean {
  return (code >= 97 && code <= 122) || (code >= 65 && code <= 90);
}
