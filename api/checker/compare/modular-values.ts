import { addMod, bigMod, imaginaryMod, inverseMod, mulMod, negateMod, powMod } from '../numbers/modular.ts';
import type { Random } from '../numbers/random.ts';
import type { GraphNode } from '../values/graph.ts';

/** A node without a value modulo the prime at this point: a denominator vanished there. */
export const noResidue = -1;

/** What stands for the nodes that are neither numbers, letters nor rational operations; null: none is allowed. */
export type Kernel = (index: number, residues: Float64Array, p: number) => number;

/** The value modulo p of each wanted node at the given residues of the letters. */
export function evaluateModular(
  nodes: readonly GraphNode[],
  wanted: Uint8Array,
  p: number,
  letters: ReadonlyMap<string, number>,
  kernel: Kernel | null,
): Float64Array {
  const residues = new Float64Array(nodes.length);
  nodes.forEach((node, index) => {
    if (wanted[index] === 1) residues[index] = residueOf(node, index, residues, p, letters, kernel);
  });
  return residues;
}

function residueOf(
  node: GraphNode,
  index: number,
  residues: Float64Array,
  p: number,
  letters: ReadonlyMap<string, number>,
  kernel: Kernel | null,
): number {
  switch (node.op) {
    case 'number': {
      const top = bigMod(node.value.num, p);
      if (node.value.den === 1n) return top;
      const bottom = bigMod(node.value.den, p);
      return bottom === 0 ? noResidue : mulMod(top, inverseMod(bottom, p), p);
    }
    case 'letter':
      return letters.get(node.name) ?? noResidue;
    case 'add':
    case 'mul':
      return joinResidues(node.op, node.args, residues, p);
    case 'negate': {
      const value = residues[node.args[0]] ?? noResidue;
      return value === noResidue ? value : negateMod(value, p);
    }
    case 'div': {
      const top = residues[node.args[0]] ?? noResidue;
      const bottom = residues[node.args[1]] ?? noResidue;
      return top === noResidue || bottom <= 0 ? noResidue : mulMod(top, inverseMod(bottom, p), p);
    }
    case 'power':
      return powerResidue(residues[node.args[0]] ?? noResidue, node.exponent, p);
    case 'constant':
      if (node.name === 'i') return imaginaryMod(p);
      return kernel === null ? noResidue : kernel(index, residues, p);
    default:
      return kernel === null ? noResidue : kernel(index, residues, p);
  }
}

function joinResidues(op: 'add' | 'mul', args: readonly number[], residues: Float64Array, p: number): number {
  let total = op === 'add' ? 0 : 1;
  for (const arg of args) {
    const value = residues[arg] ?? noResidue;
    if (value === noResidue) return noResidue;
    total = op === 'add' ? addMod(total, value, p) : mulMod(total, value, p);
  }
  return total;
}

export function powerResidue(base: number, exponent: number, p: number): number {
  // A base that is zero here has no zeroth or negative power.
  if (base === noResidue || (base === 0 && exponent <= 0)) return noResidue;
  const power = powMod(base, Math.abs(exponent), p);
  return exponent < 0 ? inverseMod(power, p) : power;
}

/** Residues of the letters, never 0. */
export function randomLetters(names: readonly string[], random: Random, p: number): Map<string, number> {
  return new Map(names.map((name) => [name, 1 + random(p - 1)]));
}

/** Marks the nodes that the roots depend on. */
export function markNeeded(nodes: readonly GraphNode[], roots: readonly number[]): Uint8Array {
  const needed = new Uint8Array(nodes.length);
  for (const root of roots) needed[root] = 1;
  for (let index = nodes.length - 1; index >= 0; index -= 1) {
    if (needed[index] === 1) for (const arg of nodes[index]?.args ?? []) needed[arg] = 1;
  }
  return needed;
}
