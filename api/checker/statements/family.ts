import { rational } from '../numbers/rational.ts';
import { degreeIn, solveLinear } from '../solving/linear.ts';
import { approximate, type RealNumber } from '../solving/real-number.ts';
import { setOfPoints, type RealSet } from '../solving/real-set.ts';
import { Unsettled } from '../solving/unsettled.ts';
import type { LineEnv } from '../solving/line-env.ts';
import type { Graph } from '../values/graph.ts';

const farthest = 300;

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
