import type { Expr } from '../../../shared/maths/expression.ts';
import { BudgetSpent } from '../context.ts';
import type { CheckContext } from '../context.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { lettersBelow } from '../values/graph.ts';
import type { GraphBuilder, GraphNode } from '../values/graph.ts';
import { lowerAll, lowerInto, usuallyWhole } from '../values/lower.ts';
import { compareConstants } from './compare-constants.ts';
import { compareMatrices, concernsMatrices } from './compare-matrices.ts';
import { compareFunctions } from './compare-functions.ts';
import { compareRationals } from './compare-rationals.ts';
import { compareQuickly } from './compare-quickly.ts';
import type { Comparison } from './comparison.ts';
import { compareOnBranches } from './on-branches.ts';
import { createPair } from './pair.ts';
import type { Fact, Pair } from './pair.ts';
import { flattenLines, wholeLettersOf } from './points.ts';
import { rationalOps } from './rational-identity.ts';

/** Compares two expressions where both have a value, by rule 1 of the checker. Never throws for what a person wrote. */
export function compareExpressions(above: Expr, below: Expr, context: CheckContext): Comparison {
  return compareQuickly(above, below, context) ?? compareAtLength(above, below, context);
}

/** The same for what is no matter for a quick comparison. */
export function compareAtLength(above: Expr, below: Expr, context: CheckContext): Comparison {
  const found = compareOrStop(above, below, context);
  if (found.kind !== 'undecided' || context.assumptions.length === 0) return found;
  return compareOnBranches(above, below, context, compareOrStop) ?? found;
}

function compareOrStop(above: Expr, below: Expr, context: CheckContext): Comparison {
  try {
    return compareWithin(above, below, context);
  } catch (error) {
    // A RangeError is a number that grew beyond what the machine holds.
    if (error instanceof BudgetSpent || error instanceof RangeError) return { kind: 'undecided', reason: 'limit' };
    if (error instanceof Unsettled) return { kind: 'undecided', reason: 'limit' };
    throw error;
  }
}

function compareWithin(above: Expr, below: Expr, context: CheckContext): Comparison {
  context.budget.spend(50);
  const { builder, roots } = lowerAll([above, below], context);
  const [first, second] = roots;
  if (first === undefined || second === undefined) return { kind: 'undecided', reason: 'not-covered' };
  const complex = context.numbers === 'complex';
  const facts = complex ? [] : lowerFacts(builder, context);
  const whole = new Set([...wholeLettersOf(context), ...wholeByUse(builder.nodes)]);
  const pair = createPair(builder.nodes, first, second, whole, complex, facts);
  const missing = opaqueReason(pair);
  if (missing === 'not-covered' && (concernsMatrices(above, context) || concernsMatrices(below, context)))
    return compareMatrices(above, below, context, compareWithin);
  if (missing !== null) return { kind: 'undecided', reason: missing };
  if (pair.names.length === 0) return compareConstants(pair, context);
  return isRational(pair) ? compareRationals(pair, context) : compareFunctions(pair, context);
}

/** Letters under factorials, in binomials and in bounds of sums; n, m and k in exponents. */
function wholeByUse(nodes: readonly GraphNode[]): string[] {
  return nodes.flatMap((node) => {
    if (node.op === 'pow') return [...lettersBelow(nodes, node.args[1])].filter((name) => usuallyWhole.has(name));
    const isCounting =
      node.op === 'series' || (node.op === 'call' && (node.name === 'factorial' || node.name === 'binomial'));
    return isCounting ? node.args.flatMap((arg) => [...lettersBelow(nodes, arg)]) : [];
  });
}

/** Assumed order relations as nodes that are not negative. */
function lowerFacts(builder: GraphBuilder, context: CheckContext): Fact[] {
  return flattenLines(context.assumptions).flatMap((line) => {
    if (line.kind !== 'relation' || !['<', '>', '<=', '>='].includes(line.sign)) return [];
    const isLarger = line.sign === '>' || line.sign === '>=';
    const high = lowerInto(builder, isLarger ? line.left : line.right, context);
    const low = lowerInto(builder, isLarger ? line.right : line.left, context);
    const node = builder.valueOf(low)?.num === 0n ? high : builder.add([high, builder.negate(low)]);
    return [{ node, strict: line.sign === '>' || line.sign === '<' }];
  });
}

function opaqueReason(pair: Pair): 'not-covered' | 'limit' | null {
  for (let index = 0; index < pair.nodes.length; index += 1) {
    const node = pair.nodes[index];
    if (pair.needed[index] === 1 && node?.op === 'opaque') return node.reason;
    if (pair.needed[index] === 1 && node?.op === 'constant' && node.name === 'infinity') return 'not-covered';
  }
  return null;
}

function isRational(pair: Pair): boolean {
  return pair.nodes.every(
    (node, index) =>
      pair.needed[index] === 0 || rationalOps.has(node.op) || (node.op === 'constant' && node.name === 'i'),
  );
}
