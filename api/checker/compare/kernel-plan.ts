import { addForms, atomForm, imaginaryAtom, mulForms, scaleForm } from '../numbers/form.ts';
import type { Form, Monomial } from '../numbers/form.ts';
import { lcm, rational } from '../numbers/rational.ts';
import type { GraphNode } from '../values/graph.ts';
import { createForms } from './normal-forms.ts';
import type { Atom, Forms } from './normal-forms.ts';
import { rationalOps } from './rational-identity.ts';
import { isPositiveNode, learnFromForm, signOfAtom } from './signs.ts';
import type { Signs } from './signs.ts';

/**
 * How the nodes that are not rational are written by independent generators: powers of e to monomials. Whatever is
 * equal when the generators are independent quantities is equal.
 */
export interface KernelPlan {
  readonly forms: Forms;
  readonly signs: Signs;
  /** Bases of powers that are positive wherever both lines have a value. */
  readonly positive: ReadonlySet<number>;
  /** The generator of monomial m is e^(m/D); D by the key of m. */
  readonly denominators: ReadonlyMap<string, number>;
  readonly monomials: ReadonlyMap<string, Monomial>;
  /** What a proof has to try in every combination: signs and roots that could be either. */
  readonly choices: ReadonlyMap<string, number>;
  /** Roots of unity beyond i occur. */
  readonly turns: boolean;
  /** The odd part of the degrees of roots that have to be taken modulo the primes. */
  readonly oddPart: number;
  /** Powers of two in the degrees of the roots. */
  readonly quarters: boolean;
  /** Upper bound for the sizes of the exponents. */
  readonly exponentBound: number;
}

const mostChoices = 64;
const atomlessOne: Form = new Map([['', { coefficient: rational(1), powers: [] }]]);
const circularNames = new Set(['sin', 'cos', 'tan', 'cot', 'sec', 'csc']);
const hyperbolicNames = new Set(['exp', 'sinh', 'cosh', 'tanh', 'coth', 'sech', 'csch']);

export const imaginaryForm: Form = atomForm(imaginaryAtom);

/** The exponents of e by which a node is written; null where it is not, an empty list where it needs none. */
function exponentsOf(
  node: GraphNode,
  forms: Forms,
  positive: ReadonlySet<number>,
  complex: boolean,
): readonly Form[] | null {
  switch (node.op) {
    case 'constant':
      return node.name === 'e' ? [atomlessOne] : [];
    case 'root': {
      if (complex) return [];
      const log = forms.logOf(node.args[0]);
      if (log === null) return null;
      const root = scaleForm(log, rational(node.times, node.degree));
      return node.degree % 2 === 0 ? [root] : [root, log];
    }
    case 'pow': {
      if (complex || !positive.has(node.args[0])) return [];
      const log = forms.logOf(node.args[0]);
      const exponent = forms.formOf(node.args[1]);
      const product = log && exponent && mulForms(log, exponent);
      return product && [product];
    }
    case 'call':
      return exponentsOfCall(node.name, node.args, forms, complex);
    default:
      return [];
  }
}

function exponentsOfCall(
  name: string,
  args: readonly number[],
  forms: Forms,
  complex: boolean,
): readonly Form[] | null {
  const [a] = args;
  if (a === undefined) return null;
  if (name === 'abs' && !complex) {
    const log = forms.logOf(a);
    return log && [log];
  }
  const form = forms.formOf(a);
  if (form === null) return null;
  if (hyperbolicNames.has(name)) return [form];
  if (!circularNames.has(name)) return [];
  const turned = mulForms(form, imaginaryForm);
  return turned && [turned];
}

export function createKernelPlan(
  nodes: readonly GraphNode[],
  needed: Uint8Array,
  complex: boolean,
  findSignsOf: (forms: Forms) => Signs,
): KernelPlan | null {
  const forms = createForms(nodes, complex);
  // In order, so that the first node of each kind is the one with a residue when it is asked for.
  nodes.forEach((node, index) => {
    if (needed[index] === 1 && !rationalOps.has(node.op)) forms.formOf(index);
  });
  const signs = findSignsOf(forms);
  const positive = positiveBases(nodes, needed, forms, signs);
  const denominators = new Map<string, number>();
  const monomials = new Map<string, Monomial>();
  const sized = new Set<number>();
  let exponentBound = 1;
  for (let index = 0; index < nodes.length; index += 1) {
    const node = nodes[index];
    if (needed[index] !== 1 || node === undefined) continue;
    if (node.op === 'call' && forms.formOf(index) === null) return null;
    const exponents = exponentsOf(node, forms, positive, complex);
    if (exponents === null) return null;
    const sizes = exponents.map((form) => register(form, denominators, monomials));
    // An odd root is the same whichever sign its radicand is given along with its size.
    if (node.op !== 'root' || node.degree % 2 === 0) for (const form of exponents) addSized(form, forms, sized);
    if (sizes.includes(null)) return null;
    exponentBound = Math.max(exponentBound, ...sizes.map((size) => size ?? 0));
  }
  for (const root of rootsOfArcs(forms, signs, monomials)) {
    addSized(root, forms, sized);
    const size = register(root, denominators, monomials);
    if (size === null) return null;
    exponentBound = Math.max(exponentBound, size);
  }
  return finishPlan(forms, signs, positive, denominators, monomials, sized, exponentBound);
}

/** Adds the monomials of a form; the answer bounds their exponents, null where they are out of reach. */
function register(form: Form, denominators: Map<string, number>, monomials: Map<string, Monomial>): number | null {
  let size = 1;
  for (const [key, monomial] of form) {
    const { num, den } = monomial.coefficient;
    const common = Number(lcm(BigInt(denominators.get(key) ?? 1), den));
    if (common > 120 || num > 100_000n || num < -100_000n) return null;
    denominators.set(key, common);
    monomials.set(key, monomial);
    size = Math.max(size, Math.abs(Number(num)) * common);
  }
  return size;
}

/** e^(i arcsin f) = sqrt(1-f^2) + i f and e^(i arctan f) = (1 + i f) / sqrt(1+f^2): the halved logarithms of the radicands. */
function rootsOfArcs(forms: Forms, signs: Signs, monomials: ReadonlyMap<string, Monomial>): Form[] {
  const found: Form[] = [];
  for (const { powers } of monomials.values()) {
    const kinds = powers.map(([id]) => forms.atoms[id]);
    if (!isArc(powers, kinds, 1)) continue;
    const radicand = radicandOfArc(kinds[1]);
    if (radicand === null) continue;
    learnFromForm(radicand, forms, signs);
    const log = forms.logOfForm(radicand);
    if (log !== null) found.push(scaleForm(log, rational(1, 2)));
  }
  return found;
}

export function radicandOfArc(atom: Atom | undefined): Form | null {
  if (atom?.kind !== 'arcsine' && atom?.kind !== 'arctangent') return null;
  const square = mulForms(atom.form, atom.form);
  return square && addForms(atomlessOne, atom.kind === 'arcsine' ? scaleForm(square, rational(-1)) : square);
}

function positiveBases(nodes: readonly GraphNode[], needed: Uint8Array, forms: Forms, signs: Signs): Set<number> {
  const positive = new Set<number>();
  nodes.forEach((node, index) => {
    if (needed[index] !== 1 || node.op !== 'pow') return;
    if (isPositiveNode(node.args[0], nodes, forms, signs)) positive.add(node.args[0]);
  });
  return positive;
}

function finishPlan(
  forms: Forms,
  signs: Signs,
  positive: ReadonlySet<number>,
  denominators: Map<string, number>,
  monomials: Map<string, Monomial>,
  sized: ReadonlySet<number>,
  exponentBound: number,
): KernelPlan | null {
  const choices = new Map<string, number>();
  let turns = false;
  let oddPart = 1;
  let quarters = false;
  for (const [key, { powers }] of monomials) {
    const degree = denominators.get(key) ?? 1;
    const kinds = powers.map(([id]) => forms.atoms[id]);
    if (powers.length === 2 && kinds[0]?.kind === 'imaginary' && kinds[1]?.kind === 'pi' && powers[1]?.[1] === 1)
      turns ||= degree > 2;
    const [first] = powers;
    const log = powers.length === 1 && first?.[1] === 1 ? kinds[0] : undefined;
    if (log?.kind !== 'log') continue;
    const twos = degree & -degree;
    if (typeof log.of === 'number' && sized.has(log.of) && signOfAtom(log.of, forms.atoms, signs) === null) {
      choices.set(`sign ${log.of}`, 2);
    }
    const isLetter = typeof log.of === 'number' && forms.atoms[log.of]?.kind === 'letter';
    if (isLetter) continue;
    if (typeof log.of === 'number' && twos > 1 && !isLinear(forms.atoms[log.of], forms.atoms))
      choices.set(`root ${key}`, twos);
    oddPart = Number(lcm(BigInt(oddPart), BigInt(degree / twos)));
    quarters ||= twos > 2;
  }
  let product = 1;
  for (const count of choices.values()) product *= count;
  if (product > mostChoices) return null;
  return { forms, signs, positive, denominators, monomials, choices, turns, oddPart, quarters, exponentBound };
}

function addSized(form: Form, forms: Forms, sized: Set<number>): void {
  for (const { powers } of form.values()) {
    for (const [id] of powers) {
      const atom = forms.atoms[id];
      if (atom?.kind === 'log' && typeof atom.of === 'number') sized.add(atom.of);
    }
  }
}

/**
 * A sum of letters' powers in which one letter stands alone is irreducible; the roots of different ones are independent,
 * so that one choice of each stands for all.
 */
function isLinear(atom: Atom | undefined, atoms: readonly Atom[]): boolean {
  if (atom?.kind !== 'factor') return false;
  const terms = [...atom.form.values()];
  const isPlain = terms.every(({ powers }) => powers.every(([id, n]) => n > 0 && atoms[id]?.kind === 'letter'));
  return (
    isPlain &&
    terms.some(({ powers: [only, ...others] }) => {
      if (only === undefined || only[1] !== 1 || others.length > 0) return false;
      return terms.filter(({ powers }) => powers.some(([id]) => id === only[0])).length === 1;
    })
  );
}

/** i times an inverse circular function of something: e to it is algebraic. */
export function isArc(
  powers: Monomial['powers'],
  kinds: readonly ({ readonly kind: string } | undefined)[],
  degree: number,
): boolean {
  const inner = kinds[1]?.kind;
  return (
    degree === 1 &&
    powers.length === 2 &&
    kinds[0]?.kind === 'imaginary' &&
    powers[1]?.[1] === 1 &&
    (inner === 'arcsine' || inner === 'arctangent')
  );
}
