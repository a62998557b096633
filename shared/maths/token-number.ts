import { isBlank, isDigit, type Scanner } from './scanner.ts';

/**
 * A number, as `12`, `3.5` or `0.1(6)` in the token's text: digits that are displayed next to each other belong
 * together, so blanks between them do not count, and `{,}` or `\,` may group thousands.
 */
export function readNumber(scanner: Scanner): void {
  const start = scanner.at;
  let text = digits(scanner) || '0';
  text = grouped(scanner, text);
  const point = scanner.settings.decimal === 'comma' ? ',' : '.';
  const braced = `{${point}}`;
  const { source } = scanner;
  const mark = source[scanner.at] === point ? 1 : source.startsWith(braced, scanner.at) ? 3 : 0;
  if (mark > 0 && startsDecimals(source, scanner.at + mark)) {
    scanner.at += mark;
    text += '.' + digits(scanner) + repeating(scanner);
    if (source[scanner.at] === '.' && source[scanner.at + 1] === '.') scanner.fail('bad-number', start, scanner.at + 2);
  } else if (source[scanner.at] === '.' && isDigit(source.charCodeAt(scanner.at + 1))) {
    scanner.fail('bad-number', start, scanner.at + 1, [',']);
  }
  scanner.push('number', text, start);
}

function startsDecimals(source: string, at: number): boolean {
  return (
    isDigit(source.charCodeAt(at)) || (source[at] === '\\' && REPEATING.some((name) => source.startsWith(name, at)))
  );
}

const REPEATING = ['\\overline', '\\dot', '\\bar'];

/** Digits up to the first other character; blanks are jumped over only when a digit follows. */
function digits(scanner: Scanner): string {
  const { source } = scanner;
  let text = '';
  let at = scanner.at;
  for (;;) {
    const from = at;
    while (isDigit(source.charCodeAt(at))) at += 1;
    text += source.slice(from, at);
    if (at > from) scanner.at = at;
    if (!isBlank(source.charCodeAt(at))) return text;
    while (isBlank(source.charCodeAt(at))) at += 1;
    if (!isDigit(source.charCodeAt(at))) return text;
  }
}

/** `1\,000\,000` and `1{,}000`: groups of exactly three. */
function grouped(scanner: Scanner, first: string): string {
  const { source, settings } = scanner;
  let text = first;
  const separators = settings.decimal === 'comma' ? ['\\,', '{.}', '.'] : ['\\,', '{,}'];
  for (;;) {
    const separator = separators.find((mark) => source.startsWith(mark, scanner.at));
    if (separator === undefined || (text.length > 3 && text === first)) return text;
    const from = scanner.at + separator.length;
    if (!isGroup(source, from)) return text;
    text += source.slice(from, from + 3);
    scanner.at = from + 3;
  }
}

function isGroup(source: string, from: number): boolean {
  for (let at = from; at < from + 3; at += 1) if (!isDigit(source.charCodeAt(at))) return false;
  return !isDigit(source.charCodeAt(from + 3));
}

/** `\overline{36}`, `\dot3` or `\dot1 4\dot7` after the decimal point, as `(36)`. */
function repeating(scanner: Scanner): string {
  const { source, at: start } = scanner;
  const name = REPEATING.find((command) => source.startsWith(command, start));
  if (name === undefined) return '';
  scanner.at += name.length;
  const first = scanner.rawArgument().trim();
  let period = first;
  if (name === '\\dot') {
    const between = digits(scanner);
    if (source.startsWith('\\dot', scanner.at)) {
      scanner.at += 4;
      period += between + scanner.rawArgument().trim();
    } else if (between !== '') scanner.fail('bad-number', start, scanner.at, ['\\dot']);
  }
  if (!/^\d{1,200}$/.test(period)) scanner.fail('bad-number', start, scanner.at, ['\\overline{3}']);
  return `(${period})`;
}
