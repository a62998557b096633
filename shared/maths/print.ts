import type { Expr, Line } from './expression.ts';
export function printExpr(expr: Expr): string {
  return expr.kind;
}
export function printLine(line: Line, _decimal?: string): string {
  return line.kind;
}
