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
  const atoms: Atom[] = [{ kind: 'imaginary' }];
  const ids = new Map<string, number>([['imaginary', imaginaryAtom]]);
  const forms = new Map<number, Form | null>();
  const logs = new Map<number, Form | null>();

  function atom(key: string, make: () => Atom): number {
    const found = ids.get(key);
    if (found !== undefined) return found;
    ids.set(key, atoms.length);
    return atoms.push(make()) - 1;
  }
  function formOf(index: number): Form | null {
    const found = forms.get(index);
    if (found !== undefined) return found;
    const node = nodes[index];
    const form = node === undefined ? null : buildForm(node, index);
    forms.set(index, form);
    return form;
  }
  function opaque(name: string, args: readonly number[], node: number): Form | null {
    const keys: string[] = [];
    for (const arg of args) {
      const form = formOf(arg);
      if (form === null) return null;
      keys.push(keyOfForm(form));
    }
    return atomForm(atom(`${name}(${keys.join(';')})`, () => ({ kind: 'other', node })));
  }
  function buildForm(node: GraphNode, index: number): Form | null {
    switch (node.op) {
      case 'number':
        return constantForm(node.value);
      case 'letter':
        return atomForm(atom(`letter ${node.name}`, () => ({ kind: 'letter', name: node.name })));
      case 'constant':
        return constantAtom(node.name);
      case 'add':
        return joined(node.args, addForms, Q.zero);
      case 'mul':
        return joined(node.args, mulForms, Q.one);
      case 'negate': {
        const form = formOf(node.args[0]);
        return form && scaleForm(form, Q.minusOne);
      }
      case 'div':
        return quotient(formOf(node.args[0]), formOf(node.args[1]));
      case 'power':
        return powered(formOf(node.args[0]), node.exponent);
      case 'call':
        return callForm(node.name, node.args, index);
      case 'root':
        return opaque(`root ${node.degree} ${node.times}`, node.args, index);
      case 'pow':
        return opaque('pow', node.args, index);
      default:
        return atomForm(atom(`node ${index}`, () => ({ kind: 'other', node: index })));
    }
  }
  function constantAtom(name: 'pi' | 'e' | 'i' | 'infinity'): Form | null {
    if (name === 'i') return atomForm(imaginaryAtom);
    return name === 'infinity' ? null : atomForm(atom(name, () => ({ kind: name })));
  }
  function joined(args: readonly number[], join: (a: Form, b: Form) => Form | null, start: Rational): Form | null {
    let total: Form | null = constantForm(start);
    for (const arg of args) {
      const form = formOf(arg);
      if (form === null || total === null) return null;
      total = join(total, form);
    }
    return total;
  }
  function quotient(top: Form | null, bottom: Form | null): Form | null {
    const inverse = powered(bottom, -1);
    return top && inverse && mulForms(top, inverse);
  }
  /** A sum that divides becomes an atom of its own, without its content. */
  function powered(form: Form | null, exponent: number): Form | null {
    if (form === null || (form.size === 0 && exponent <= 0)) return null;
    const direct = powForm(form, exponent);
    if (direct !== null) return direct;
    const split = splitForm(form);
    if (split === null) return null;
    const base = powForm(monomial(split.content, split.shared), exponent);
    return base && mulForms(base, atomForm(factorAtom(split.rest), exponent));
  }
  function factorAtom(form: Form): number {
    return atom(`factor ${keyOfForm(form)}`, () => ({ kind: 'factor', form }));
  }
  function callForm(
    name: Extract<GraphNode, { op: 'call' }>['name'],
    args: readonly number[],
    index: number,
  ): Form | null {
    const [a] = args;
    const form = a === undefined ? null : formOf(a);
    if (a === undefined || form === null) return null;
    switch (name) {
      case 'ln':
        return complex ? opaque('ln', args, index) : logOf(a);
      case 'arcsin':
        return oddAtom('arcsine', form);
      case 'arctan':
        return oddAtom('arctangent', form);
      case 'arccos': {
        const arcsine = oddAtom('arcsine', form);
        const half = scaleForm(atomForm(atom('pi', () => ({ kind: 'pi' }))), Q.rational(1, 2));
        return arcsine && addForms(half, scaleForm(arcsine, Q.minusOne));
      }
      default:
        return opaque(name, args, index);
    }
  }
  /** Odd functions: the sign of the argument goes in front. */
  function oddAtom(kind: 'arcsine' | 'arctangent', form: Form): Form | null {
    const split = splitForm(form);
    if (split === null) return constantForm(Q.zero);
    const negative = split.content.num < 0n;
    const positive = negative ? scaleForm(form, Q.minusOne) : form;
    const found = atomForm(atom(`${kind} ${keyOfForm(positive)}`, () => ({ kind, form: positive })));
    return negative ? scaleForm(found, Q.minusOne) : found;
  }
  function logAtom(of: number | bigint): Form {
    return atomForm(atom(`log ${typeof of} ${of}`, () => ({ kind: 'log', of })));
  }
  function logOf(index: number): Form | null {
    const found = logs.get(index);
    if (found !== undefined) return found;
    const node = nodes[index];
    const form = node === undefined ? null : buildLog(node, index);
    logs.set(index, form);
    return form;
  }
  function buildLog(node: GraphNode, index: number): Form | null {
    switch (node.op) {
      case 'mul':
        return node.args.reduce<Form | null>((sum, arg) => combine(sum, logOf(arg), Q.one), constantForm(Q.zero));
      case 'div':
        return combine(logOf(node.args[0]), logOf(node.args[1]), Q.minusOne);
      case 'negate':
        return logOf(node.args[0]);
      case 'power':
        return scaled(logOf(node.args[0]), Q.rational(node.exponent));
      case 'root':
        return scaled(logOf(node.args[0]), Q.rational(node.times, node.degree));
      case 'pow': {
        const log = logOf(node.args[0]);
        const exponent = formOf(node.args[1]);
        return log && exponent && mulForms(log, exponent);
      }
      case 'call': {
        const [a] = node.args;
        if (node.name === 'exp' && a !== undefined) return formOf(a);
        if (node.name === 'abs' && a !== undefined) return logOf(a);
        return logOfForm(formOf(index));
      }
      case 'constant':
        return node.name === 'e' ? constantForm(Q.one) : logOfForm(formOf(index));
      default:
        return logOfForm(formOf(index));
    }
  }
  function logOfForm(form: Form | null): Form | null {
    const split = form && splitForm(form);
    if (split === null) return null;
    let total: Form | null = logOfRational(Q.absolute(split.content));
    for (const [id, exponent] of split.shared) total = combine(total, logOfAtom(id), Q.rational(exponent));
    if (constantOf(split.rest) !== null) return total;
    const [only] = split.rest.values();
    // A lone atom with coefficient 1 is not a sum.
    if (split.rest.size === 1 && only?.powers.length === 1 && only.powers[0]?.[1] === 1) {
      return combine(total, logOfAtom(only.powers[0][0]), Q.one);
    }
    return combine(total, logAtom(factorAtom(split.rest)), Q.one);
  }
  function logOfAtom(id: number): Form | null {
    const known = atoms[id];
    if (known?.kind === 'imaginary') return null;
    return known?.kind === 'e' ? constantForm(Q.one) : logAtom(id);
  }
  function logOfRational(value: Rational): Form | null {
    let total: Form | null = constantForm(Q.zero);
    for (const [prime, exponent] of factorRational(value)) total = combine(total, logAtom(prime), Q.rational(exponent));
    return total;
  }
  return { atoms, formOf, logOf, logOfForm };
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
