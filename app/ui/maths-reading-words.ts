import type { ReadError, ReadingFlag } from '../../shared/maths/expression.ts';

/** An obvious repair of a line that cannot be read. */
export interface Repair {
  readonly label: string;
  readonly tex: string;
}

/** A bracket never closed can be closed at the end; everything else is the author's to mend. */
export function repairOf({ code, expected }: ReadError, tex: string): Repair | null {
  const closing = expected.find((sign) => sign === ')' || sign === ']' || sign === '|');
  return code === 'missing-bracket' && closing ? { label: 'Close it at the end', tex: `${tex}${closing}` } : null;
}

/** Why a line is read back: what the eye might not expect. */
export const FLAG_WORDS: Record<ReadingFlag, string> = {
  'mixed-number': 'a whole number and a fraction, added',
  'slash-product': 'what stands right of the slash, up to the next sign, is below it',
  'function-argument': 'what the function takes in',
  'power-digits': 'only the first figure is the power',
  'inverse-function': 'the inverse function, not one over it',
  'letter-product': 'letters beside each other are multiplied',
  continues: 'goes on from the line above',
  'comma-or': 'the comma is read as “or”',
  'comma-and': 'the comma is read as “and”',
  'numbered-values': 'values of the letter without its number',
  percent: 'hundredths',
  'imaginary-unit': 'i is read as the imaginary unit',
  'log-base': 'the logarithm to base 10',
  'unknown-function': 'a letter times a bracket, not a function',
};
