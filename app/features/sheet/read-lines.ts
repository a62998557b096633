import type { Reading, ReadSettings } from '../../../shared/maths/expression.ts';
import { readLine } from '../../../shared/maths/read.ts';

/** Letters that a line introduces as functions; later lines read them so. */
export function introducedBy(reading: Reading): readonly string[] {
  return reading.ok && reading.line.kind === 'definition' && reading.line.params.length > 0 ? [reading.line.name] : [];
}

/** Lines read one after the other, each with the functions that those before it introduced. */
export function readLines(lines: readonly string[], settings: Omit<ReadSettings, 'functions'>): Reading[] {
  const functions: string[] = [];
  return lines.map((tex) => {
    const reading = readLine(tex, { ...settings, functions: [...functions] });
    functions.push(...introducedBy(reading));
    return reading;
  });
}
