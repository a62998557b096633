import { createForms, type Forms } from '../compare/normal-forms.ts';
import { addForms, constantOf, keyOfForm, scaleForm, type Form } from '../numbers/form.ts';
import { add, div, isZero, lcm, minusOne, negate, one, rational, zero, type Rational } from '../numbers/rational.ts';
import { divKnown, isKnown, subKnown } from '../values/arithmetic.ts';
import { logOf } from '../values/logarithms.ts';
import type { Graph, GraphBuilder } from '../values/graph.ts';
import type { KnownValue } from '../values/value.ts';
import { createFormNodes } from './form-nodes.ts';
import type { LineEnv } from './line-env.ts';
import { computedNumber, degreeIn, linearForm } from './linear.ts';
import { signAtPoint, toKnownValue } from './point-value.ts';
import { squareFreePart, trim } from './polynomial.ts';
import { approximate, realRoots, type RealNumber } from './real-number.ts';
import { numeratorOf, simplifyForScan, type SignOnStretch } from './simplify-for-scan.ts';
import type { SolvePart, Zeros } from './zeros.ts';

/** coefficient * e^exponent * rest: the rest is a monomial of a form without powers of e. */
interface Term {
  readonly coefficient: Rational;
  readonly exponent: Form;
  readonly rest: Form;
}

const noForm: Form = new Map();
const unitKey = keyOfForm(new Map([['', { coefficient: one, powers: [] }]]));
const mostDegree = 40;

/**
 * Numbers among which all zeros of a function are that is a sum of powers of e with numbers in front, or of logarithms:
 * what is under them is compared instead, exactly. Null where the function is of another kind.
 */
export function zerosByKernel(graph: Graph, env: LineEnv, signOf: SignOnStretch, solvePart: SolvePart): Zeros | null {
  const simple = simplifyForScan(graph, env, signOf);
  const root = simple && numeratorOf(simple.builder, simple.root);
  if (!simple || root === null) return null;
  return new KernelSearch(simple.builder, root, env, solvePart, root === simple.root).find();
}

class KernelSearch {
  private readonly builder: GraphBuilder;
  private readonly root: number;
  private readonly env: LineEnv;
  private readonly solvePart: SolvePart;
  private readonly forms: Forms;
  private readonly node: (form: Form) => number | null;
  /** Of nodes that are shared by many: whether the letter is in them. */
  private readonly moving = new Map<number, boolean>();
  /** Whether the node is the function itself and not its numerator. */
  private readonly isWhole: boolean;

  constructor(builder: GraphBuilder, root: number, env: LineEnv, solvePart: SolvePart, isWhole: boolean) {
    this.isWhole = isWhole;
    this.builder = builder;
    this.root = root;
    this.env = env;
    this.solvePart = solvePart;
    this.forms = createForms(builder.nodes, false);
    this.node = createFormNodes(builder, this.forms);
  }

  find(): Zeros | null {
    const form = this.forms.formOf(this.root);
    if (!form) return null;
    if (form.size === 0) return { points: [], open: false };
    return this.sumOfLogarithms(form) ?? this.sumOfPowers(form) ?? this.oneArc(form);
  }

  private usesLetter(index: number): boolean {
    const known = this.moving.get(index);
    if (known !== undefined) return known;
    const node = this.builder.nodes[index];
    const found =
      node?.op === 'letter' ? node.name === this.env.letter : (node?.args ?? []).some((arg) => this.usesLetter(arg));
    this.moving.set(index, found);
    return found;
  }

  private atomUsesLetter(id: number): boolean {
    const atom = this.forms.atoms[id];
    switch (atom?.kind) {
      case 'letter':
        return atom.name === this.env.letter;
      case 'other':
        return this.usesLetter(atom.node);
      case 'log':
        return typeof atom.of === 'number' && this.atomUsesLetter(atom.of);
      case 'factor':
      case 'arcsine':
      case 'arctangent':
        return [...atom.form.values()].some(({ powers }) => powers.some(([other]) => this.atomUsesLetter(other)));
      default:
        return false;
    }
  }

  /** The zeros of a node, by whatever solves it. */
  private zerosOfNode(index: number | null): Zeros | null {
    if (index === null) return null;
    const map = this.solvePart({ nodes: this.builder.nodes.slice(), root: index }, { ...this.env, given: new Map() });
    return { points: map.points, open: map.open === true };
  }

  /** n1 ln g1 + n2 ln g2 + ... = c: the product of the powers of the g is e^c, or minus that for logarithms of sizes. */
  private sumOfLogarithms(form: Form): Zeros | null {
    let scale = 1n;
    const logs: { of: number; times: Rational }[] = [];
    let rest: Form = noForm;
    for (const [key, monomial] of form) {
      const [power, ...others] = monomial.powers;
      const atom = power && this.forms.atoms[power[0]];
      if (!monomial.powers.some(([id]) => this.atomUsesLetter(id))) {
        rest = new Map([...rest, [key, monomial]]);
        continue;
      }
      if (others.length > 0 || power?.[1] !== 1 || atom?.kind !== 'log' || typeof atom.of !== 'number') return null;
      logs.push({ of: atom.of, times: monomial.coefficient });
      scale = lcm(scale, monomial.coefficient.den);
    }
    if (logs.length === 0) return null;
    const side = (wanted: 1n | -1n): number | null => {
      const factors: number[] = [];
      for (const { of, times } of logs) {
        const n = (times.num * scale) / times.den;
        if (n * wanted <= 0n) continue;
        const inner = this.node(new Map([[`${of}^1`, { coefficient: one, powers: [[of, 1]] }]]));
        if (inner === null || n * wanted > 24n) return null;
        factors.push(this.builder.power(inner, Number(n * wanted)));
      }
      return this.builder.mul(factors);
    };
    // A large power of e on the one side, not a tiny one on the other.
    const whole = this.node(rest);
    const isSmall = whole !== null && this.signOfNumber(whole) === -1;
    const constant = this.exponential(scaleForm(rest, rational(isSmall ? -scale : scale)));
    const [top, bottom] = [side(1n), side(-1n)];
    if (constant === null || top === null || bottom === null) return null;
    const left = isSmall ? top : this.builder.mul([constant, top]);
    const right = isSmall ? this.builder.mul([constant, bottom]) : bottom;
    const found = [this.builder.negate(right), right].map((other) => this.zerosOfNode(this.builder.add([left, other])));
    if (found.includes(null)) return null;
    return joined(found as Zeros[]);
  }

  /** e^form: primes to their powers where whole, the rest as a power of e. */
  private exponential(form: Form): number | null {
    const factors: number[] = [];
    let rest: Form = form;
    for (const [key, { coefficient, powers }] of form) {
      const atom = powers.length === 1 && powers[0]?.[1] === 1 ? this.forms.atoms[powers[0][0]] : null;
      if (atom?.kind !== 'log' || typeof atom.of !== 'bigint' || coefficient.den !== 1n) continue;
      if (coefficient.num > 2000n || coefficient.num < -2000n) continue;
      factors.push(this.builder.power(this.builder.number(rational(atom.of)), Number(coefficient.num)));
      rest = new Map([...rest].filter(([other]) => other !== key));
    }
    if (rest.size === 0) return this.builder.mul(factors);
    const exponent = this.node(rest);
    return exponent === null
      ? null
      : this.builder.mul([...factors, this.builder.push({ op: 'call', name: 'exp', args: [exponent] })]);
  }

  private sumOfPowers(form: Form): Zeros | null {
    const terms: Term[] = [];
    for (const [, monomial] of form) {
      const term = this.termOf(monomial);
      if (!term) return null;
      terms.push(term);
    }
    const groups = mergeTerms(terms);
    if (groups === null) return null;
    if (groups.length < 2) return { points: [], open: false };
    const [first, ...others] = groups as [Term, ...Term[]];
    if (groups.length === 2 && groups.every((term) => keyOfForm(term.rest) === keyOfForm(first.rest)))
      return this.twoPowers(first, others[0] as Term);
    return groups.every((term) => keyOfForm(term.rest) === unitKey) ? this.polynomialInPower(groups) : null;
  }

  private termOf(monomial: { coefficient: Rational; powers: readonly (readonly [number, number])[] }): Term | null {
    let exponent: Form | null = noForm;
    const rest: (readonly [number, number])[] = [];
    for (const [id, times] of monomial.powers) {
      const atom = this.forms.atoms[id];
      const node = atom?.kind === 'other' ? this.builder.nodes[atom.node] : null;
      if (node?.op === 'call' && node.name === 'exp') {
        const inner = this.forms.formOf(node.args[0] as number);
        exponent = inner && exponent && addForms(exponent, scaleForm(inner, rational(times)));
      } else if (atom?.kind === 'e') {
        exponent = exponent && addForms(exponent, new Map([['', { coefficient: rational(times), powers: [] }]]));
      } else if (this.atomUsesLetter(id)) return null;
      else rest.push([id, times]);
    }
    const key = rest.map(([id, times]) => `${id}^${times}`).join('*');
    return (
      exponent && {
        coefficient: monomial.coefficient,
        exponent,
        rest: new Map([[key, { coefficient: one, powers: rest }]]),
      }
    );
  }

  /** a e^f = -b e^g: f - g = ln(-b/a), and nothing where a and b have the same sign. */
  private twoPowers(a: Term, b: Term): Zeros | null {
    const ratio = negate(div(b.coefficient, a.coefficient));
    if (ratio.num < 0n) return { points: [], open: false };
    const difference = addForms(a.exponent, scaleForm(b.exponent, minusOne));
    const log = this.forms.logOfForm(new Map([['', { coefficient: ratio, powers: [] }]]));
    const whole = difference && log && addForms(difference, scaleForm(log, minusOne));
    const found = whole && this.zerosOfForm(whole);
    if (!found || constantOf(whole) !== null || keyOfForm(a.rest) !== unitKey || !this.isWhole) return found;
    // Where powers of e are too small to be told apart their exponents still are.
    const graph: Graph = { nodes: this.builder.nodes.slice(), root: this.node(whole) as number };
    const side = a.coefficient.num > 0n ? 1 : -1;
    return {
      ...found,
      signAt: (point) => {
        const sign = signAtPoint(graph, this.env.letter, point, new Map(), this.env.context)?.sign;
        return sign === undefined || sign === null ? null : ((sign * side) as -1 | 0 | 1);
      },
    };
  }

  private zerosOfForm(form: Form): Zeros | null {
    return constantOf(form) === null ? this.zerosOfNode(this.node(form)) : { points: [], open: false };
  }

  /** A polynomial in e^(d/n) with fractions as coefficients, d the difference of two exponents. */
  private polynomialInPower(terms: readonly Term[]): Zeros | null {
    const [first, second] = terms as [Term, Term];
    const step = addForms(second.exponent, scaleForm(first.exponent, minusOne));
    if (!step) return null;
    const shares: Rational[] = [];
    for (const term of terms) {
      const own = addForms(term.exponent, scaleForm(first.exponent, minusOne));
      const share = own && shareOf(own, step);
      if (!share) return null;
      shares.push(share);
    }
    const common = shares.reduce((n, share) => lcm(n, share.den), 1n);
    const exponents = shares.map((share) => (share.num * common) / share.den);
    const lowest = exponents.reduce((low, e) => (e < low ? e : low), 0n);
    const size = exponents.reduce((high, e) => (e > high ? e : high), 0n) - lowest;
    if (size > BigInt(mostDegree)) return null;
    const scale = terms.reduce((n, term) => lcm(n, term.coefficient.den), 1n);
    const coefficients = Array.from({ length: Number(size) + 1 }, () => 0n);
    terms.forEach(({ coefficient }, k) => {
      coefficients[Number((exponents[k] as bigint) - lowest)] = (coefficient.num * scale) / coefficient.den;
    });
    const roots = realRoots(squareFreePart(trim(coefficients))).filter((root) => approximate(root) > 0);
    const found = roots.map((root) => this.whereExponentIs(scaleForm(step, rational(1n, common)), root));
    return found.includes(null) ? null : joined(found as Zeros[]);
  }

  /** An arctangent or arcsine and a number: none where the number is out of range, else its tangent or sine. */
  private oneArc(form: Form): Zeros | null {
    const moving = [...form].filter(([, { powers }]) => powers.some(([id]) => this.atomUsesLetter(id)));
    const [only, ...others] = moving;
    const [power, ...factors] = only?.[1].powers ?? [];
    const atom = power?.[1] === 1 ? this.forms.atoms[power[0]] : null;
    if (!only || others.length > 0 || factors.length > 0) return null;
    if (atom?.kind !== 'arctangent' && atom?.kind !== 'arcsine') return null;
    const rest = new Map([...form].filter(([key]) => key !== only[0]));
    const value = this.node(scaleForm(rest, negate(div(one, only[1].coefficient))));
    const inner = this.node(atom.form);
    if (value === null || inner === null) return null;
    const pi = this.builder.push({ op: 'constant', args: [], name: 'pi' });
    const quarter = this.builder.mul([this.builder.number(rational(1, 2)), pi]);
    const isBelow = (a: number, b: number): -1 | 0 | 1 | null =>
      this.signOfNumber(this.builder.add([b, this.builder.negate(a)]));
    const sides = [isBelow(value, quarter), isBelow(this.builder.negate(quarter), value)];
    if (sides.includes(null)) return null;
    if (sides.includes(-1) || (sides.includes(0) && atom.kind === 'arctangent')) return { points: [], open: false };
    const call = (name: 'sin' | 'cos'): number => this.builder.push({ op: 'call', name, args: [value] });
    const target = atom.kind === 'arcsine' ? call('sin') : this.builder.div(call('sin'), call('cos'));
    return this.zerosOfNode(this.builder.add([inner, this.builder.negate(target)]));
  }

  private signOfNumber(index: number): -1 | 0 | 1 | null {
    const graph: Graph = { nodes: this.builder.nodes.slice(), root: index };
    const at: RealNumber = { kind: 'rational', value: zero };
    return signAtPoint(graph, this.env.letter, at, new Map(), this.env.context)?.sign ?? null;
  }

  /** Where form = ln(root). */
  private whereExponentIs(form: Form, root: RealNumber): Zeros | null {
    if (root.kind === 'rational') {
      const log = this.forms.logOfForm(new Map([['', { coefficient: root.value, powers: [] }]]));
      const whole = log && addForms(form, scaleForm(log, minusOne));
      return whole && this.zerosOfForm(whole);
    }
    const index = this.node(form);
    const graph: Graph | null = index === null ? null : { nodes: this.builder.nodes.slice(), root: index };
    if (!graph || degreeIn(graph, this.env.letter) !== 1) return null;
    const point = computedNumber((bits) => {
      const line = linearForm(graph, this.env.letter, new Map(), bits, this.env.context);
      const log = logOf(toKnownValue(root, bits), { bits, complex: false });
      if (!line || !isKnown(log)) return null;
      const value = divKnown(subKnown(log as KnownValue, line.offset, bits), line.slope, bits);
      return isKnown(value) ? value : null;
    });
    return point && { points: [point], open: false };
  }
}

function joined(parts: readonly Zeros[]): Zeros {
  return { points: parts.flatMap((part) => part.points), open: parts.some((part) => part.open) };
}

/** Terms with the same exponent and rest as one; null where terms with one exponent have different rests. */
function mergeTerms(terms: readonly Term[]): Term[] | null {
  const found = new Map<string, Term>();
  for (const term of terms) {
    const key = keyOfForm(term.exponent);
    const known = found.get(key);
    if (known && keyOfForm(known.rest) !== keyOfForm(term.rest)) return null;
    found.set(key, known ? { ...term, coefficient: add(known.coefficient, term.coefficient) } : term);
  }
  return [...found.values()].filter((term) => !isZero(term.coefficient));
}

/** The fraction q with own = q step; null where there is none. */
function shareOf(own: Form, step: Form): Rational | null {
  if (own.size === 0) return zero;
  const [entry] = step;
  if (!entry) return null;
  const share = div(own.get(entry[0])?.coefficient ?? zero, entry[1].coefficient);
  return keyOfForm(scaleForm(step, share)) === keyOfForm(own) ? share : null;
}
