import * as Q from './rational.ts';
import type { Rational } from './rational.ts';

/**
 * A sum of monomials in atoms with fractions as coefficients; exponents are whole and may be negative. Atoms are
 * numbers given out by whoever builds the form; atom 0 is the imaginary unit, so its square is -1.
 */
export type Form = ReadonlyMap<string, Monomial>;

export interface Monomial {
  readonly coefficient: Rational;
  /** Atom and exponent, in increasing order of atoms. */
  readonly powers: readonly (readonly [number, number])[];
}

export const imaginaryAtom = 0;
const mostTerms = 80;

export function constantForm(value: Rational): Form {
  return Q.isZero(value) ? new Map() : new Map([['', { coefficient: value, powers: [] }]]);
}

export function atomForm(atom: number, exponent = 1): Form {
  return formOf([{ coefficient: Q.one, powers: [[atom, exponent]] }]);
}

export function keyOfPowers(powers: Monomial['powers']): string {
  return powers.map(([atom, exponent]) => `${atom}^${exponent}`).join('*');
}

function formOf(terms: readonly Monomial[]): Form {
  const form = new Map<string, Monomial>();
  for (const term of terms) addTerm(form, term);
  return form;
}

function addTerm(form: Map<string, Monomial>, term: Monomial): void {
  const key = keyOfPowers(term.powers);
  const found = form.get(key);
  const coefficient = found === undefined ? term.coefficient : Q.add(found.coefficient, term.coefficient);
  if (Q.isZero(coefficient)) form.delete(key);
  else form.set(key, { coefficient, powers: term.powers });
}

/** Null where the result has more terms than is worth the work. */
export function addForms(a: Form, b: Form): Form | null {
  const sum = new Map(a);
  for (const term of b.values()) addTerm(sum, term);
  return sum.size > mostTerms ? null : sum;
}

export function scaleForm(a: Form, factor: Rational): Form {
  if (Q.isZero(factor)) return new Map();
  return new Map([...a].map(([key, term]) => [key, { ...term, coefficient: Q.mul(term.coefficient, factor) }]));
}

export function mulForms(a: Form, b: Form): Form | null {
  if (a.size * b.size > 4 * mostTerms) return null;
  const product = new Map<string, Monomial>();
  for (const x of a.values()) for (const y of b.values()) addTerm(product, mulMonomials(x, y));
  return product.size > mostTerms ? null : product;
}

export function mulMonomials(x: Monomial, y: Monomial): Monomial {
  const powers = new Map(x.powers);
  for (const [atom, exponent] of y.powers) powers.set(atom, (powers.get(atom) ?? 0) + exponent);
  return reduced(Q.mul(x.coefficient, y.coefficient), powers);
}

function reduced(coefficient: Rational, powers: Map<number, number>): Monomial {
  let factor = coefficient;
  const turns = powers.get(imaginaryAtom);
  if (turns !== undefined) {
    const rest = ((turns % 4) + 4) % 4;
    if (rest >= 2) factor = Q.negate(factor);
    powers.set(imaginaryAtom, rest % 2);
  }
  const sorted = [...powers].filter(([, exponent]) => exponent !== 0).sort(([a], [b]) => a - b);
  return { coefficient: factor, powers: sorted };
}

export function powForm(a: Form, exponent: number): Form | null {
  if (a.size === 1) {
    const [term] = a.values();
    if (term !== undefined) {
      const powers = new Map(term.powers.map(([atom, n]) => [atom, n * exponent]));
      if (Q.bitLength(term.coefficient.num) * Math.abs(exponent) > 2_000) return null;
      return formOf([reduced(Q.pow(term.coefficient, exponent), powers)]);
    }
  }
  if (exponent < 0 || exponent > 12) return null;
  let result: Form | null = constantForm(Q.one);
  for (let k = 0; k < exponent && result !== null; k += 1) result = mulForms(result, a);
  return result;
}

/** The fraction that a form is, null where it holds an atom. */
export function constantOf(form: Form): Rational | null {
  if (form.size === 0) return Q.zero;
  const term = form.get('');
  return form.size === 1 && term !== undefined ? term.coefficient : null;
}

/** The same text for equal forms. */
export function keyOfForm(form: Form): string {
  return [...form]
    .map(([key, { coefficient }]) => `${coefficient.num}/${coefficient.den}[${key}]`)
    .sort()
    .join('+');
}

export interface PrimitiveForm {
  /** Content with the sign of the first monomial in order. */
  readonly content: Rational;
  /** Powers of atoms that all terms share. */
  readonly shared: Monomial['powers'];
  readonly rest: Form;
}

/** A form as content times shared powers times a form with whole coprime coefficients; null for zero. */
export function splitForm(form: Form): PrimitiveForm | null {
  const terms = [...form.values()];
  const [first] = terms;
  if (first === undefined) return null;
  let num = 0n;
  let den = 1n;
  for (const { coefficient } of terms) {
    num = Q.gcd(num, coefficient.num);
    den = Q.lcm(den, coefficient.den);
  }
  const lead = [...form].sort(([a], [b]) => (a < b ? 1 : -1))[0]?.[1] ?? first;
  const content = Q.rational(lead.coefficient.num < 0n ? -num : num, den);
  const shared = sharedPowers(terms);
  const inverse: Monomial = {
    coefficient: Q.div(Q.one, content),
    powers: shared.map(([atom, exponent]) => [atom, -exponent] as const),
  };
  return { content, shared, rest: formOf(terms.map((term) => mulMonomials(term, inverse))) };
}

function sharedPowers(terms: readonly Monomial[]): Monomial['powers'] {
  const [first, ...others] = terms;
  const shared = new Map(first?.powers ?? []);
  for (const { powers } of others) {
    const own = new Map(powers);
    for (const [atom, exponent] of shared) {
      const common = exponent > 0 ? Math.min(exponent, own.get(atom) ?? 0) : Math.max(exponent, own.get(atom) ?? 0);
      const sameSign = common !== 0 && common > 0 === exponent > 0;
      if (sameSign) shared.set(atom, common);
      else shared.delete(atom);
    }
  }
  shared.delete(imaginaryAtom);
  return [...shared];
}
