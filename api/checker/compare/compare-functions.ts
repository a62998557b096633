import type { CheckContext } from '../context.ts';
import { isComplexLetter } from '../real-letters.ts';
import { isKnown, isReal } from '../values/arithmetic.ts';
import { usuallyWhole } from '../values/lower.ts';
import type { KnownValue, Point } from '../values/value.ts';
import { breakPointsOf } from './break-points.ts';
import type { Comparison } from './comparison.ts';
import { confirmAt } from './confirm.ts';
import { findConditions } from './find-conditions.ts';
import { provesIdentity } from './kernel-identity.ts';
import { leavesNoInterval } from './no-interior.ts';
import { precisions } from './agreement.ts';
import { createPair, evaluatePair, isInside, marksOf } from './pair.ts';
import type { Pair } from './pair.ts';
import { createRegion, pointsOf } from './points.ts';
import type { Region, Traits } from './points.ts';
import { takeSamples } from './sampling.ts';
import type { Samples } from './sampling.ts';
import { witnessAt } from './witness.ts';

const mostPoints = 220;
const firstPoints = 14;
const agreementsAsked = 40;
const agreementsNeeded = 12;
const agreementsWhenProved = 2;
const pointsBeforeProof = 3;

/** Expressions with roots, exponentials, logarithms, circular functions, bars, factorials and the like. */
export function compareFunctions(pair: Pair, context: CheckContext): Comparison {
  const region = createRegion(pair.names, pair.whole, marksOf(pair), traitsOf(pair), context);
  // Most slips show at once: no proof is looked for where the first points tell the lines apart.
  const early = takeSamples(pair, pointsOf(region, context.seed, pointsBeforeProof), context, { agreements: 1 });
  const isProved = early.apart === null && provesIdentity(pair, context);
  const agreements = isProved ? agreementsWhenProved : agreementsAsked;
  const progress = { mustGoOn: true };
  const points = pointsFor(pair, region, isProved, progress, context);
  const samples = takeSamples(pair, points, context, { agreements, mayStop: () => isProved || !progress.mustGoOn });
  if (samples.apart !== null) {
    if (!samples.insideAbove && !hasInterior(pair, samples.apart.point, region, context)) {
      return { kind: 'undecided', reason: 'no-domain' };
    }
    // A proof and a witness cannot both be right.
    if (isProved) return { kind: 'undecided', reason: 'not-settled' };
    const witness = witnessAt(pair, samples.apart.point, samples.apart.bits, context);
    if (witness !== null && (mayBeMeantReal(samples, region) || mayBeMeantWhole(pair, samples.apart.point, context)))
      return { kind: 'undecided', reason: 'no-agreed-meaning' };
    return witness === null ? { kind: 'undecided', reason: 'not-settled' } : { kind: 'different', witness };
  }
  return rule(pair, samples, region, isProved, context);
}

/** Apart only where a letter that people use for real numbers is not real, such as a and b in |a+bi|. */
function mayBeMeantReal(samples: Samples, region: Region): boolean {
  if (region.context.numbers === 'real' || samples.counts.same < agreementsNeeded) return false;
  const point = samples.apart?.point ?? new Map<string, KnownValue>();
  return [...point].some(([name, value]) => !isReal(value) && !isComplexLetter(name));
}

/** Whether the line above has a value around some point, the given one or another. */
function hasInterior(pair: Pair, first: Point, region: Region, context: CheckContext): boolean {
  if (pair.needsAbove.length === 0 || pair.names.every((name) => pair.whole.has(name))) return true;
  const bits = precisions[0];
  const isIn = (point: Point): boolean => {
    const { above, all } = evaluatePair(pair, point, bits, context);
    return isKnown(above) && isInside(pair.needsAbove, pair, all, bits);
  };
  if (isIn(first)) return true;
  for (const point of pointsFor(pair, region, false, { mustGoOn: true }, context)) if (isIn(point)) return true;
  return false;
}

/** Apart only where n, m or k is no whole number, as in sin(x + 2 pi n). */
function mayBeMeantWhole(pair: Pair, apart: Point, context: CheckContext): boolean {
  const open = pair.names.filter(
    (name) => usuallyWhole.has(name) && !pair.whole.has(name) && !isWholeValue(apart.get(name)),
  );
  if (open.length === 0) return false;
  const whole = new Set([...pair.whole, ...open]);
  const stricter = createPair(pair.nodes, pair.above, pair.below, whole, context.numbers === 'complex', pair.facts);
  const region = createRegion(pair.names, whole, marksOf(pair), traitsOf(pair), context);
  const samples = takeSamples(stricter, pointsOf(region, context.seed, mostPoints), context, {
    agreements: agreementsAsked,
  });
  return samples.apart === null && samples.counts.same >= agreementsNeeded;
}

function isWholeValue(value: KnownValue | undefined): boolean {
  return value?.kind === 'rational' && value.value.den === 1n;
}

/** Small numbers first; then, unless an identity covers them, both sides of every break; then the rest. */
function* pointsFor(
  pair: Pair,
  region: Region,
  isProved: boolean,
  progress: { mustGoOn: boolean },
  context: CheckContext,
): Generator<Point> {
  yield* pointsOf(region, context.seed, firstPoints);
  if (!isProved && context.numbers === 'real') yield* breakPointsOf(pair, region);
  progress.mustGoOn = false;
  yield* pointsOf(region, context.seed, mostPoints, firstPoints);
}

const circularNames: ReadonlySet<string> = new Set(['sin', 'cos', 'tan', 'cot', 'sec', 'csc']);
const steepNames: ReadonlySet<string> = new Set(['exp', 'sinh', 'cosh', 'tanh', 'coth', 'sech', 'csch', 'factorial']);

function traitsOf(pair: Pair): Traits {
  let turns = false;
  let gentle = false;
  pair.nodes.forEach((node, index) => {
    if (pair.needed[index] !== 1) return;
    if (node.op === 'pow') gentle = true;
    if (node.op === 'call') {
      turns ||= circularNames.has(node.name);
      gentle ||= steepNames.has(node.name);
    }
  });
  return { turns, gentle };
}

function rule(pair: Pair, samples: Samples, region: Region, isProved: boolean, context: CheckContext): Comparison {
  const { counts } = samples;
  const tried = Object.values(counts).reduce((a, b) => a + b, 0);
  if (counts['no-agreed-meaning'] * 3 > tried) return { kind: 'undecided', reason: 'no-agreed-meaning' };
  if (counts['not-covered'] * 2 > tried) return { kind: 'undecided', reason: 'not-covered' };
  const isInside = samples.inside || pair.names.every((name) => pair.whole.has(name));
  if (isInside && isProved)
    return { kind: 'equal', reached: 'proved', ...findConditions(pair, samples, region, context) };
  if (isInside && counts.same >= agreementsNeeded) return ruleSampled(pair, samples, region, context);
  const without = ruleWithoutValues(pair, samples, context);
  if (without !== null) return without;
  if (counts.limit > 0 && counts.same === 0) return { kind: 'undecided', reason: 'limit' };
  if (counts.blurred === 0 && (counts.same === 0 || !samples.inside)) return { kind: 'undecided', reason: 'no-domain' };
  return { kind: 'undecided', reason: 'not-settled' };
}

/** Agreement at many points counts once two of them agree to as many bits as the written numbers ask for. */
function ruleSampled(pair: Pair, samples: Samples, region: Region, context: CheckContext): Comparison {
  for (const { point } of samples.common.slice(0, 2)) {
    const fine = confirmAt(pair, point, context);
    const witness = fine?.agreement === 'apart' ? witnessAt(pair, point, fine.bits, context) : null;
    if (witness !== null) return { kind: 'different', witness };
    if (fine?.agreement !== 'same') return { kind: 'undecided', reason: 'not-settled' };
  }
  return { kind: 'equal', reached: 'sampled', ...findConditions(pair, samples, region, context) };
}

/** No interval on which both have a value, where that is certain. */
function ruleWithoutValues(pair: Pair, samples: Samples, context: CheckContext): Comparison | null {
  if (samples.inside || !samples.insideAbove) return null;
  if (dividesByZero(pair, context)) return { kind: 'meaningless' };
  if (context.numbers === 'complex') return null;
  if (leavesNoInterval(pair, pair.needsBelow))
    return { kind: samples.counts.same === 0 ? 'meaningless' : 'nothing-in-common' };
  return leavesNoInterval(pair, [...pair.needsAbove, ...pair.needsBelow]) ? { kind: 'nothing-in-common' } : null;
}

/** Whether the line below divides by something that is proved to be zero wherever it has a value. */
function dividesByZero(pair: Pair, context: CheckContext): boolean {
  const nodes = [...pair.nodes];
  const zero = nodes.push({ op: 'number', args: [], value: { num: 0n, den: 1n } }) - 1;
  return pair.needsBelow.some(
    ({ arg, kind }) =>
      kind === 'nonzero' &&
      provesIdentity(createPair(nodes, arg, zero, pair.whole, context.numbers === 'complex', pair.facts), context),
  );
}
