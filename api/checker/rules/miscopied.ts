import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { childrenOf, countNodes, exprsOf } from '../../../shared/maths/walk.ts';
import type { ReadDerivation } from '../read-derivation.ts';
import type { Route } from '../walk-derivation.ts';
import type { StepResult } from './step-result.ts';

/** A first line that fails and is the given but for one number, letter or sign was meant as a copy of it. */
export function noteMiscopied(read: ReadDerivation, rulings: readonly StepResult[], route: Route): StepResult[] {
  const [given, first] = read.lines;
  const [ruling, ...rest] = rulings;
  if (!ruling || !given?.ok || !first?.ok || ruling.ruling !== 'fails' || route.input.uses?.[1]) return [...rulings];
  return isMiscopy(given.line, first.line)
    ? [{ ...ruling, notes: [...ruling.notes, 'given-miscopied'] }, ...rest]
    : [...rulings];
}

function isMiscopy(given: Line, copy: Line): boolean {
  if (given.kind !== copy.kind || sizeOf(given) !== sizeOf(copy)) return false;
  const [a, b] = [exprsOf(given).flatMap(leavesOf), exprsOf(copy).flatMap(leavesOf)];
  if (a.length !== b.length || a.length < 4 || shapeOf(given) !== shapeOf(copy)) return false;
  return a.filter((leaf, k) => leaf !== b[k]).length === 1;
}

function sizeOf(line: Line): number {
  return exprsOf(line).reduce((nodes, expr) => nodes + countNodes(expr), 0);
}

function shapeOf(line: Line): string {
  const shape = (expr: Expr): string => `${expr.kind}(${childrenOf(expr).map(shape).join()})`;
  return exprsOf(line).map(shape).join(';');
}

/** Numbers and letters with the sign in front of their term. */
function leavesOf(expr: Expr): string[] {
  if (expr.kind === 'number') return [`${expr.numerator}/${expr.denominator}`];
  if (expr.kind === 'letter') return [expr.name];
  if (expr.kind === 'sum') {
    return expr.terms.flatMap((term, k) => {
      const sign: string[] = k === 0 && term.sign === 'plus' ? [] : [term.sign];
      return [...sign, ...leavesOf(term.expr)];
    });
  }
  return childrenOf(expr).flatMap(leavesOf);
}
