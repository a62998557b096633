import { readLine } from '../../shared/maths/read.ts';

/** The letter that a task writes as TeX, by the name that it has in the lines: `x_{1}` is x_1. */
export function letterNamed(tex: string): string {
  const reading = readLine(tex);
  if (!reading.ok || reading.line.kind !== 'expression' || reading.line.expr.kind !== 'letter') return tex;
  return reading.line.expr.name;
}
