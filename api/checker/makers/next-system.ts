import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';
import { fraction, letter, neg, product, sum } from '../evidence/build.ts';
import { expanded, monomialExpr, spread, sumExpr, type Monomial } from '../evidence/monomials.ts';
import * as Q from '../numbers/rational.ts';
import { relation, type Relation } from '../slips/relations.ts';
import { degreeIn } from './polynomial-parts.ts';

type All = Extract<Line, { kind: 'any' | 'all' }>;

/**
 * The next line of a linear system solved by putting in: a letter alone, put into the other equation, that one solved,
 * its value put back. Null where both letters have their values, or the system is of another kind.
 */
export function nextSystem(line: All): Line | null {
  const equations = line.parts.filter((part): part is Relation => part.kind === 'relation' && part.sign === '=');
  if (equations.length !== line.parts.length || equations.length !== 2) return null;
  const alone = equations.findIndex(isAlone);
  if (alone < 0) return letterAlone(line, equations);
  const [first, other] = [equations[alone] as Relation, equations[1 - alone] as Relation];
  const name = nameOf(first);
  const changed = lettersOf(other.left).includes(name) || lettersOf(other.right).includes(name);
  if (changed) return withPart(line, 1 - alone, relation(put(other.left, first), '=', put(other.right, first)));
  const next = isAlone(other) && lettersOf(other.right).length === 0 ? joined(other) : workedOn(other);
  if (next) return withPart(line, 1 - alone, next);
  if (!isAlone(other)) return null;
  if (lettersOf(first.right).includes(nameOf(other)))
    return withPart(line, alone, relation(first.left, '=', put(first.right, other)));
  const value = joined(first);
  return value && withPart(line, alone, value);
}

/** The right side worked out. */
function joined({ left, right }: Relation): Relation | null {
  const terms = expanded(right);
  const found = terms && sumExpr(terms);
  return found && printExpr(found) !== printExpr(right) ? relation(left, '=', found) : null;
}

function withPart(line: All, place: number, part: Line): Line {
  return { ...line, parts: line.parts.map((own, k) => (k === place ? part : own)) };
}

function isAlone({ left, right }: Relation): boolean {
  return left.kind === 'letter' && !lettersOf(right).includes(left.name);
}

function nameOf({ left }: Relation): string {
  return left.kind === 'letter' ? left.name : '';
}

/** What a letter is, in brackets where it is a sum. */
function put(side: Expr, by: Relation): Expr {
  const name = nameOf(by);
  return mapExpr(side, (node) => (node.kind === 'letter' && node.name === name ? bracketed(by.right) : node));
}

function bracketed(expr: Expr): Expr {
  return expr.kind === 'sum' ? { ...expr, bracketed: expr.span } : expr;
}

/** A letter with the number 1 or -1 in front of it, alone on its side. */
function letterAlone(line: All, equations: readonly Relation[]): Line | null {
  for (const [place, equation] of equations.entries()) {
    const terms = expanded(sum(equation.left, ...negated(equation.right)));
    for (const name of terms ? lettersOf(equation.left) : []) {
      const own = (terms ?? []).filter((term) => degreeIn(term, name) === 1);
      const [only, ...more] = own;
      if (!only || more.length > 0 || only.coefficient.den !== 1n || Q.absolute(only.coefficient).num !== 1n) continue;
      const turn = Q.negate(only.coefficient);
      const rest = (terms ?? []).filter((term) => term !== only);
      const right = sumExpr(rest.map((term): Monomial => ({ ...term, coefficient: Q.mul(turn, term.coefficient) })));
      return withPart(line, place, relation(letter(name), '=', right));
    }
  }
  return null;
}

function negated(side: Expr): Expr[] {
  return (expanded(side) ?? []).map((term) => neg(monomialExpr(term)));
}

/** An equation in one letter: multiplied out, joined, its terms moved, divided. */
function workedOn(equation: Relation): Relation | null {
  const [name, ...others] = [...new Set([...lettersOf(equation.left), ...lettersOf(equation.right)])];
  if (!name || others.length > 0) return null;
  for (const form of [spread, expanded]) {
    const [left, right] = [form(equation.left), form(equation.right)];
    const found = left && right && relation(sumExpr(left), '=', sumExpr(right));
    if (found && !isSame(found, equation)) return found;
  }
  const terms = expanded(sum(equation.left, ...negated(equation.right))) ?? [];
  const own = terms.filter((term) => degreeIn(term, name) === 1);
  const rest = terms.filter((term) => degreeIn(term, name) === 0);
  const [only, ...more] = own;
  if (!only || more.length > 0 || own.length + rest.length !== terms.length) return null;
  const total = rest.reduce((sumOf, { coefficient }) => Q.sub(sumOf, coefficient), Q.zero);
  const moved = relation(product(fraction(only.coefficient), letter(name)), '=', fraction(total));
  if (!isSame(moved, equation)) return moved;
  const solved = relation(letter(name), '=', fraction(Q.div(total, only.coefficient)));
  return isSame(solved, equation) ? null : solved;
}

function isSame(a: Relation, b: Relation): boolean {
  return printExpr(a.left) === printExpr(b.left) && printExpr(a.right) === printExpr(b.right);
}
