import type { Expr, FunctionName, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';
import { call, fraction, isZero, letter, neg, product, quotient, sum, whole } from '../evidence/build.ts';
import { isFiniteNumber } from '../evidence/complex-double.ts';
import { estimate } from '../evidence/estimate.ts';
import * as Q from '../numbers/rational.ts';
import { any, relation, signedTerms, type Relation } from '../slips/relations.ts';
import { factoredForm } from './next-expression.ts';
import { coefficientsOf } from './polynomial-parts.ts';

const functions = ['sin', 'cos', 'tan'] as const satisfies readonly FunctionName[];
/** Stands for the function; no letter of a line is called so. */
const stand = '\u25a1';
const nowhere = { letters: new Map(), definitions: { letters: new Map(), functions: new Map() } };

/**
 * The next line of an equation in one function of a letter, for angles from 0 on and below a full turn: all of it on the
 * left, in factors, and where the function alone has one of the known values, the angles. Null for anything else.
 */
export function nextOfTrigonometric(line: Relation, name: string): Line | null {
  if (line.sign !== '=') return null;
  const angles = anglesListed(line, name);
  if (angles) return angles;
  const [left, right] = [line.left, line.right];
  const used = functions.filter((own) => hasFunction(left, own, name) || hasFunction(right, own, name));
  const [only] = used;
  if (!only || used.length > 1) return null;
  const coefficients = coefficientsOf(inStand(sum(left, ...signedTerms(right).map(neg)), only, name), stand);
  if (!coefficients || coefficients.length < 3) return null;
  const back = (expr: Expr): Expr =>
    mapExpr(expr, (node) => (node.kind === 'letter' && node.name === stand ? call(only, letter(name)) : node));
  const all = [...signedTerms(left), ...signedTerms(right).map(neg)].filter((term) => !isZero(term));
  if (!isZero(right) || all.length < signedTerms(left).length) return relation(sum(...all), '=', whole(0));
  const factored = factoredForm(coefficients, stand);
  return factored.kind === 'product' ? relation(back(factored), '=', whole(0)) : null;
}

function isOwn(expr: Expr, own: FunctionName, name: string): boolean {
  const [argument] = expr.kind === 'call' && expr.name === own ? expr.args : [];
  return argument?.kind === 'letter' && argument.name === name;
}

function hasFunction(expr: Expr, own: FunctionName, name: string): boolean {
  let found = false;
  mapExpr(expr, (node) => {
    found ||= isOwn(node, own, name);
    return node;
  });
  return found;
}

function inStand(expr: Expr, own: FunctionName, name: string): Expr {
  return mapExpr(expr, (node) => (isOwn(node, own, name) ? letter(stand) : node));
}

const twelfths = Array.from({ length: 24 }, (_, k) => k).filter((k) => k % 2 === 0 || k % 3 === 0);

/** sin x = 1/2 as x = pi/6 or x = 5pi/6: the multiples of a sixth and of a fourth of pi. */
function anglesListed({ left, right }: Relation, name: string): Line | null {
  const own = functions.find((one) => isOwn(left, one, name));
  if (!own || lettersOf(right).length > 0) return null;
  const value = estimate(right, nowhere);
  if (!isFiniteNumber(value)) return null;
  const found = twelfths.filter((k) => Math.abs(Math[own]((k * Math.PI) / 12) - value.re) < 1e-12);
  return found.length > 0 ? any(found.map((k) => relation(letter(name), '=', angle(Q.rational(k, 12))))) : null;
}

function angle(turns: Q.Rational): Expr {
  if (Q.isZero(turns)) return whole(0);
  const pi: Expr = { kind: 'constant', name: 'pi', span: { start: 0, end: 0 } };
  const above = product(fraction({ num: turns.num, den: 1n }), pi);
  return turns.den === 1n ? above : quotient(above, whole(turns.den));
}
