import type { CheckContext } from '../context.ts';
import { cyclotomicPrimes, primes } from '../numbers/modular.ts';
import { createRandom } from '../numbers/random.ts';
import type { Random } from '../numbers/random.ts';
import { lettersBelow } from '../values/graph.ts';
import { createKernelPlan } from './kernel-plan.ts';
import type { KernelPlan } from './kernel-plan.ts';
import { createKernelValues } from './kernel-values.ts';
import { evaluateModular, markNeeded, noResidue } from './modular-values.ts';
import type { Pair } from './pair.ts';
import { findSigns } from './signs.ts';
import { boundDifference, boundSizes, evaluationsNeeded } from './size-bounds.ts';

const mostEvaluations = 40;
const mostAttempts = 60;
const evaluationCost = 12;

/**
 * Whether two expressions are the same combination of independent quantities (powers of e, logarithms of the sizes of
 * factors, roots): then they are equal wherever both have a value. False says nothing.
 */
export function provesIdentity(lines: Pair, context: CheckContext): boolean {
  if (lines.above === lines.below) return true;
  const pair = withFacts(lines);
  const complex = context.numbers === 'complex';
  const needs = complex ? [] : [...pair.needsAbove, ...pair.needsBelow];
  const facts = pair.facts.map(({ node }) => node);
  const plan = createKernelPlan(pair.nodes, pair.needed, complex, (forms) =>
    findSigns(pair.nodes, forms, needs, facts),
  );
  if (plan === null) return false;
  const count = countEvaluations(pair, plan);
  if (count === null) return false;
  const random = createRandom(context.seed ^ 0x2545f491);
  for (const choice of combinations(plan.choices)) {
    for (let k = 0; k < count; k += 1) {
      if (!agrees(pair, plan, choice, random, context)) return false;
    }
  }
  return true;
}

/** Quantities of the assumptions may be the first of their kind, and need a residue too. */
function withFacts(pair: Pair): Pair {
  const facts = pair.facts.filter(({ node }) =>
    [...lettersBelow(pair.nodes, node)].every((name) => pair.names.includes(name)),
  );
  return { ...pair, facts, needed: markNeeded(pair.nodes, [pair.above, pair.below, ...facts.map(({ node }) => node)]) };
}

/** Roots multiply the degree of what has to vanish: by their norms, at most by the product of the degrees. */
function countEvaluations(pair: Pair, plan: KernelPlan): number | null {
  let norm = 1;
  for (const count of plan.choices.values()) norm *= count;
  const size = 4 * plan.exponentBound * plan.oddPart + 8;
  const bounds = boundSizes(pair.nodes, pair.needed, () => ({
    topDegree: size,
    bottomDegree: size,
    topBits: size,
    bottomBits: size,
  }));
  const a = bounds[pair.above];
  const b = bounds[pair.below];
  if (a === undefined || b === undefined) return null;
  const { degree, bits } = boundDifference(a, b);
  return evaluationsNeeded(degree * norm, bits * norm, 24, 3_000, mostEvaluations);
}

/** A random prime modulo which the roots of the plan can be taken. */
function drawPrime(plan: KernelPlan, random: Random): number | null {
  const table = plan.turns ? cyclotomicPrimes : primes;
  for (let attempt = 0; attempt < mostAttempts; attempt += 1) {
    const p = table[random(table.length)] ?? 0;
    if ((!plan.quarters || p % 16 === 1) && isCoprime(plan.oddPart, p - 1)) return p;
  }
  return null;
}

function isCoprime(a: number, b: number): boolean {
  let [x, y] = [a, b];
  while (y !== 0) [x, y] = [y, x % y];
  return x === 1;
}

function* combinations(choices: ReadonlyMap<string, number>): Generator<ReadonlyMap<string, number>> {
  const keys = [...choices];
  const total = keys.reduce((product, [, count]) => product * count, 1);
  for (let k = 0; k < total; k += 1) {
    const choice = new Map<string, number>();
    let rest = k;
    for (const [key, count] of keys) {
      choice.set(key, rest % count);
      rest = Math.floor(rest / count);
    }
    yield choice;
  }
}

/** One evaluation at a random prime and point; tried again where a root or a quotient does not exist there. */
function agrees(
  pair: Pair,
  plan: KernelPlan,
  choice: ReadonlyMap<string, number>,
  random: Random,
  context: CheckContext,
): boolean {
  const setting = {
    nodes: pair.nodes,
    needed: pair.needed,
    plan,
    names: pair.names,
    complex: context.numbers === 'complex',
  };
  for (let attempt = 0; attempt < mostAttempts; attempt += 1) {
    context.budget.spend(evaluationCost);
    const p = drawPrime(plan, random);
    if (p === null) return false;
    const values = createKernelValues(setting, p, random, choice);
    const residues = evaluateModular(pair.nodes, pair.needed, p, values.letters, values.kernel);
    const x = residues[pair.above] ?? noResidue;
    const y = residues[pair.below] ?? noResidue;
    if (values.failed() || x === noResidue || y === noResidue) continue;
    return x === y;
  }
  return false;
}
