import { addForms, constantForm, imaginaryAtom, keyOfForm, mulForms } from '../numbers/form.ts';
import type { Form, Monomial } from '../numbers/form.ts';
import { addMod, bigMod, imaginaryMod, inverseMod, mulMod, negateMod, powMod, sqrtMod } from '../numbers/modular.ts';
import type { Random } from '../numbers/random.ts';
import * as Q from '../numbers/rational.ts';
import type { GraphNode } from '../values/graph.ts';
import { imaginaryForm, isArc, radicandOfArc } from './kernel-plan.ts';
import type { KernelPlan } from './kernel-plan.ts';
import type { Atom } from './normal-forms.ts';
import { noResidue } from './modular-values.ts';
import type { Kernel } from './modular-values.ts';
import { signOfAtom } from './signs.ts';

/** Residues of the generators modulo one prime, for one combination of the choices. */
export interface KernelValues {
  readonly letters: ReadonlyMap<string, number>;
  readonly kernel: Kernel;
  /** A root did not exist modulo this prime at this point: try another. */
  readonly failed: () => boolean;
}

export function createKernelValues(
  nodes: readonly GraphNode[],
  plan: KernelPlan,
  names: readonly string[],
  complex: boolean,
  p: number,
  random: Random,
  choice: ReadonlyMap<string, number>,
): KernelValues {
  const { forms } = plan;
  const generators = new Map<string, number>();
  const ownValues = new Map<string, number>();
  const atomValues = new Map<number, number>();
  const unit = imaginaryMod(p);
  let failed = false;
  const letters = new Map<string, number>();
  let residues: Float64Array = new Float64Array(0);

  function fail(): number {
    failed = true;
    return 1;
  }
  function inverse(a: number): number {
    return a === 0 ? fail() : inverseMod(a, p);
  }
  function power(base: number, exponent: number): number {
    return powMod(exponent < 0 ? inverse(base) : base, Math.abs(exponent), p);
  }
  function fraction(value: Q.Rational): number {
    const den = bigMod(value.den, p);
    return mulMod(bigMod(value.num, p), inverse(den), p);
  }
  function formValue(form: Form): number {
    let total = 0;
    for (const { coefficient, powers } of form.values()) {
      let term = fraction(coefficient);
      for (const [id, exponent] of powers) term = mulMod(term, power(atomValue(id), exponent), p);
      total = addMod(total, term, p);
    }
    return total;
  }
  function atomValue(id: number): number {
    const found = atomValues.get(id);
    if (found !== undefined) return found;
    const value = makeAtom(id);
    atomValues.set(id, value);
    return value;
  }
  function makeAtom(id: number): number {
    const atom = forms.atoms[id];
    if (id === imaginaryAtom) return unit;
    switch (atom?.kind) {
      case 'letter':
        return letters.get(atom.name) ?? fail();
      case 'e':
        return expValue(oneForm);
      case 'factor':
        return formValue(atom.form);
      case 'other': {
        const node = nodes[atom.node];
        // Nodes that are written by generators come first; the rest are quantities of their own.
        return node !== undefined && isWritten(node, complex) ? (residues[atom.node] ?? fail()) : 1 + random(p - 1);
      }
      default:
        return 1 + random(p - 1);
    }
  }
  /** e to a form whose monomials all have a generator. */
  function expValue(form: Form): number {
    let product = 1;
    for (const [key, monomial] of form) {
      const degree = plan.denominators.get(key) ?? 1;
      const exponent = Q.mul(monomial.coefficient, Q.rational(degree));
      if (exponent.den !== 1n) return fail();
      product = mulMod(product, power(generator(key, monomial, degree), Number(exponent.num)), p);
    }
    return product;
  }
  function generator(key: string, monomial: Monomial, degree: number): number {
    const found = generators.get(key);
    if (found !== undefined) return found;
    const value = makeGenerator(key, monomial, degree);
    generators.set(key, value);
    return value;
  }
  function makeGenerator(key: string, { powers }: Monomial, degree: number): number {
    const kinds = powers.map(([id]) => forms.atoms[id]);
    const [first, second] = powers;
    if (powers.length === 1 && first?.[1] === 1 && kinds[0]?.kind === 'log')
      return rootOfSize(kinds[0].of, degree, key);
    if (powers.length === 2 && kinds[0]?.kind === 'imaginary' && kinds[1]?.kind === 'pi' && second?.[1] === 1) {
      return unityRoot(2 * degree);
    }
    if (isArc(powers, kinds, degree)) return arcValue(kinds[1]);
    return 1 + random(p - 1);
  }
  function unityRoot(order: number): number {
    if ((p - 1) % order !== 0) return fail();
    const g = primitiveRoot(p);
    // The root of order 4 has to be the same i as everywhere else.
    return powMod(powMod(g, (p - 1) / 4, p) === unit ? g : inverse(g), (p - 1) / order, p);
  }
  /** t with t^degree = |f|. */
  function rootOfSize(of: number | bigint, degree: number, key: string): number {
    if (typeof of === 'bigint') return surd(of, degree);
    const atom = forms.atoms[of];
    if (atom?.kind === 'letter') return letterRoots.get(atom.name) ?? fail();
    const value = atomValue(of);
    const known = signOfAtom(of, forms.atoms, plan.signs);
    const isNegative = known === null ? choice.get(`sign ${of}`) === 1 : known < 0;
    const root = rootMod(isNegative ? negateMod(value, p) : value, degree);
    const twos = degree & -degree;
    const turn = choice.get(`root ${key}`) ?? 0;
    return turn === 0 ? root : mulMod(root, powMod(unityRoot(twos), turn, p), p);
  }
  /** Square roots of 2, 3 and 5 lie among the roots of unity and have to agree with them. */
  function surd(prime: bigint, degree: number): number {
    if (!plan.turns || degree === 1 || prime > 5n) return rootMod(bigMod(prime, p), degree);
    if (degree !== 2) return fail();
    const z = unityRoot(prime === 2n ? 8 : prime === 3n ? 12 : 5);
    const sum = addMod(z, inverse(z), p);
    return prime === 5n ? addMod(1, addMod(sum, sum, p), p) : sum;
  }
  function rootMod(value: number, degree: number): number {
    if (value === 0) return fail();
    let odd = degree;
    let result = value;
    while (odd % 2 === 0) odd /= 2;
    if (odd > 1) result = powMod(result, inverseMod(odd % (p - 1), p - 1), p);
    for (let rest = degree / odd; rest > 1; rest /= 2) {
      const root = sqrtMod(result, p);
      if (root === null) return fail();
      result = root;
    }
    return result;
  }
  function arcValue(atom: Atom | undefined): number {
    const radicand = radicandOfArc(atom);
    const log = radicand && forms.logOfForm(radicand);
    if (log === null || (atom?.kind !== 'arcsine' && atom?.kind !== 'arctangent')) return fail();
    const root = expValue(scaled(log, Q.rational(1, 2)));
    const turned = mulMod(unit, formValue(atom.form), p);
    return atom.kind === 'arcsine' ? addMod(root, turned, p) : mulMod(addMod(1, turned, p), inverse(root), p);
  }

  const letterRoots = new Map<string, number>();
  for (const name of names) {
    const t = 1 + random(p - 1);
    const id = forms.atoms.findIndex((atom) => atom.kind === 'letter' && atom.name === name);
    const logId = forms.atoms.findIndex((atom) => atom.kind === 'log' && atom.of === id);
    const degree = plan.denominators.get(`${logId}^1`) ?? 1;
    letterRoots.set(name, t);
    const size = powMod(t, degree, p);
    const known = signOfAtom(id, forms.atoms, plan.signs);
    const isNegative = known === null ? choice.get(`sign ${id}`) === 1 : known < 0;
    letters.set(name, isNegative ? negateMod(size, p) : size);
  }

  function circular(name: string, w: number): number {
    const v = inverse(w);
    const half = inverseMod(2, p);
    const cosine = mulMod(addMod(w, v, p), half, p);
    const sine = mulMod(mulMod(addMod(w, negateMod(v, p), p), half, p), inverse(unit), p);
    return ratioByName(name, sine, cosine);
  }
  function hyperbolic(name: string, w: number): number {
    const v = inverse(w);
    const half = inverseMod(2, p);
    return ratioByName(
      name.replace('h', ''),
      mulMod(addMod(w, negateMod(v, p), p), half, p),
      mulMod(addMod(w, v, p), half, p),
    );
  }
  function ratioByName(name: string, sine: number, cosine: number): number {
    switch (name) {
      case 'sin':
        return sine;
      case 'cos':
        return cosine;
      case 'tan':
        return mulMod(sine, inverse(cosine), p);
      case 'cot':
        return mulMod(cosine, inverse(sine), p);
      case 'sec':
        return inverse(cosine);
      default:
        return inverse(sine);
    }
  }

  function rootNode(node: Extract<GraphNode, { op: 'root' }>, index: number): number {
    if (complex) return opaqueValue(index);
    const log = forms.logOf(node.args[0]);
    if (log === null) return fail();
    const root = expValue(scaled(log, Q.rational(node.times, node.degree)));
    if (node.degree % 2 === 0) return root;
    // The sign of an odd root is that of its radicand.
    const sign = mulMod(residues[node.args[0]] ?? 0, inverse(expValue(log)), p);
    return mulMod(root, power(sign, Math.abs(node.times)), p);
  }
  const kernel: Kernel = (index, current) => {
    residues = current;
    const node = nodes[index];
    const value = node === undefined ? fail() : nodeValue(node, index);
    return failed ? noResidue : value;
  };
  function nodeValue(node: GraphNode, index: number): number {
    if (node.args.some((arg) => residues[arg] === noResidue)) return fail();
    switch (node.op) {
      case 'constant':
        return node.name === 'e' ? expValue(oneForm) : formValue(forms.formOf(index) ?? new Map());
      case 'root':
        return rootNode(node, index);
      case 'pow':
        return powNode(node, index);
      case 'call':
        return callValue(node, index);
      default:
        return opaqueValue(index);
    }
  }
  /** A base that may be negative: the powers with a letter of the exponent are quantities of their own. */
  function powNode(node: Extract<GraphNode, { op: 'pow' }>, index: number): number {
    const [base, top] = node.args;
    const exponent = forms.formOf(top);
    if (complex || exponent === null) return opaqueValue(index);
    const log = plan.positive.has(base) ? forms.logOf(base) : null;
    if (log !== null) {
      const product = mulForms(log, exponent);
      return product === null ? opaqueValue(index) : expValue(product);
    }
    const form = forms.formOf(base);
    if (form === null) return opaqueValue(index);
    const baseKey = keyOfForm(form);
    let result = 1;
    for (const [key, { coefficient }] of exponent) {
      if (coefficient.den !== 1n || Q.bitLength(coefficient.num) > 20) return opaqueValue(index);
      const part = key === '' ? (residues[base] ?? 0) : own(`${baseKey} to ${key}`);
      result = mulMod(result, power(part, Number(coefficient.num)), p);
    }
    return result;
  }
  function own(key: string): number {
    const found = ownValues.get(key) ?? 1 + random(p - 1);
    ownValues.set(key, found);
    return found;
  }
  function factorialNode(form: Form, index: number): number {
    const { offset, rest, key } = splitOffset(form);
    if (offset === null) return opaqueValue(index);
    if (rest.size === 0) return offset < 0 ? fail() : productOfShifts(0, 1, offset);
    const value = formValue(rest);
    const start = own(`factorial ${key}`);
    if (offset >= 0) return mulMod(start, productOfShifts(value, 1, offset), p);
    return mulMod(start, inverse(productOfShifts(value, offset + 1, 0)), p);
  }
  /** (value+from) ... (value+to) */
  function productOfShifts(value: number, from: number, to: number): number {
    let product = 1;
    for (let k = from; k <= to; k += 1) product = mulMod(product, addMod(value, k < 0 ? p + k : k, p), p);
    return product;
  }
  function opaqueValue(index: number): number {
    const form = forms.formOf(index);
    return form === null ? fail() : formValue(form);
  }
  function callValue(node: Extract<GraphNode, { op: 'call' }>, index: number): number {
    const [a, b] = node.args;
    const form = a === undefined ? null : forms.formOf(a);
    if (a === undefined || form === null) return fail();
    if (circularNames.has(node.name)) {
      const turned = mulForms(form, imaginaryForm);
      return turned === null ? fail() : circular(node.name, expValue(turned));
    }
    if (node.name === 'exp') return expValue(form);
    if (hyperbolicNames.has(node.name)) return hyperbolic(node.name, expValue(form));
    if (node.name === 'abs' && !complex) {
      const log = forms.logOf(a);
      return log === null ? fail() : expValue(log);
    }
    if (node.name === 'log' && b !== undefined && !complex) {
      const top = forms.logOf(b);
      const bottom = forms.logOf(a);
      return top === null || bottom === null ? fail() : mulMod(formValue(top), inverse(formValue(bottom)), p);
    }
    if (node.name === 'factorial') return factorialNode(form, index);
    return opaqueValue(index);
  }
  return { letters, kernel, failed: () => failed };
}

const oneForm: Form = new Map([['', { coefficient: Q.one, powers: [] }]]);
const circularNames = new Set(['sin', 'cos', 'tan', 'cot', 'sec', 'csc']);
const hyperbolicNames = new Set(['sinh', 'cosh', 'tanh', 'coth', 'sech', 'csch']);

function scaled(form: Form, factor: Q.Rational): Form {
  return new Map([...form].map(([key, term]) => [key, { ...term, coefficient: Q.mul(term.coefficient, factor) }]));
}

/** A form as a whole number plus a rest whose constant lies in [0, 1). */
function splitOffset(form: Form): { offset: number | null; rest: Form; key: string } {
  const constant = form.get('')?.coefficient ?? Q.zero;
  const whole = Q.floor(constant);
  const rest = addForms(form, constantForm({ num: -whole, den: 1n })) ?? form;
  return { offset: whole > 3_000n || whole < -60n ? null : Number(whole), rest, key: keyOfForm(rest) };
}

/** Whether a node's residue follows from generators rather than being a quantity of its own. */
function isWritten(node: GraphNode, complex: boolean): boolean {
  if (node.op === 'root' || node.op === 'pow') return !complex;
  if (node.op !== 'call') return false;
  if (node.name === 'abs' || node.name === 'log') return !complex;
  return (
    node.name === 'exp' || node.name === 'factorial' || circularNames.has(node.name) || hyperbolicNames.has(node.name)
  );
}

function primitiveRoot(p: number): number {
  const factors: number[] = [];
  let rest = p - 1;
  for (let q = 2; q * q <= rest; q += 1) {
    if (rest % q !== 0) continue;
    factors.push(q);
    while (rest % q === 0) rest /= q;
  }
  if (rest > 1) factors.push(rest);
  let g = 2;
  while (factors.some((q) => powMod(g, (p - 1) / q, p) === 1)) g += 1;
  return g;
}
