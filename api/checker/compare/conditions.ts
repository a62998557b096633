import type { RelationSign } from '../../../shared/maths/expression.ts';
import { ballSign, magnitude } from '../numbers/ball.ts';
import * as Q from '../numbers/rational.ts';
import { isExactZero, isKnown, isNonZero, isReal, toBall } from '../values/arithmetic.ts';
import type { GraphNode } from '../values/graph.ts';
import { signOf } from '../values/powers.ts';
import type { KnownValue, Value } from '../values/value.ts';

/** What a node needs of one of its arguments to have a value. */
export interface Need {
  readonly arg: number;
  readonly kind:
    | 'nonzero'
    | 'positive'
    | 'nonnegative'
    | 'within-one'
    | 'inside-one'
    | 'from-one'
    | 'beyond-one'
    | 'cosine'
    | 'sine'
    | 'whole';
}

/** What the needed nodes ask for. Denominators that are products ask of each factor. */
export function needsOf(nodes: readonly GraphNode[], needed: Uint8Array, complex: boolean): Need[] {
  const found = new Map<string, Need>();
  const ask = (arg: number, kind: Need['kind']) => found.set(`${kind}${arg}`, { arg, kind });
  const askNonzero = (arg: number): void => {
    const node = nodes[arg];
    if (node?.op === 'mul') node.args.forEach(askNonzero);
    else if (node?.op === 'negate') askNonzero(node.args[0]);
    else if (node?.op === 'power' && node.exponent > 0) askNonzero(node.args[0]);
    else if (node?.op === 'div') askNonzero(node.args[0]);
    else if (node?.op === 'root' && node.times > 0) askNonzero(node.args[0]);
    else if (isNeverZero(nodes, arg)) return;
    else if (node?.op !== 'number' || Q.isZero(node.value)) ask(arg, 'nonzero');
  };
  nodes.forEach((node, index) => {
    if (needed[index] !== 1) return;
    if (node.op === 'div') askNonzero(node.args[1]);
    else if (node.op === 'power' && node.exponent < 0) askNonzero(node.args[0]);
    else if (node.op === 'pow' && node.positive) ask(node.args[0], 'positive');
    else if (node.op === 'root') askOfRoot(node, complex, ask, askNonzero);
    else if (node.op === 'call') askOfCall(node.name, node.args, complex, ask, askNonzero);
  });
  return [...found.values()];
}

/** Powers of e and of positive numbers: those of other bases ask for the base by themselves. */
function isNeverZero(nodes: readonly GraphNode[], arg: number): boolean {
  const node = nodes[arg];
  if (node?.op === 'call') return node.name === 'exp';
  const base = node?.op === 'pow' ? nodes[node.args[0]] : undefined;
  return base?.op === 'number' && Q.sign(base.value) > 0;
}

function askOfRoot(
  node: Extract<GraphNode, { op: 'root' }>,
  complex: boolean,
  ask: (arg: number, kind: Need['kind']) => void,
  askNonzero: (arg: number) => void,
): void {
  const arg = node.args[0];
  if (node.times < 0) askNonzero(arg);
  if (complex) return;
  if (node.positive) ask(arg, 'positive');
  else if (node.degree % 2 === 0) ask(arg, 'nonnegative');
}

function askOfCall(
  name: string,
  args: readonly number[],
  complex: boolean,
  ask: (arg: number, kind: Need['kind']) => void,
  askNonzero: (arg: number) => void,
): void {
  const [a, b] = args;
  if (a === undefined) return;
  const real = (kind: Need['kind']) => (complex ? undefined : ask(a, kind));
  switch (name) {
    case 'log':
      for (const arg of [a, b]) if (arg !== undefined) ask(arg, complex ? 'nonzero' : 'positive');
      return;
    case 'ln':
      return void ask(a, complex ? 'nonzero' : 'positive');
    case 'tan':
    case 'sec':
      return void ask(a, 'cosine');
    case 'cot':
    case 'csc':
      return void ask(a, 'sine');
    case 'coth':
    case 'csch':
    case 'arg':
      return askNonzero(a);
    case 'arcsin':
    case 'arccos':
      return void real('within-one');
    case 'arcsec':
    case 'arccsc':
      return void (complex ? ask(a, 'nonzero') : ask(a, 'beyond-one'));
    case 'artanh':
      return void real('inside-one');
    case 'arcosh':
      return void real('from-one');
    case 'factorial':
    case 'gcd':
    case 'lcm':
      for (const arg of args) ask(arg, 'whole');
      return;
    case 'binomial':
      if (b !== undefined) ask(b, 'whole');
      return;
    default:
      return;
  }
}

/** Whether a value meets a need; null where the bits do not tell or the value is missing. */
export function meets(need: Need, value: Value | undefined, bits: number): boolean | null {
  if (value === undefined || !isKnown(value)) return null;
  switch (need.kind) {
    case 'nonzero':
      return value.kind === 'ball' ? isNonZero(value) || null : !isExactZero(value);
    case 'positive':
      return compareToZero(value, false);
    case 'nonnegative':
      return compareToZero(value, true);
    case 'cosine':
      return value.kind === 'pi'
        ? !Q.equals(Q.sub(value.value, { num: Q.floor(value.value), den: 1n }), Q.rational(1, 2))
        : true;
    case 'sine':
      return value.kind === 'pi' ? !Q.isWhole(value.value) : !isExactZero(value);
    case 'whole':
      return value.kind === 'rational' ? Q.isWhole(value.value) : null;
    default:
      return compareToOne(need.kind, value, bits);
  }
}

function compareToZero(value: KnownValue, orZero: boolean): boolean | null {
  if (!isReal(value)) return false;
  const order = signOf(value);
  return order === null ? null : order > 0 || (orZero && order === 0);
}

function compareToOne(kind: Need['kind'], value: KnownValue, bits: number): boolean | null {
  if (!isReal(value)) return false;
  const size = sizeAgainstOne(value, bits);
  if (size === null) return null;
  if (kind === 'within-one') return size <= 0;
  if (kind === 'inside-one') return size < 0;
  if (kind === 'beyond-one') return size >= 0;
  return size >= 0 && signOf(value) !== -1;
}

function sizeAgainstOne(value: KnownValue, bits: number): -1 | 0 | 1 | null {
  if (value.kind === 'rational') return Q.compare(Q.absolute(value.value), Q.one);
  const ball = toBall(value, bits).re;
  const gap = magnitude(ball.mid) - (1n << BigInt(bits));
  return ballSign({ mid: gap, rad: ball.rad }) || null;
}

/** Whether a need is met with room to spare, so that it stays met nearby. */
export function meetsOpenly(need: Need, value: Value | undefined, bits: number): boolean {
  if (value === undefined || meets(need, value, bits) !== true || !isKnown(value)) return false;
  switch (need.kind) {
    case 'nonnegative':
      return !isExactZero(value);
    case 'within-one':
    case 'from-one':
    case 'beyond-one':
      return sizeAgainstOne(value, bits) !== 0;
    case 'whole':
      return false;
    default:
      return true;
  }
}

/** The need as a relation of its argument to a number; null where it is no such relation. */
export function relationOf(need: Need): { sign: RelationSign; to: number } | null {
  switch (need.kind) {
    case 'nonzero':
      return { sign: '!=', to: 0 };
    case 'positive':
      return { sign: '>', to: 0 };
    case 'nonnegative':
      return { sign: '>=', to: 0 };
    case 'from-one':
      return { sign: '>=', to: 1 };
    default:
      return null;
  }
}
