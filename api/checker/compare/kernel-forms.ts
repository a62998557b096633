import { addForms, constantForm, keyOfForm } from '../numbers/form.ts';
import type { Form } from '../numbers/form.ts';
import { powMod } from '../numbers/modular.ts';
import * as Q from '../numbers/rational.ts';
import type { GraphNode } from '../values/graph.ts';

export const oneForm: Form = new Map([['', { coefficient: Q.one, powers: [] }]]);
export const circularNames = new Set(['sin', 'cos', 'tan', 'cot', 'sec', 'csc']);
export const hyperbolicNames = new Set(['sinh', 'cosh', 'tanh', 'coth', 'sech', 'csch']);

/** Every coefficient times the factor. */
export function scaled(form: Form, factor: Q.Rational): Form {
  return new Map([...form].map(([key, term]) => [key, { ...term, coefficient: Q.mul(term.coefficient, factor) }]));
}

/** A form as a whole number plus a rest whose constant lies in [0, 1). */
export function splitOffset(form: Form): { offset: number | null; rest: Form; key: string } {
  const constant = form.get('')?.coefficient ?? Q.zero;
  const whole = Q.floor(constant);
  const rest = addForms(form, constantForm({ num: -whole, den: 1n })) ?? form;
  return { offset: whole > 3_000n || whole < -60n ? null : Number(whole), rest, key: keyOfForm(rest) };
}

/** Whether a node's residue follows from generators rather than being a quantity of its own. */
export function isWritten(node: GraphNode, complex: boolean): boolean {
  if (node.op === 'root' || node.op === 'pow') return !complex;
  if (node.op !== 'call') return false;
  if (node.name === 'abs' || node.name === 'log') return !complex;
  return (
    node.name === 'exp' || node.name === 'factorial' || circularNames.has(node.name) || hyperbolicNames.has(node.name)
  );
}

/** The least primitive root modulo a prime. */
export function primitiveRoot(p: number): number {
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
