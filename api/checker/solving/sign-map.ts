import type { Graph } from '../values/graph.ts';
import { signsOfFraction, type Sign, type SignMap } from './fraction-signs.ts';
import { toFraction } from './fraction.ts';
import type { LineEnv } from './line-env.ts';
import { degreeIn, solveLinear } from './linear.ts';
import { signAtPoint } from './point-value.ts';
import { between, rationalNumber } from './real-number.ts';
import { everywhere } from './real-set.ts';
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
  return scanSigns(graph, env, signsOf);
}

function signsOfConstant(graph: Graph, env: LineEnv): SignMap {
  const found = signAtPoint(graph, env.letter, rationalNumber({ num: 0n, den: 1n }), env.given, env.context);
  if (!found) throw new Unsettled('not-covered');
  return { ...everywhere<Sign>(found.sign), reached: found.certain ? 'proved' : 'sampled' };
}

function signsOfLinear(graph: Graph, env: LineEnv): SignMap | null {
  const root = solveLinear(graph, env.letter, env.given, env.context);
  if (!root) return null;
  const sides = [between(null, root), between(root, null)].map((x) => {
    return signAtPoint(graph, env.letter, rationalNumber(x), env.given, env.context)?.sign ?? null;
  });
  if (sides[0] === null || sides[0] === 0 || sides[1] !== -(sides[0] as number)) return null;
  return { points: [root], at: [0], between: sides as Sign[], reached: 'proved' };
}
