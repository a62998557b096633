import type { CheckContext } from '../context.ts';
import type { Point } from '../values/value.ts';
import { breakPointsOf } from './break-points.ts';
import type { Comparison } from './comparison.ts';
import { findConditions } from './find-conditions.ts';
import { provesIdentity } from './kernel-identity.ts';
import { marksOf } from './pair.ts';
import type { Pair } from './pair.ts';
import { createRegion, pointsOf } from './points.ts';
import type { Region } from './points.ts';
import { takeSamples } from './sampling.ts';
import type { Samples } from './sampling.ts';
import { witnessAt } from './witness.ts';

const mostPoints = 220;
const firstPoints = 14;
const agreementsAsked = 40;
const agreementsNeeded = 12;
const agreementsWhenProved = 6;

/** Expressions with roots, exponentials, logarithms, circular functions, bars, factorials and the like. */
export function compareFunctions(pair: Pair, context: CheckContext): Comparison {
  const region = createRegion(pair.names, marksOf(pair), usesTurns(pair), context);
  const isProved = provesIdentity(pair, [], context);
  const agreements = isProved ? agreementsWhenProved : agreementsAsked;
  const progress = { mustGoOn: true };
  const points = pointsFor(pair, region, isProved, progress, context);
  const samples = takeSamples(pair, points, context, { agreements, mayStop: () => isProved || !progress.mustGoOn });
  if (samples.apart !== null) {
    const witness = witnessAt(pair, samples.apart.point, samples.apart.bits, context);
    return witness === null ? { kind: 'undecided', reason: 'not-settled' } : { kind: 'different', witness };
  }
  return rule(pair, samples, region, isProved, context);
}

/** Small numbers first; then, unless an identity covers them, both sides of every break; then the rest. */
function* pointsFor(pair: Pair, region: Region, isProved: boolean, progress: { mustGoOn: boolean }, context: CheckContext): Generator<Point> {
  yield* pointsOf(region, context.seed, firstPoints);
  if (!isProved && context.numbers === 'real') yield* breakPointsOf(pair, region);
  progress.mustGoOn = false;
  yield* pointsOf(region, context.seed, mostPoints, firstPoints);
}

function usesTurns(pair: Pair): boolean {
  return pair.nodes.some(
    (node, index) =>
      pair.needed[index] === 1 && node.op === 'call' && ['sin', 'cos', 'tan', 'cot', 'sec', 'csc'].includes(node.name),
  );
}

function rule(pair: Pair, samples: Samples, region: Region, isProved: boolean, context: CheckContext): Comparison {
  const { counts } = samples;
  const tried = Object.values(counts).reduce((a, b) => a + b, 0);
  if (counts['no-agreed-meaning'] * 6 > tried) return { kind: 'undecided', reason: 'no-agreed-meaning' };
  if (counts['not-covered'] * 2 > tried) return { kind: 'undecided', reason: 'not-covered' };
  if (counts.same >= (isProved ? 1 : agreementsNeeded) && (samples.inside || pair.names.every((name) => region.whole.has(name)))) {
    return { kind: 'equal', reached: isProved ? 'proved' : 'sampled', ...findConditions(pair, samples, region, context) };
  }
  if (counts.limit > 0 && counts.same === 0) return { kind: 'undecided', reason: 'limit' };
  if (counts.same === 0 && counts.blurred === 0) return { kind: 'undecided', reason: 'no-domain' };
  return { kind: 'undecided', reason: 'not-settled' };
}
