import type { CheckContext } from '../context.ts';
import {
  addBalls,
  ballSign,
  costOfStep,
  divBalls,
  magnitude,
  negateBall,
  sqrtBall,
  type Ball,
} from '../numbers/ball.ts';
import { expBall, sinCosBall } from '../numbers/elementary.ts';
import * as Q from '../numbers/rational.ts';
import { charge, costOfProduct } from '../numbers/work.ts';
import { isKnown, isReal, toBall } from '../values/arithmetic.ts';
import { evaluateNodes } from '../values/evaluate.ts';
import type { Graph, GraphNode } from '../values/graph.ts';

/**
 * Taylor coefficients of an expression in one letter, as balls: a point gives those of the expansion there, an interval
 * encloses those of the expansions at all of its points. Recurrences as in Moore, Methods and Applications of Interval
 * Analysis (1979), 3.4.
 */
export function taylorOf(
  graph: Graph,
  letter: string,
  at: Ball,
  order: number,
  bits: number,
  context: CheckContext,
): Ball[] | null {
  const values = evaluateNodes(graph.nodes, new Map([[letter, { kind: 'ball', re: at, im: null }]]), bits, context);
  const jets: (Ball[] | null)[] = [];
  for (const [index, node] of graph.nodes.entries()) {
    const value = values[index];
    const head = value && isKnown(value) && isReal(value) ? toBall(value, bits).re : null;
    jets.push(head && jetOf(node, head, jets, { letter, order, bits }));
    context.budget.spend(1 + (order >> 2));
  }
  return jets[graph.root] ?? null;
}

interface Setting {
  readonly letter: string;
  readonly order: number;
  readonly bits: number;
}

const nothing: Ball = { mid: 0n, rad: 0n };

function constantJet(head: Ball, order: number): Ball[] {
  return [head, ...Array.from({ length: order }, () => nothing)];
}

function jetOf(node: GraphNode, head: Ball, jets: readonly (Ball[] | null)[], setting: Setting): Ball[] | null {
  const { order, bits } = setting;
  const args = node.args.map((arg) => jets[arg] ?? null);
  if (args.includes(null)) return null;
  const known = args as Ball[][];
  const [a, b] = known;
  switch (node.op) {
    case 'number':
    case 'constant':
      return constantJet(head, order);
    case 'letter':
      if (node.name !== setting.letter) return null;
      return [head, { mid: 1n << BigInt(bits), rad: 0n }, ...Array.from({ length: order - 1 }, () => nothing)];
    case 'add':
      return Array.from({ length: order + 1 }, (_, k) =>
        known.reduce((total, jet) => addBalls(total, jet[k] as Ball), nothing),
      );
    case 'mul':
      return known.reduce((total, jet) => mulJets(total, jet, bits));
    case 'negate':
      return a ? a.map(negateBall) : null;
    case 'div':
      return a && b ? divJets(a, b, head, bits) : null;
    case 'power':
      return a ? powJet(a, Q.rational(node.exponent), head, bits) : null;
    case 'root':
      return a ? powJet(a, Q.rational(node.times, node.degree), head, bits) : null;
    case 'call':
      return a && known.length === 1 ? callJet(node.name, a, head, bits) : null;
    default:
      return known.every((jet) => jet.slice(1).every((ball) => ball.mid === 0n && ball.rad === 0n))
        ? constantJet(head, order)
        : null;
  }
}

function mulJets(a: readonly Ball[], b: readonly Ball[], bits: number): Ball[] {
  return a.map((_, k) => convolved(a, b, k, 0, 0n, 1n, 1n, bits));
}

/** The sum over j from `first` to k of (p j + q) a_j b_(k-j), over `under`: one rounding for all. */
function convolved(
  a: readonly Ball[],
  b: readonly Ball[],
  k: number,
  first: number,
  p: bigint,
  q: bigint,
  under: bigint,
  bits: number,
): Ball {
  let mid = 0n;
  let rad = 0n;
  let products = 0;
  const isPlain = p === 0n && q === 1n;
  for (let j = first; j <= k; j += 1) {
    const [x, y] = [a[j] as Ball, b[k - j] as Ball];
    if ((x.mid === 0n && x.rad === 0n) || (y.mid === 0n && y.rad === 0n)) continue;
    const weight = isPlain ? 1n : p * BigInt(j) + q;
    mid += isPlain ? x.mid * y.mid : weight * x.mid * y.mid;
    products += 1;
    if (x.rad === 0n && y.rad === 0n) continue;
    const spread = magnitude(x.mid) * y.rad + (magnitude(y.mid) + y.rad) * x.rad;
    rad += isPlain ? spread : magnitude(weight) * spread;
    products += 1;
  }
  // Far out numbers are much longer than those of size one.
  const length = Q.bitLength(mid);
  charge(0.2 + 0.75 * products * (length > 3 * bits ? 0.3 + costOfProduct(length) : costOfStep(bits)));
  const shift = BigInt(bits);
  return { mid: (mid >> shift) / under, rad: (rad >> shift) / under + 3n };
}

/** q b = a, from the lowest coefficient up. */
function divJets(a: readonly Ball[], b: readonly Ball[], head: Ball, bits: number): Ball[] | null {
  const result: Ball[] = [head];
  for (let k = 1; k < a.length; k += 1) {
    const top = addBalls(a[k] as Ball, negateBall(convolved(b, result, k, 1, 0n, 1n, 1n, bits)));
    const next = divBalls(top, b[0] as Ball, bits);
    if (!next) return null;
    result.push(next);
  }
  return result;
}

/** a p' = r p a'; a whole power of what may be zero is multiplied out. */
function powJet(a: readonly Ball[], r: Q.Rational, head: Ball, bits: number): Ball[] | null {
  if (r.den === 1n && r.num >= 0n && r.num <= 60n) {
    let total = constantJet({ mid: 1n << BigInt(bits), rad: 0n }, a.length - 1);
    for (let k = 0n; k < r.num; k += 1n) total = mulJets(total, a, bits);
    return total;
  }
  if (ballSign(a[0] as Ball) === 0) return null;
  const result: Ball[] = [head];
  for (let k = 1; k < a.length; k += 1) {
    // ((r + 1) j / k - 1), over a common denominator.
    const total = convolved(a, result, k, 1, r.num + r.den, -BigInt(k) * r.den, BigInt(k) * r.den, bits);
    const next = divBalls(total, a[0] as Ball, bits);
    if (!next) return null;
    result.push(next);
  }
  return result;
}

/** From y' = g a', with the coefficients of g. */
function integrated(g: readonly Ball[], a: readonly Ball[], head: Ball, bits: number): Ball[] {
  const result: Ball[] = [head];
  for (let k = 1; k < a.length; k += 1) result.push(chainTerm(g, a, k, bits));
  return result;
}

/** The k-th coefficient of an integral of g a'. */
function chainTerm(g: readonly Ball[], a: readonly Ball[], k: number, bits: number): Ball {
  return convolved(a, g, k, 1, 1n, 0n, BigInt(k), bits);
}

function callJet(name: string, a: readonly Ball[], head: Ball, bits: number): Ball[] | null {
  const one = constantJet({ mid: 1n << BigInt(bits), rad: 0n }, a.length - 1);
  switch (name) {
    case 'exp': {
      const result: Ball[] = [head];
      for (let k = 1; k < a.length; k += 1) result.push(chainTerm(result, a, k, bits));
      return result;
    }
    case 'ln': {
      const inverse = divBalls(one[0] as Ball, a[0] as Ball, bits);
      const slope = inverse && divJets(one, a, inverse, bits);
      return slope && integrated(slope, a, head, bits);
    }
    case 'arctan': {
      const bottom = mulJets(a, a, bits).map((ball, k) => addBalls(ball, one[k] as Ball));
      const inverse = divBalls(one[0] as Ball, bottom[0] as Ball, bits);
      const slope = inverse && divJets(one, bottom, inverse, bits);
      return slope && integrated(slope, a, head, bits);
    }
    case 'abs': {
      const known = ballSign(a[0] as Ball);
      if (known === 0) return null;
      return known > 0 ? [...a] : a.map(negateBall);
    }
    case 'arcsin':
    case 'arccos': {
      const under = mulJets(a, a, bits).map((ball, k) => addBalls(one[k] as Ball, negateBall(ball)));
      const root = sqrtBall(under[0] as Ball, bits);
      const first = root && divBalls(one[0] as Ball, root, bits);
      const slope = first && powJet(under, Q.rational(-1, 2), first, bits);
      return slope && integrated(name === 'arcsin' ? slope : slope.map(negateBall), a, head, bits);
    }
    default:
      return circularJet(name, a, bits) ?? hyperbolicJet(name, a, bits);
  }
}

function quotientJet(a: readonly Ball[], b: readonly Ball[], bits: number): Ball[] | null {
  const head = divBalls(a[0] as Ball, b[0] as Ball, bits);
  return head && divJets(a, b, head, bits);
}

/** The sine and cosine are found together. */
function circularJet(name: string, a: readonly Ball[], bits: number): Ball[] | null {
  if (!['sin', 'cos', 'tan', 'cot', 'sec', 'csc'].includes(name)) return null;
  const heads = sinCosBall(a[0] as Ball, bits);
  if (!heads) return null;
  const sin: Ball[] = [heads.sin];
  const cos: Ball[] = [heads.cos];
  for (let k = 1; k < a.length; k += 1) {
    const [s, c] = [chainTerm(cos, a, k, bits), negateBall(chainTerm(sin, a, k, bits))];
    sin.push(s);
    cos.push(c);
  }
  const one = constantJet({ mid: 1n << BigInt(bits), rad: 0n }, a.length - 1);
  switch (name) {
    case 'sin':
      return sin;
    case 'cos':
      return cos;
    case 'tan':
      return quotientJet(sin, cos, bits);
    case 'cot':
      return quotientJet(cos, sin, bits);
    case 'sec':
      return quotientJet(one, cos, bits);
    default:
      return quotientJet(one, sin, bits);
  }
}

function hyperbolicJet(name: string, a: readonly Ball[], bits: number): Ball[] | null {
  if (!['sinh', 'cosh', 'tanh'].includes(name)) return null;
  const [up, down] = [a, a.map(negateBall)].map((jet) => {
    const head = expBall(jet[0] as Ball, bits);
    return head && callJet('exp', jet, head, bits);
  });
  if (!up || !down) return null;
  const half = (jet: readonly Ball[]): Ball[] =>
    jet.map((ball) => ({ mid: ball.mid >> 1n, rad: (ball.rad >> 1n) + 1n }));
  const sinh = half(up.map((ball, k) => addBalls(ball, negateBall(down[k] as Ball))));
  const cosh = half(up.map((ball, k) => addBalls(ball, down[k] as Ball)));
  if (name === 'sinh') return sinh;
  return name === 'cosh' ? cosh : quotientJet(sinh, cosh, bits);
}
