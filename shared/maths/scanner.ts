import type { ReadErrorCode, ReadSettings, Span } from './expression.ts';
import type { TokenKind } from './token-table.ts';

export interface Token {
  kind: TokenKind;
  /** Digits, the letter or the function in its canonical spelling; the words of a `\text`. */
  text: string;
  start: number;
  readonly end: number;
  /** A spacing command such as `\,` stands before it. */
  readonly gap: boolean;
  /** Which of `\left` and `\right` sized it. */
  readonly side: '' | 'left' | 'right';
}

/** Thrown inside the reader only; `readLine` turns it into a value. */
export class ReadFailure extends Error {
  constructor(
    readonly code: ReadErrorCode,
    readonly span: Span,
    readonly found: string,
    readonly expected: readonly string[],
  ) {
    super(code);
  }
}

/** The text being cut into tokens. */
export class Scanner {
  at = 0;
  gap = false;
  side: '' | 'left' | 'right' = '';
  /** A run of four letters or more that names no function. */
  longRun = false;
  /** Closing braces that group nothing. */
  readonly passedOver = new Set<number>();
  readonly tokens: Token[] = [];

  constructor(
    readonly source: string,
    readonly settings: ReadSettings,
  ) {}

  push(kind: TokenKind, text: string, start: number): void {
    this.tokens.push({ kind, text, start, end: this.at, gap: this.gap, side: this.side });
    this.gap = false;
    this.side = '';
  }

  fail(code: ReadErrorCode, start: number, end: number, expected: readonly string[] = []): never {
    throw new ReadFailure(code, { start, end }, this.source.slice(start, end), expected);
  }

  skipBlanks(): void {
    while (isBlank(this.source.charCodeAt(this.at))) this.at += 1;
  }

  /** The braced text after a command, without its braces; a single character where there are none. */
  rawArgument(): string {
    this.skipBlanks();
    const { source } = this;
    if (source[this.at] !== '{') {
      const name = source[this.at] === '\\' ? commandName(source, this.at + 1) : '';
      const start = this.at;
      this.at += name ? name.length + 1 : 1;
      return source.slice(start, this.at);
    }
    const start = this.at + 1;
    let depth = 0;
    for (let at = this.at; at < source.length; at += 1) {
      const char = source[at];
      if (char === '\\') at += 1;
      else if (char === '{') depth += 1;
      else if (char === '}' && --depth === 0) {
        this.at = at + 1;
        return source.slice(start, at);
      }
    }
    return this.fail('missing-bracket', this.at, source.length, ['}']);
  }
}

/** Letters of a command, or its one other character. */
export function commandName(source: string, from: number): string {
  let end = from;
  while (isLetter(source.charCodeAt(end))) end += 1;
  return source.slice(from, end === from ? from + 1 : end);
}

export function isDigit(code: number): boolean {
  return code >= 48 && code <= 57;
}

export function isLetter(code: number): boolean {
  return (code >= 97 && code <= 122) || (code >= 65 && code <= 90);
}

export function isBlank(code: number): boolean {
  return code === 32 || (code >= 9 && code <= 13);
}
