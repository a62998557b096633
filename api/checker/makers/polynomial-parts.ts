import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { fraction, letter, power, product, sum, whole } from '../evidence/build.ts';
import { expanded, monomialExpr, type Monomial } from '../evidence/monomials.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';

/** Coefficients of a polynomial in one letter, lowest power first, no zero at the end; null for anything else. */
export function coefficientsOf(expr: Expr, name: string): Rational[] | null {
  const terms = expanded(expr);
  if (!terms) return null;
  const found: Rational[] = [];
  for (const term of terms) {
    const degree = degreeIn(term, name);
    if (degree === null || term.powers.size > (degree === 0 ? 0 : 1)) return null;
    while (found.length <= degree) found.push(Q.zero);
    found[degree] = term.coefficient;
  }
  return found;
}

/** The power of a letter in a term; null where it stands inside another part or below a fraction line. */
export function degreeIn(term: Monomial, name: string): number | null {
  let degree = 0;
  for (const { base, exponent } of term.powers.values()) {
    if (base.kind === 'letter' && base.name === name) degree = exponent;
    else if (lettersOf(base).includes(name)) return null;
  }
  return degree < 0 || degree > 12 ? null : degree;
}

/** Terms of a polynomial, the highest power first. */
export function polynomialExpr(coefficients: readonly Rational[], name: string): Expr {
  const terms = coefficients.map((coefficient, k) => product(fraction(coefficient), power(letter(name), whole(k))));
  return sum(...terms.filter((_, k) => !Q.isZero(coefficients[k] ?? Q.zero)).reverse());
}

/** Sorted by falling power of the letter, then as they stood. */
export function inOrder(terms: readonly Monomial[], name: string | undefined): Expr {
  const degree = (term: Monomial): number => (name ? (degreeIn(term, name) ?? 20) : 0);
  const sorted = [...terms].sort((a, b) => degree(b) - degree(a));
  return sorted.length === 0 ? whole(0) : sum(...sorted.map(monomialExpr));
}

/** The rational roots of a polynomial with small coefficients, each as often as it occurs. */
export function rationalRoots(coefficients: readonly Rational[]): Rational[] {
  let rest = withWholeCoefficients(coefficients);
  const roots: Rational[] = [];
  for (;;) {
    const root = rest.length > 1 ? firstRoot(rest) : null;
    if (!root) return roots;
    roots.push(root);
    rest = withWholeCoefficients(divided(rest, root));
  }
}

function firstRoot(coefficients: readonly Rational[]): Rational | null {
  const [constant] = coefficients;
  const lead = coefficients[coefficients.length - 1];
  if (!constant || !lead) return null;
  if (Q.isZero(constant)) return Q.zero;
  for (const num of divisorsOf(constant.num)) {
    for (const den of divisorsOf(lead.num)) {
      for (const candidate of [Q.rational(num, den), Q.rational(-num, den)]) {
        if (Q.isZero(valueAt(coefficients, candidate))) return candidate;
      }
    }
  }
  return null;
}

const largestSearched = 5000n;

function divisorsOf(value: bigint): bigint[] {
  const size = value < 0n ? -value : value;
  if (size > largestSearched) return [];
  const found: bigint[] = [];
  for (let k = 1n; k <= size; k += 1n) if (size % k === 0n) found.push(k);
  return found;
}

export function valueAt(coefficients: readonly Rational[], at: Rational): Rational {
  return [...coefficients].reverse().reduce((value, c) => Q.add(Q.mul(value, at), c), Q.zero);
}

function divided(coefficients: readonly Rational[], root: Rational): Rational[] {
  const result: Rational[] = [];
  let carried = Q.zero;
  for (const c of [...coefficients].reverse()) {
    carried = Q.add(Q.mul(carried, root), c);
    result.unshift(carried);
  }
  return result.slice(1);
}

export function withWholeCoefficients(coefficients: readonly Rational[]): Rational[] {
  const den = coefficients.reduce((common, c) => Q.lcm(common, c.den), 1n);
  const scaled = coefficients.map((c) => Q.mul(c, Q.rational(den)));
  const common = scaled.reduce((found, c) => Q.gcd(found, c.num), 0n);
  return common === 0n ? [] : scaled.map((c) => Q.div(c, Q.rational(common)));
}
