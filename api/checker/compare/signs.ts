import type { Form } from '../numbers/form.ts';
import type { GraphNode } from '../values/graph.ts';
import type { Need } from './conditions.ts';
import type { Atom, Forms } from './normal-forms.ts';

/** Signs of atoms that hold wherever both lines have a value: 1 also where the atom may be zero. */
export type Signs = Map<number, 1 | -1>;

/** What the needs of both lines and the assumed positive nodes say about the signs of atoms. */
export function findSigns(
  nodes: readonly GraphNode[],
  forms: Forms,
  needs: readonly Need[],
  positive: readonly number[],
): Signs {
  const signs = new Map<number, 1 | -1>();
  const sources = [
    ...positive,
    ...needs.filter(({ kind }) => kind === 'positive' || kind === 'nonnegative').map(({ arg }) => arg),
  ];
  for (let round = 0; round < 3; round += 1) {
    for (const index of sources) learnFrom(index, nodes, forms, signs);
  }
  return signs;
}

/** A node that is not negative: the one factor of odd power whose sign is open gets it. */
function learnFrom(index: number, nodes: readonly GraphNode[], forms: Forms, signs: Map<number, 1 | -1>): void {
  const parts = oddFactors(index, nodes, forms);
  if (parts !== null) learn(parts, forms, signs);
}

/** The same for a form. */
export function learnFromForm(form: Form, forms: Forms, signs: Map<number, 1 | -1>): void {
  const atoms = oddAtoms(forms.logOfForm(form), forms);
  const sign = leadingSign(form);
  if (atoms !== null && sign !== null) learn({ sign, atoms }, forms, signs);
}

function learn(parts: { sign: number; atoms: Set<number> }, forms: Forms, signs: Map<number, 1 | -1>): void {
  let sign = parts.sign;
  const open: number[] = [];
  for (const atom of parts.atoms) {
    const known = signOfAtom(atom, forms.atoms, signs);
    if (known === null) open.push(atom);
    else sign *= known;
  }
  const [only] = open;
  if (open.length === 1 && only !== undefined) signs.set(only, sign > 0 ? 1 : -1);
}

/** The sign in front and the atoms to an odd power of a product; null where the node is not one. */
function oddFactors(
  index: number,
  nodes: readonly GraphNode[],
  forms: Forms,
): { sign: number; atoms: Set<number> } | null {
  const atoms = oddAtoms(forms.formOf(index) && forms.logOf(index), forms);
  const sign = signInFront(index, nodes, forms);
  return atoms === null || sign === null ? null : { sign, atoms };
}

/** The atoms with an odd exponent in a product of whole powers, from its logarithm. */
function oddAtoms(log: Form | null, forms: Forms): Set<number> | null {
  if (log === null) return null;
  const atoms = new Set<number>();
  for (const { coefficient, powers } of log.values()) {
    const [first] = powers;
    const atom = first === undefined ? undefined : forms.atoms[first[0]];
    if (powers.length !== 1 || first?.[1] !== 1 || atom?.kind !== 'log' || coefficient.den !== 1n) return null;
    if (typeof atom.of === 'number' && coefficient.num % 2n !== 0n) atoms.add(atom.of);
  }
  return atoms;
}

/** 1 or -1: the sign that logarithms of sizes forget. */
export function signInFront(index: number, nodes: readonly GraphNode[], forms: Forms): number | null {
  const node = nodes[index];
  switch (node?.op) {
    case undefined:
      return null;
    case 'negate': {
      const inner = signInFront(node.args[0], nodes, forms);
      return inner === null ? null : -inner;
    }
    case 'mul':
    case 'div': {
      let sign = 1;
      for (const arg of node.args) {
        const part = signInFront(arg, nodes, forms);
        if (part === null) return null;
        sign *= part;
      }
      return sign;
    }
    case 'power': {
      const inner = signInFront(node.args[0], nodes, forms);
      return node.exponent % 2 === 0 ? 1 : inner;
    }
    case 'root':
      return node.degree % 2 === 0 || node.times % 2 === 0 ? 1 : signInFront(node.args[0], nodes, forms);
    case 'pow':
      return node.positive ? 1 : null;
    default:
      return leadingSign(forms.formOf(index));
  }
}

/** The sign of the content that splitForm takes out, by the same order of monomials. */
function leadingSign(form: Form | null): number | null {
  if (form === null || form.size === 0) return null;
  const lead = [...form].sort(([a], [b]) => (a < b ? 1 : -1))[0]?.[1];
  return lead !== undefined && lead.coefficient.num < 0n ? -1 : 1;
}

/** The sign of an atom where it is known: from what was learned, or sums of even powers. */
export function signOfAtom(id: number, atoms: readonly Atom[], signs: Signs): 1 | -1 | null {
  const learned = signs.get(id);
  if (learned !== undefined) return learned;
  const atom = atoms[id];
  if (atom?.kind === 'pi' || atom?.kind === 'e') return 1;
  if (atom?.kind !== 'factor') return null;
  const isPositive = [...atom.form.values()].every(
    ({ coefficient, powers }) =>
      coefficient.num > 0n &&
      powers.every(
        ([part, exponent]) => part !== id && part !== 0 && (exponent % 2 === 0 || signOfAtom(part, atoms, signs) === 1),
      ),
  );
  return isPositive ? 1 : null;
}

/** Whether a node is certainly not negative where both lines have a value. */
export function isPositiveNode(index: number, nodes: readonly GraphNode[], forms: Forms, signs: Signs): boolean {
  const node = nodes[index];
  if (node?.op === 'number') return node.value.num > 0n;
  if (node?.op === 'call' && node.name === 'exp') return true;
  if (node?.op === 'pow' && (node.positive || isPositiveNode(node.args[0], nodes, forms, signs))) return true;
  const parts = oddFactors(index, nodes, forms);
  if (parts === null) return false;
  let sign = parts.sign;
  for (const atom of parts.atoms) sign *= signOfAtom(atom, forms.atoms, signs) ?? Number.NaN;
  return sign > 0;
}
