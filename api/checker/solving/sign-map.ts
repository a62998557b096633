import type { CallName, Graph, GraphNode } from '../values/graph.ts';
import { signsOfFraction, type Sign, type SignMap } from './fraction-signs.ts';
import { toFraction } from './fraction.ts';
import type { LineEnv } from './line-env.ts';
import { signOf } from '../values/powers.ts';
import { degreeIn, linearForm, solveLinear } from './linear.ts';
import { signAtPoint } from './point-value.ts';
import { rationalNumber } from './real-number.ts';
import { combine, everywhere, mapPieces } from './real-set.ts';
import { scanSigns } from './scan.ts';
import { Unsettled } from './unsettled.ts';

/** Where a function of one letter is negative, zero, positive or without a value; throws Unsettled. */
export function signsOf(graph: Graph, env: LineEnv): SignMap {
  const fraction = toFraction(graph, env.letter, env.given);
  if (fraction) {
    const signs = signsOfFraction(fraction);
    // Each root will be looked at closely, at the cost of some values of the polynomial.
    env.context.budget.spend((signs.points.length * fraction.num.length ** 2) / 2);
    return signs;
  }
  env.context.budget.spend(200);
  const degree = degreeIn(graph, env.letter);
  if (degree === 0) return signsOfConstant(graph, env);
  if (degree === 1) {
    const linear = signsOfLinear(graph, env);
    if (linear) return linear;
  }
  return signsOfParts(graph, env) ?? scanSigns(graph, env, signsOf);
}

function signsOfConstant(graph: Graph, env: LineEnv): SignMap {
  const found = signAtPoint(graph, env.letter, rationalNumber({ num: 0n, den: 1n }), env.given, env.context);
  if (!found) throw new Unsettled('not-covered');
  return { ...everywhere<Sign>(found.sign), reached: found.certain ? 'proved' : 'sampled' };
}

function signsOfLinear(graph: Graph, env: LineEnv): SignMap | null {
  const root = solveLinear(graph, env.letter, env.given, env.context);
  const slope = root && linearForm(graph, env.letter, env.given, 288, env.context)?.slope;
  const side = slope ? signOf(slope) : null;
  if (!root || side === null || side === 0) return null;
  return { points: [root], at: [0], between: [-side as Sign, side], reached: 'proved' };
}

/** Functions that have values everywhere, with the sign of their argument. */
const signKeeping: ReadonlySet<CallName> = new Set(['arctan', 'sinh', 'tanh', 'sign']);

/** A product, quotient, power or root has its sign from the signs of its parts; null for anything else. */
function signsOfParts(graph: Graph, env: LineEnv): SignMap | null {
  const node = graph.nodes[graph.root] as GraphNode;
  const part = (root: number): SignMap => signsOf({ nodes: graph.nodes, root }, env);
  const of = (root: number, change: (sign: -1 | 0 | 1) => Sign): SignMap =>
    mapPieces(part(root), (sign) => (sign === null ? null : change(sign)));
  switch (node.op) {
    case 'negate':
      return of(node.args[0], (sign) => -sign as Sign);
    case 'mul':
      return node.args.map(part).reduce((a, b) => combine(a, b, timesSign));
    case 'div':
      return combine(part(node.args[0]), part(node.args[1]), (a, b) => (b === 0 ? null : timesSign(a, b)));
    case 'power':
      return of(node.args[0], (sign) => powerSign(sign, node.exponent));
    case 'root': {
      const times = node.degree % 2 === 1 ? node.times : 1;
      if (node.degree % 2 === 1 && !node.positive) return of(node.args[0], (sign) => powerSign(sign, node.times));
      return of(node.args[0], (sign) =>
        sign < 0 || (sign === 0 && (node.times < 0 || node.positive)) ? null : powerSign(sign, times),
      );
    }
    case 'call':
      return node.args[0] !== undefined && signKeeping.has(node.name) ? of(node.args[0], (sign) => sign) : null;
    default:
      return null;
  }
}

function timesSign(a: Sign, b: Sign): Sign {
  return a === null || b === null ? null : ((a * b) as Sign);
}

function powerSign(sign: -1 | 0 | 1, exponent: number): Sign {
  if (sign === 0) return exponent > 0 ? 0 : null;
  return sign < 0 && exponent % 2 === 0 ? 1 : sign;
}
