import type { Expr, Line, Term } from '../../../shared/maths/expression.ts';
import { childrenOf, exprsOf } from '../../../shared/maths/walk.ts';
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
  if (given.kind !== copy.kind) return false;
  const [own, other] = [exprsOf(given), exprsOf(copy)];
  const count = { leaves: 0, changed: 0 };
  const isAlike = own.length === other.length && own.every((expr, k) => compareLeaves(expr, other[k] as Expr, count));
  return isAlike && count.leaves >= fewestLeaves && count.changed === 1;
}

const fewestLeaves = 4;

/** Counts numbers, letters and the signs between terms, and those that differ; false where the shapes do or too many differ. */
function compareLeaves(a: Expr, b: Expr, count: { leaves: number; changed: number }): boolean {
  if (a.kind === 'number' && b.kind === 'number')
    return addLeaf(a.numerator === b.numerator && a.denominator === b.denominator, count);
  if (a.kind === 'letter' && b.kind === 'letter') return addLeaf(a.name === b.name, count);
  if (a.kind === 'sum' && b.kind === 'sum') {
    if (a.terms.length !== b.terms.length || a.terms[0]?.sign !== b.terms[0]?.sign) return false;
    return a.terms.every(({ sign, expr }, k) => {
      const other = b.terms[k] as Term;
      const isSignAlike = (k === 0 && sign === 'plus') || addLeaf(sign === other.sign, count);
      return isSignAlike && compareLeaves(expr, other.expr, count);
    });
  }
  const [own, other] = [childrenOf(a), childrenOf(b)];
  return (
    a.kind === b.kind &&
    own.length === other.length &&
    own.every((part, k) => compareLeaves(part, other[k] as Expr, count))
  );
}

function addLeaf(isAlike: boolean, count: { leaves: number; changed: number }): boolean {
  count.leaves += 1;
  if (!isAlike) count.changed += 1;
  return count.changed <= 1;
}
