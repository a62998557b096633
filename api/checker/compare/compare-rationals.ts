import type { CheckContext } from '../context.ts';
import { compareAt } from './agreement.ts';
import type { Comparison } from './comparison.ts';
import { conditionsWithoutPoints, findConditions } from './find-conditions.ts';
import { marksOf } from './pair.ts';
import type { Pair } from './pair.ts';
import { createRegion, pointsOf } from './points.ts';
import type { Region, Traits } from './points.ts';
import { compareRational } from './rational-identity.ts';
import { takeSamples } from './sampling.ts';
import type { Samples } from './sampling.ts';
import { witnessAt } from './witness.ts';

const mostPoints = 400;
const plain: Traits = { turns: false, gentle: false };
const exactLadder = [160] as const;

/** Quotients of polynomials in any number of letters: decided by modular evaluation, shown by exact values. */
export function compareRationals(pair: Pair, context: CheckContext): Comparison {
  const identity =
    pair.above === pair.below && pair.needsAbove.length === 0
      ? 'identical'
      : compareRational(pair.nodes, pair.needed, pair.above, pair.below, pair.names, context.seed);
  if (identity === 'first-undefined' || identity === 'second-undefined') return withoutValue(identity, pair, context);
  if (identity === 'different')
    return findDifference(pair, createRegion(pair.names, pair.whole, marksOf(pair), plain, context), context);
  const reached = identity === 'identical' ? 'proved' : 'sampled';
  const isPolynomial = pair.needsAbove.length === 0 && pair.needsBelow.length === 0;
  if (isPolynomial && context.assumptions.length === 0) return { kind: 'equal', reached, excluded: [], cancelled: [] };
  const region = createRegion(pair.names, pair.whole, marksOf(pair), plain, context);
  // Without assumptions a quotient has a value almost everywhere.
  const found = context.assumptions.length === 0 ? conditionsWithoutPoints(pair, region) : null;
  if (found !== null) return { kind: 'equal', reached, ...found };
  const samples = takeSamples(pair, pointsOf(region, context.seed, mostPoints), context, { agreements: 2 });
  if (samples.apart !== null) return { kind: 'undecided', reason: 'not-settled' };
  if (!samples.inside) return { kind: 'undecided', reason: samples.counts.limit > 0 ? 'limit' : 'no-domain' };
  return { kind: 'equal', reached, ...findConditions(pair, samples, region, context) };
}

/** A denominator that is zero everywhere is confirmed at points before anything is said. */
function withoutValue(identity: 'first-undefined' | 'second-undefined', pair: Pair, context: CheckContext): Comparison {
  if (identity === 'first-undefined') return { kind: 'undecided', reason: 'no-domain' };
  const region = createRegion(pair.names, pair.whole, [], plain, context);
  const samples = takeSamples(pair, pointsOf(region, context.seed, 40), context, { agreements: 1 });
  if (samples.counts['no-agreed-meaning'] > 0) return { kind: 'undecided', reason: 'no-agreed-meaning' };
  const onlyAbove = samples.counts['above-only'] > 0 && samples.counts.same === 0 && samples.counts['below-only'] === 0;
  return onlyAbove && samples.insideAbove ? { kind: 'meaningless' } : { kind: 'undecided', reason: 'no-domain' };
}

function findDifference(pair: Pair, region: Region, context: CheckContext): Comparison {
  let agreeing = 0;
  let limited = 0;
  for (const point of pointsOf(region, context.seed, mostPoints)) {
    const result = compareAt(pair, point, context, exactLadder);
    if (result.agreement === 'apart') {
      const witness = witnessAt(pair, point, result.bits, context);
      if (witness !== null) return { kind: 'different', witness };
    }
    if (result.agreement === 'same') agreeing += 1;
    if (result.agreement === 'limit') limited += 1;
    if (limited > 20) break;
    // Different as formal quotients, yet equal wherever an equation among the assumptions holds.
    if (agreeing >= 40 && region.equations.length > 0) return settledByEquations(pair, region, context);
  }
  return { kind: 'undecided', reason: limited > 0 ? 'limit' : agreeing > 0 ? 'not-settled' : 'no-domain' };
}

function settledByEquations(pair: Pair, region: Region, context: CheckContext): Comparison {
  const samples: Samples = takeSamples(pair, pointsOf(region, context.seed + 1, mostPoints), context, {
    agreements: 40,
  });
  if (samples.apart !== null) return { kind: 'undecided', reason: 'not-settled' };
  if (!samples.inside || samples.counts.same < 40) return { kind: 'undecided', reason: 'no-domain' };
  return { kind: 'equal', reached: 'sampled', ...findConditions(pair, samples, region, context) };
}
