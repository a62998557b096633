import { rational } from '../numbers/rational.ts';
import { degreeIn, solveLinear } from '../solving/linear.ts';
import { approximate, rationalNumber, type RealNumber } from '../solving/real-number.ts';
import {
  complement,
  emptySet,
  intersection,
  isEmptySet,
  setOfPoints,
  union,
  type RealSet,
} from '../solving/real-set.ts';
import { Unsettled } from '../solving/unsettled.ts';
import type { LineEnv, Window } from '../solving/line-env.ts';
import type { Graph } from '../values/graph.ts';
import { comparesOf, type Statement } from './statement.ts';

const farthest = 300;

interface FamilyEnv extends LineEnv {
  readonly families: ReadonlySet<string>;
}

/**
 * What inequalities with an index are true for, inside the window: for some whole number, or where they only shut values
 * out (x is not pi/2 + k pi) for all of them.
 */
export function familySets<T extends Statement>(
  statement: T,
  index: string,
  env: FamilyEnv,
  solve: (statement: T, env: FamilyEnv) => RealSet,
): RealSet {
  const { window } = env;
  if (!window) throw new Unsettled('not-covered');
  const families = new Set([...env.families].filter((name) => name !== index));
  const shutsOut = comparesOf(statement).every(({ sign }) => sign === '!=');
  const inside = between(window);
  let total = emptySet;
  for (const direction of [1, -1]) {
    let outside = 0;
    for (let k = direction === 1 ? 0 : -1; outside < 4; k += direction) {
      if (Math.abs(k) > mostSets) throw new Unsettled('limit');
      const found = solve(statement, { ...env, families, given: new Map([...env.given, [index, rational(k)]]) });
      const part = intersection(shutsOut ? complement(found) : found, inside);
      outside = isEmptySet(part) ? outside + 1 : 0;
      total = union(total, part);
    }
  }
  return shutsOut ? complement(total) : total;
}

const mostSets = 60;

function between({ low, high }: Window): RealSet {
  // A little more than the window, so that its ends are in it.
  const [from, to] = [Math.floor(low * 1024) - 1, Math.ceil(high * 1024) + 1].map((end) =>
    rationalNumber(rational(BigInt(end), 1024n)),
  );
  return {
    points: [from as RealNumber, to as RealNumber],
    at: [true, true],
    between: [false, true, false],
    reached: 'proved',
  };
}

/**
 * The points of a general solution such as x = pi/6 + 2k pi inside the window, k running through the whole numbers in
 * both directions until its values have left the window for good.
 */
export function familyPoints(graph: Graph, index: string, env: LineEnv): RealSet {
  if (!env.window || degreeIn(graph, env.letter) !== 1) throw new Unsettled('not-covered');
  const points: RealNumber[] = [];
  for (const direction of [1, -1]) {
    let outside = 0;
    for (let k = direction === 1 ? 0 : -1; outside < 4; k += direction) {
      if (Math.abs(k) > farthest) throw new Unsettled('limit');
      const root = solveLinear(graph, env.letter, new Map([...env.given, [index, rational(k)]]), env.context);
      if (!root) throw new Unsettled('not-covered');
      const x = approximate(root);
      if (x >= env.window.low - 1e-9 && x <= env.window.high + 1e-9) {
        points.push(root);
        outside = 0;
      } else outside += 1;
    }
  }
  return setOfPoints(points);
}
