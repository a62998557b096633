import {
  addForms,
  atomForm,
  constantForm,
  constantOf,
  imaginaryAtom,
  keyOfForm,
  mulForms,
  powForm,
  scaleForm,
  splitForm,
} from '../numbers/form.ts';
import type { Form } from '../numbers/form.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import type { GraphNode } from '../values/graph.ts';

/** A quantity that forms are built from. Equal keys are equal quantities. */
export type Atom =
  | { readonly kind: 'imaginary' | 'pi' | 'e' }
  | { readonly kind: 'letter'; readonly name: string }
  /** A primitive sum as a factor. */
  | { readonly kind: 'factor'; readonly form: Form }
  /** ln|f| of an atom, a prime number or a primitive sum. */
  | { readonly kind: 'log'; readonly of: number | bigint }
  | { readonly kind: 'arcsine' | 'arctangent'; readonly form: Form }
  /** Anything else: known by its name and the forms of its arguments; `node` is the first of its kind. */
  | { readonly kind: 'other'; readonly node: number };

/** The forms of the nodes of one graph, and the logarithms of their sizes. */
export interface Forms {
  readonly atoms: readonly Atom[];
  readonly formOf: (index: number) => Form | null;
  /** ln|node| as a sum of logarithms of atoms; over the reals only. */
  readonly logOf: (index: number) => Form | null;
  readonly logOfForm: (form: Form) => Form | null;
}

const largestPrime = 2_000n;

export function createForms(nodes: readonly GraphNode[], complex: boolean): Forms {
  return new FormTable(nodes, complex);
}

/** Builds forms as they are asked for; an equal quantity is always the same atom. */
class FormTable implements Forms {
  readonly atoms: Atom[] = [{ kind: 'imaginary' }];
  private readonly ids = new Map<string, number>([['imaginary', imaginaryAtom]]);
  private readonly forms = new Map<number, Form | null>();
  private readonly logs = new Map<number, Form | null>();
  private readonly nodes: readonly GraphNode[];
  private readonly complex: boolean;

  constructor(nodes: readonly GraphNode[], complex: boolean) {
    this.nodes = nodes;
    this.complex = complex;
  }

  private atom(key: string, make: () => Atom): number {
    const found = this.ids.get(key);
    if (found !== undefined) return found;
    this.ids.set(key, this.atoms.length);
    return this.atoms.push(make()) - 1;
  }

  formOf(index: number): Form | null {
    const found = this.forms.get(index);
    if (found !== undefined) return found;
    const node = this.nodes[index];
    const form = node === undefined ? null : this.buildForm(node, index);
    this.forms.set(index, form);
    return form;
  }

  private opaque(name: string, args: readonly number[], node: number): Form | null {
    const keys: string[] = [];
    for (const arg of args) {
      const form = this.formOf(arg);
      if (form === null) return null;
      keys.push(keyOfForm(form));
    }
    return atomForm(this.atom(`${name}(${keys.join(';')})`, () => ({ kind: 'other', node })));
  }

  private buildForm(node: GraphNode, index: number): Form | null {
    switch (node.op) {
      case 'number':
        return constantForm(node.value);
      case 'letter':
        return atomForm(this.atom(`letter ${node.name}`, () => ({ kind: 'letter', name: node.name })));
      case 'constant':
        return this.constantAtom(node.name);
      case 'add':
        return this.joined(node.args, addForms, Q.zero);
      case 'mul':
        return this.joined(node.args, mulForms, Q.one);
      case 'negate': {
        const form = this.formOf(node.args[0]);
        return form && scaleForm(form, Q.minusOne);
      }
      case 'div':
        return this.quotient(this.formOf(node.args[0]), this.formOf(node.args[1]));
      case 'power':
        return this.powered(this.formOf(node.args[0]), node.exponent);
      case 'call':
        return this.callForm(node.name, node.args, index);
      case 'root':
        return this.opaque(`root ${node.degree} ${node.times}`, node.args, index);
      case 'pow':
        return this.opaque('pow', node.args, index);
      default:
        return atomForm(this.atom(`node ${index}`, () => ({ kind: 'other', node: index })));
    }
  }

  private constantAtom(name: 'pi' | 'e' | 'i' | 'infinity'): Form | null {
    if (name === 'i') return atomForm(imaginaryAtom);
    return name === 'infinity' ? null : atomForm(this.atom(name, () => ({ kind: name })));
  }

  private joined(args: readonly number[], join: (a: Form, b: Form) => Form | null, start: Rational): Form | null {
    let total: Form | null = constantForm(start);
    for (const arg of args) {
      const form = this.formOf(arg);
      if (form === null || total === null) return null;
      total = join(total, form);
    }
    return total;
  }

  private quotient(top: Form | null, bottom: Form | null): Form | null {
    const inverse = this.powered(bottom, -1);
    return top && inverse && mulForms(top, inverse);
  }
  /** A sum that divides becomes an atom of its own, without its content. */

  private powered(form: Form | null, exponent: number): Form | null {
    if (form === null || (form.size === 0 && exponent <= 0)) return null;
    const direct = powForm(form, exponent);
    if (direct !== null) return direct;
    const split = splitForm(form);
    if (split === null) return null;
    const base = powForm(monomial(split.content, split.shared), exponent);
    return base && mulForms(base, atomForm(this.factorAtom(split.rest), exponent));
  }

  private factorAtom(form: Form): number {
    return this.atom(`factor ${keyOfForm(form)}`, () => ({ kind: 'factor', form }));
  }

  private callForm(
    name: Extract<GraphNode, { op: 'call' }>['name'],
    args: readonly number[],
    index: number,
  ): Form | null {
    const [a] = args;
    const form = a === undefined ? null : this.formOf(a);
    if (a === undefined || form === null) return null;
    switch (name) {
      case 'ln':
        return this.complex ? this.opaque('ln', args, index) : this.logOf(a);
      case 'arcsin':
        return this.oddAtom('arcsine', form);
      case 'arctan':
        return this.oddAtom('arctangent', form);
      case 'arccos': {
        const arcsine = this.oddAtom('arcsine', form);
        const half = scaleForm(atomForm(this.atom('pi', () => ({ kind: 'pi' }))), Q.rational(1, 2));
        return arcsine && addForms(half, scaleForm(arcsine, Q.minusOne));
      }
      default:
        return this.opaque(name, args, index);
    }
  }
  /** Odd functions: the sign of the argument goes in front. */

  private oddAtom(kind: 'arcsine' | 'arctangent', form: Form): Form | null {
    const split = splitForm(form);
    if (split === null) return constantForm(Q.zero);
    const negative = split.content.num < 0n;
    const positive = negative ? scaleForm(form, Q.minusOne) : form;
    const found = atomForm(this.atom(`${kind} ${keyOfForm(positive)}`, () => ({ kind, form: positive })));
    return negative ? scaleForm(found, Q.minusOne) : found;
  }

  private logAtom(of: number | bigint): Form {
    return atomForm(this.atom(`log ${typeof of} ${of}`, () => ({ kind: 'log', of })));
  }

  logOf(index: number): Form | null {
    const found = this.logs.get(index);
    if (found !== undefined) return found;
    const node = this.nodes[index];
    const form = node === undefined ? null : this.buildLog(node, index);
    this.logs.set(index, form);
    return form;
  }

  private buildLog(node: GraphNode, index: number): Form | null {
    switch (node.op) {
      case 'mul':
        return node.args.reduce<Form | null>((sum, arg) => combine(sum, this.logOf(arg), Q.one), constantForm(Q.zero));
      case 'div':
        return combine(this.logOf(node.args[0]), this.logOf(node.args[1]), Q.minusOne);
      case 'negate':
        return this.logOf(node.args[0]);
      case 'power':
        return scaled(this.logOf(node.args[0]), Q.rational(node.exponent));
      case 'root':
        return scaled(this.logOf(node.args[0]), Q.rational(node.times, node.degree));
      case 'pow': {
        const log = this.logOf(node.args[0]);
        const exponent = this.formOf(node.args[1]);
        return log && exponent && mulForms(log, exponent);
      }
      case 'call': {
        const [a] = node.args;
        if (node.name === 'exp' && a !== undefined) return this.formOf(a);
        if (node.name === 'abs' && a !== undefined) return this.logOf(a);
        return this.logOfForm(this.formOf(index));
      }
      case 'constant':
        return node.name === 'e' ? constantForm(Q.one) : this.logOfForm(this.formOf(index));
      default:
        return this.logOfForm(this.formOf(index));
    }
  }

  logOfForm(form: Form | null): Form | null {
    const split = form && splitForm(form);
    if (split === null) return null;
    let total: Form | null = this.logOfRational(Q.absolute(split.content));
    for (const [id, exponent] of split.shared) total = combine(total, this.logOfAtom(id), Q.rational(exponent));
    if (constantOf(split.rest) !== null) return total;
    const [only] = split.rest.values();
    // A lone atom with coefficient 1 is not a sum.
    if (split.rest.size === 1 && only?.powers.length === 1 && only.powers[0]?.[1] === 1) {
      return combine(total, this.logOfAtom(only.powers[0][0]), Q.one);
    }
    return combine(total, this.logAtom(this.factorAtom(split.rest)), Q.one);
  }

  private logOfAtom(id: number): Form | null {
    const known = this.atoms[id];
    if (known?.kind === 'imaginary') return null;
    return known?.kind === 'e' ? constantForm(Q.one) : this.logAtom(id);
  }

  private logOfRational(value: Rational): Form | null {
    let total: Form | null = constantForm(Q.zero);
    for (const [prime, exponent] of factorRational(value))
      total = combine(total, this.logAtom(prime), Q.rational(exponent));
    return total;
  }
}

function monomial(coefficient: Rational, powers: readonly (readonly [number, number])[]): Form {
  return new Map([[powers.map(([atom, exponent]) => `${atom}^${exponent}`).join('*'), { coefficient, powers }]]);
}

function combine(a: Form | null, b: Form | null, factor: Rational): Form | null {
  return a && b && addForms(a, scaleForm(b, factor));
}

function scaled(a: Form | null, factor: Rational): Form | null {
  return a && scaleForm(a, factor);
}

/** Small primes and what is left of a positive fraction, with their exponents. */
export function factorRational(value: Rational): [bigint, number][] {
  return [...factorWhole(value.num, 1), ...factorWhole(value.den, -1)];
}

function factorWhole(value: bigint, sign: 1 | -1): [bigint, number][] {
  const found: [bigint, number][] = [];
  let rest = value;
  for (let prime = 2n; prime * prime <= rest && prime < largestPrime; prime += prime === 2n ? 1n : 2n) {
    let exponent = 0;
    while (rest % prime === 0n) [rest, exponent] = [rest / prime, exponent + 1];
    if (exponent > 0) found.push([prime, sign * exponent]);
  }
  if (rest > 1n) found.push([rest, sign]);
  return found;
}
