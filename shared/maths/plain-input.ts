/** Environments whose rows are lines of their own. */
const LAYOUTS =
  /\\(?:begin|end)\{(?:align|aligned|gather|gathered|eqnarray|equation|split|multline|displaymath|math)\*?\}(?:\[[a-z]\])?/g;

/**
 * Splits pasted text into the TeX of single lines: rows of align environments and displayed formulas, one formula or one
 * typed line each. Matrices and cases keep their rows. Blank lines and alignment marks go.
 */
export function linesFromPaste(text: string): readonly string[] {
  const source = text
    .replaceAll('\r', '')
    .replace(/\\\\\s*\[-?[\d.]+ *[a-z]{2}\]/g, '\\\\')
    .replace(/(?<!\\)\\[[\]]|\$\$/g, '\n$$')
    .replace(/(?<!\\)\\[()]/g, '$$')
    .replace(LAYOUTS, '\n$$');
  const lines = splitRows(source);
  return lines.map(cleanLine).filter((line) => line !== '');
}

/** At line ends and at `\\`, except within a block that stays together, such as a matrix. */
function splitRows(source: string): string[] {
  const rows: string[] = [];
  let row = '';
  let depth = 0;
  for (const [piece] of source.matchAll(/\\(?:[a-zA-Z]+|[^])|[^\\\n]+|\n|\\/g)) {
    if (piece === '\\begin') depth += 1;
    if (piece === '\\end') depth = Math.max(0, depth - 1);
    const isBreak = piece === '\n' || piece === '\\\\' || piece === '\\cr' || piece === '\\newline';
    if (isBreak && depth === 0) {
      rows.push(row);
      row = '';
    } else if (piece === '&' && depth === 0) row += ' ';
    else row += depth === 0 ? piece.replaceAll('&', ' ') : piece === '\n' ? ' ' : piece;
  }
  return [...rows, row];
}

function cleanLine(raw: string): string {
  const line = raw
    .replace(/\\(?:nonumber|notag|label\{[^}]*\}|tag\*?\{[^}]*\})/g, '')
    .replaceAll('$', '')
    .replace(/^\s*(?:\d{1,2}[.)]\s|•)/, '')
    .replace(/\s+/g, ' ')
    .trim();
  return raw.includes('$') || line.includes('\\') ? line : plainToTex(line);
}

/** Typed maths without a backslash: a power takes all its digits, its sign and its bracket, as the typist meant. */
export function plainToTex(line: string): string {
  let text = '';
  for (let at = 0; at < line.length; at += 1) {
    const isPower = line[at] === '^' || (line[at] === '*' && line[at + 1] === '*');
    if (!isPower) {
      text += line[at];
      continue;
    }
    if (line[at] === '*') at += 1;
    const exponent = takeExponent(line.slice(at + 1));
    const raised = stripBrackets(plainToTex(exponent.trim()));
    text += raised.length < 2 ? `^${raised}` : `^{${raised}}`;
    at += exponent.length;
  }
  return text;
}

/** `10`, `-2`, `(n+1)`, `x`: what stands raised after a caret. */
function takeExponent(rest: string): string {
  if (/^\s*\{/.test(rest)) return '';
  const simple = /^\s*[-+−]?\s*(?:\d+(?:[.]\d+)?|[a-zA-Zα-ω])/.exec(rest);
  if (simple) return simple[0];
  const open = /^\s*[-+−]?\s*\(/.exec(rest);
  if (!open) return '';
  let depth = 0;
  for (let at = open[0].length - 1; at < rest.length; at += 1) {
    if (rest[at] === '(') depth += 1;
    if (rest[at] === ')' && --depth === 0) return rest.slice(0, at + 1);
  }
  return '';
}

function stripBrackets(text: string): string {
  if (!text.startsWith('(') || !text.endsWith(')')) return text;
  let depth = 0;
  for (let at = 0; at < text.length - 1; at += 1) {
    if (text[at] === '(') depth += 1;
    if (text[at] === ')' && --depth === 0) return text;
  }
  return text.slice(1, -1);
}
