import { imaginaryAtom, keyOfForm, mulForms } from '../numbers/form.ts';
import type { Form, Monomial } from '../numbers/form.ts';
import { addMod, bigMod, imaginaryMod, inverseMod, mulMod, negateMod, powMod, sqrtMod } from '../numbers/modular.ts';
import type { Random } from '../numbers/random.ts';
import * as Q from '../numbers/rational.ts';
import type { GraphNode } from '../values/graph.ts';
import {
  circularNames,
  hyperbolicNames,
  isWritten,
  oneForm,
  primitiveRoot,
  scaled,
  splitOffset,
} from './kernel-forms.ts';
import { imaginaryForm, isArc, radicandOfArc } from './kernel-plan.ts';
import type { KernelPlan } from './kernel-plan.ts';
import type { Atom, Forms } from './normal-forms.ts';
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

/** The expressions and how their nodes are written. */
export interface KernelSetting {
  readonly nodes: readonly GraphNode[];
  readonly plan: KernelPlan;
  readonly needed: Uint8Array;
  readonly names: readonly string[];
  readonly complex: boolean;
}

type Choice = ReadonlyMap<string, number>;

export function createKernelValues(setting: KernelSetting, p: number, random: Random, choice: Choice): KernelValues {
  return new KernelResidues(setting, p, random, choice);
}

/** Residues modulo one prime, at random values of the letters. */
class KernelResidues implements KernelValues {
  readonly letters = new Map<string, number>();
  private readonly letterRoots = new Map<string, number>();
  private readonly generators = new Map<string, number>();
  private readonly ownValues = new Map<string, number>();
  private readonly atomValues = new Map<number, number>();
  private readonly unit: number;
  private readonly forms: Forms;
  private residues: Float64Array = new Float64Array(0);
  private hasFailed = false;
  /** The node being evaluated: only earlier ones have their residue. */
  private current = 0;
  private readonly nodes: readonly GraphNode[];
  private readonly plan: KernelPlan;
  private readonly complex: boolean;
  private readonly needed: Uint8Array;
  private readonly p: number;
  private readonly random: Random;
  private readonly choice: Choice;

  constructor(setting: KernelSetting, p: number, random: Random, choice: Choice) {
    this.nodes = setting.nodes;
    this.plan = setting.plan;
    this.complex = setting.complex;
    this.needed = setting.needed;
    this.p = p;
    this.random = random;
    this.choice = choice;
    this.forms = setting.plan.forms;
    this.unit = imaginaryMod(p);
    for (const name of setting.names) this.drawLetter(name);
  }

  failed(): boolean {
    return this.hasFailed;
  }

  readonly kernel: Kernel = (index, current) => {
    this.residues = current;
    this.current = index;
    const node = this.nodes[index];
    const value = node === undefined ? this.fail() : this.nodeValue(node, index);
    return this.hasFailed ? noResidue : value;
  };

  /** A letter whose root is needed is drawn as a power, so that the root exists. */
  private drawLetter(name: string): void {
    const t = 1 + this.random(this.p - 1);
    const id = this.forms.atoms.findIndex((atom) => atom.kind === 'letter' && atom.name === name);
    const logId = this.forms.atoms.findIndex((atom) => atom.kind === 'log' && atom.of === id);
    const degree = this.plan.denominators.get(`${logId}^1`) ?? 1;
    this.letterRoots.set(name, t);
    const size = powMod(t, degree, this.p);
    const known = signOfAtom(id, this.forms.atoms, this.plan.signs);
    const isNegative = known === null ? this.choice.get(`sign ${id}`) === 1 : known < 0;
    this.letters.set(name, isNegative ? negateMod(size, this.p) : size);
  }

  private fail(): number {
    this.hasFailed = true;
    return 1;
  }

  private inverse(a: number): number {
    return a === 0 ? this.fail() : inverseMod(a, this.p);
  }

  private power(base: number, exponent: number): number {
    return powMod(exponent < 0 ? this.inverse(base) : base, Math.abs(exponent), this.p);
  }

  private fraction(value: Q.Rational): number {
    const den = bigMod(value.den, this.p);
    return mulMod(bigMod(value.num, this.p), this.inverse(den), this.p);
  }

  private formValue(form: Form): number {
    let total = 0;
    for (const { coefficient, powers } of form.values()) {
      let term = this.fraction(coefficient);
      for (const [id, exponent] of powers) term = mulMod(term, this.power(this.atomValue(id), exponent), this.p);
      total = addMod(total, term, this.p);
    }
    return total;
  }

  private atomValue(id: number): number {
    const found = this.atomValues.get(id);
    if (found !== undefined) return found;
    const value = this.makeAtom(id);
    this.atomValues.set(id, value);
    return value;
  }

  private makeAtom(id: number): number {
    const atom = this.forms.atoms[id];
    if (id === imaginaryAtom) return this.unit;
    switch (atom?.kind) {
      case 'letter':
        return this.letters.get(atom.name) ?? this.fail();
      case 'e':
        return this.expValue(oneForm);
      case 'factor':
        return this.formValue(atom.form);
      case 'other': {
        const node = this.nodes[atom.node];
        // Nodes that are written by generators come first; the rest are quantities of their own.
        if (node === undefined || this.needed[atom.node] !== 1) return this.fail();
        if (!isWritten(node, this.complex)) return 1 + this.random(this.p - 1);
        return atom.node < this.current ? (this.residues[atom.node] ?? this.fail()) : this.fail();
      }
      default:
        return 1 + this.random(this.p - 1);
    }
  }

  /** e to a form whose monomials all have a generator. */
  private expValue(form: Form): number {
    let product = 1;
    for (const [key, monomial] of form) {
      const degree = this.plan.denominators.get(key) ?? 1;
      const exponent = Q.mul(monomial.coefficient, Q.rational(degree));
      if (exponent.den !== 1n) return this.fail();
      product = mulMod(product, this.power(this.generator(key, monomial, degree), Number(exponent.num)), this.p);
    }
    return product;
  }

  private generator(key: string, monomial: Monomial, degree: number): number {
    const found = this.generators.get(key);
    if (found !== undefined) return found;
    const value = this.makeGenerator(key, monomial, degree);
    this.generators.set(key, value);
    return value;
  }

  private makeGenerator(key: string, { powers }: Monomial, degree: number): number {
    const kinds = powers.map(([id]) => this.forms.atoms[id]);
    const [first, second] = powers;
    if (powers.length === 1 && first?.[1] === 1 && kinds[0]?.kind === 'log')
      return this.rootOfSize(kinds[0].of, degree, key);
    if (powers.length === 2 && kinds[0]?.kind === 'imaginary' && kinds[1]?.kind === 'pi' && second?.[1] === 1) {
      return this.unityRoot(2 * degree);
    }
    if (isArc(powers, kinds, degree)) return this.arcValue(kinds[1]);
    return 1 + this.random(this.p - 1);
  }

  private unityRoot(order: number): number {
    if (order === 2) return this.p - 1;
    if (order === 4) return this.unit;
    if ((this.p - 1) % order !== 0) return this.fail();
    const g = primitiveRoot(this.p);
    // The root of order 4 has to be the same i as everywhere else.
    return powMod(
      powMod(g, (this.p - 1) / 4, this.p) === this.unit ? g : this.inverse(g),
      (this.p - 1) / order,
      this.p,
    );
  }

  /** t with t^degree = |f|. */
  private rootOfSize(of: number | bigint, degree: number, key: string): number {
    if (typeof of === 'bigint') return this.surd(of, degree);
    const atom = this.forms.atoms[of];
    if (atom?.kind === 'letter') return this.letterRoots.get(atom.name) ?? this.fail();
    const value = this.atomValue(of);
    const known = signOfAtom(of, this.forms.atoms, this.plan.signs);
    const isNegative = known === null ? this.choice.get(`sign ${of}`) === 1 : known < 0;
    const root = this.rootMod(isNegative ? negateMod(value, this.p) : value, degree);
    const twos = degree & -degree;
    const turn = this.choice.get(`root ${key}`) ?? 0;
    return turn === 0 ? root : mulMod(root, powMod(this.unityRoot(twos), turn, this.p), this.p);
  }

  /** Square roots of 2, 3 and 5 lie among the roots of unity and have to agree with them. */
  private surd(prime: bigint, degree: number): number {
    if (!this.plan.turns || degree === 1 || prime > 5n) return this.rootMod(bigMod(prime, this.p), degree);
    if (degree !== 2) return this.fail();
    const z = this.unityRoot(prime === 2n ? 8 : prime === 3n ? 12 : 5);
    const sum = addMod(z, this.inverse(z), this.p);
    return prime === 5n ? addMod(1, addMod(sum, sum, this.p), this.p) : sum;
  }

  private rootMod(value: number, degree: number): number {
    if (value === 0) return this.fail();
    let odd = degree;
    let result = value;
    while (odd % 2 === 0) odd /= 2;
    if (odd > 1) result = powMod(result, inverseMod(odd % (this.p - 1), this.p - 1), this.p);
    for (let rest = degree / odd; rest > 1; rest /= 2) {
      const root = sqrtMod(result, this.p);
      if (root === null) return this.fail();
      result = root;
    }
    return result;
  }

  private arcValue(atom: Atom | undefined): number {
    const radicand = radicandOfArc(atom);
    const log = radicand && this.forms.logOfForm(radicand);
    if (log === null || (atom?.kind !== 'arcsine' && atom?.kind !== 'arctangent')) return this.fail();
    const root = this.expValue(scaled(log, Q.rational(1, 2)));
    const turned = mulMod(this.unit, this.formValue(atom.form), this.p);
    return atom.kind === 'arcsine'
      ? addMod(root, turned, this.p)
      : mulMod(addMod(1, turned, this.p), this.inverse(root), this.p);
  }

  private circular(name: string, w: number): number {
    const v = this.inverse(w);
    const half = inverseMod(2, this.p);
    const cosine = mulMod(addMod(w, v, this.p), half, this.p);
    const sine = mulMod(mulMod(addMod(w, negateMod(v, this.p), this.p), half, this.p), this.inverse(this.unit), this.p);
    return this.ratioByName(name, sine, cosine);
  }

  private hyperbolic(name: string, w: number): number {
    const v = this.inverse(w);
    const half = inverseMod(2, this.p);
    return this.ratioByName(
      name.replace('h', ''),
      mulMod(addMod(w, negateMod(v, this.p), this.p), half, this.p),
      mulMod(addMod(w, v, this.p), half, this.p),
    );
  }

  private ratioByName(name: string, sine: number, cosine: number): number {
    switch (name) {
      case 'sin':
        return sine;
      case 'cos':
        return cosine;
      case 'tan':
        return mulMod(sine, this.inverse(cosine), this.p);
      case 'cot':
        return mulMod(cosine, this.inverse(sine), this.p);
      case 'sec':
        return this.inverse(cosine);
      default:
        return this.inverse(sine);
    }
  }

  private rootNode(node: Extract<GraphNode, { op: 'root' }>, index: number): number {
    if (this.complex) return this.opaqueValue(index);
    const log = this.forms.logOf(node.args[0]);
    if (log === null) return this.fail();
    const root = this.expValue(scaled(log, Q.rational(node.times, node.degree)));
    if (node.degree % 2 === 0) return root;
    // The sign of an odd root is that of its radicand.
    const sign = mulMod(this.residues[node.args[0]] ?? 0, this.inverse(this.expValue(log)), this.p);
    return mulMod(root, this.power(sign, Math.abs(node.times)), this.p);
  }

  private nodeValue(node: GraphNode, index: number): number {
    if (node.args.some((arg) => this.residues[arg] === noResidue)) return this.fail();
    switch (node.op) {
      case 'constant':
        return node.name === 'e' ? this.expValue(oneForm) : this.formValue(this.forms.formOf(index) ?? new Map());
      case 'root':
        return this.rootNode(node, index);
      case 'pow':
        return this.powNode(node, index);
      case 'call':
        return this.callValue(node, index);
      default:
        return this.opaqueValue(index);
    }
  }

  /** A base that may be negative: the powers with a letter of the exponent are quantities of their own. */
  private powNode(node: Extract<GraphNode, { op: 'pow' }>, index: number): number {
    const [base, top] = node.args;
    const exponent = this.forms.formOf(top);
    if (this.complex || exponent === null) return this.opaqueValue(index);
    const log = this.plan.positive.has(base) ? this.forms.logOf(base) : null;
    if (log !== null) {
      const product = mulForms(log, exponent);
      return product === null ? this.opaqueValue(index) : this.expValue(product);
    }
    const form = this.forms.formOf(base);
    if (form === null) return this.opaqueValue(index);
    const baseKey = keyOfForm(form);
    let result = 1;
    for (const [key, { coefficient }] of exponent) {
      if (coefficient.den !== 1n || Q.bitLength(coefficient.num) > 20) return this.opaqueValue(index);
      const part = key === '' ? (this.residues[base] ?? 0) : this.own(`${baseKey} to ${key}`);
      result = mulMod(result, this.power(part, Number(coefficient.num)), this.p);
    }
    return result;
  }

  private own(key: string): number {
    const found = this.ownValues.get(key) ?? 1 + this.random(this.p - 1);
    this.ownValues.set(key, found);
    return found;
  }

  private factorialNode(form: Form, index: number): number {
    const { offset, rest, key } = splitOffset(form);
    if (offset === null) return this.opaqueValue(index);
    if (rest.size === 0) return offset < 0 ? this.fail() : this.productOfShifts(0, 1, offset);
    const value = this.formValue(rest);
    const start = this.own(`factorial ${key}`);
    if (offset >= 0) return mulMod(start, this.productOfShifts(value, 1, offset), this.p);
    return mulMod(start, this.inverse(this.productOfShifts(value, offset + 1, 0)), this.p);
  }

  /** (value+from) ... (value+to) */
  private productOfShifts(value: number, from: number, to: number): number {
    let product = 1;
    for (let k = from; k <= to; k += 1)
      product = mulMod(product, addMod(value, k < 0 ? this.p + k : k, this.p), this.p);
    return product;
  }

  private opaqueValue(index: number): number {
    const form = this.forms.formOf(index);
    return form === null ? this.fail() : this.formValue(form);
  }

  private callValue(node: Extract<GraphNode, { op: 'call' }>, index: number): number {
    const [a, b] = node.args;
    const form = a === undefined ? null : this.forms.formOf(a);
    if (a === undefined || form === null) return this.fail();
    if (circularNames.has(node.name)) {
      const turned = mulForms(form, imaginaryForm);
      return turned === null ? this.fail() : this.circular(node.name, this.expValue(turned));
    }
    if (node.name === 'exp') return this.expValue(form);
    if (hyperbolicNames.has(node.name)) return this.hyperbolic(node.name, this.expValue(form));
    if (node.name === 'abs' && !this.complex) {
      const log = this.forms.logOf(a);
      return log === null ? this.fail() : this.expValue(log);
    }
    if (node.name === 'log' && b !== undefined && !this.complex) {
      const top = this.forms.logOf(b);
      const bottom = this.forms.logOf(a);
      return top === null || bottom === null
        ? this.fail()
        : mulMod(this.formValue(top), this.inverse(this.formValue(bottom)), this.p);
    }
    if (node.name === 'factorial') return this.factorialNode(form, index);
    return this.opaqueValue(index);
  }
}
