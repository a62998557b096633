import type { Scanner } from './scanner.ts';

/** A group of three digits, and the decimal mark where decimals follow, as the class writes them. */
const MARKS = {
  point: { group: /(?:\\,|\{,\})\d{3}(?!\d)/y, decimal: /(?:\.|\{\.\})(?=\d|\\(?:overline|dot|bar))/y },
  comma: { group: /(?:\\,|\.|\{\.\})\d{3}(?!\d)/y, decimal: /(?:,|\{,\})(?=\d|\\(?:overline|dot|bar))/y },
};

/**
 * A number, as `12`, `3.5` or `0.1(6)` in the token's text: digits that are displayed next to each other belong
 * together, so blanks between them do not count, and `{,}` or `\,` may group thousands.
 */
export function readNumber(scanner: Scanner): void {
  const start = scanner.at;
  const { group, decimal } = MARKS[scanner.settings.decimal];
  let text = digits(scanner) || '0';
  for (let more = text.length < 4; more;) {
    const three = scanner.take(group).slice(-3);
    text += three;
    more = three !== '';
  }
  if (scanner.take(decimal)) {
    text += '.' + digits(scanner) + repeating(scanner);
    if (scanner.take(/\.\./y)) scanner.fail('bad-number', start);
  } else if (scanner.take(/\.(?=\d)/y)) scanner.fail('bad-number ,', start);
  scanner.push('0', text, start);
}

/** Digits up to the first other character; blanks are jumped over only when a digit follows. */
function digits(scanner: Scanner): string {
  return scanner.take(/(?:[ \t-\r]*\d)+/y).replace(/\s/g, '');
}

/** `\overline{36}`, `\dot3` or `\dot1 4\dot7` after the decimal point, as `(36)`. */
function repeating(scanner: Scanner): string {
  const start = scanner.at;
  const mark = scanner.take(/\\(?:overline|dot|bar)/y);
  if (!mark) return '';
  let period = scanner.rawArgument().trim();
  if (mark === '\\dot') {
    const between = digits(scanner);
    if (scanner.take(/\\dot/y)) period += between + scanner.rawArgument().trim();
    else if (between) scanner.fail('bad-number \\dot', start);
  }
  if (!/^\d{1,200}$/.test(period)) scanner.fail('bad-number \\overline{3}', start);
  return `(${period})`;
}
