import type { CheckContext } from '../context.ts';
import type { Rational } from '../numbers/rational.ts';
import { evaluateNodes } from '../values/evaluate.ts';
import type { GraphNode } from '../values/graph.ts';
import type { Point, Value } from '../values/value.ts';
import { unknown } from '../values/arithmetic.ts';
import { meetsOpenly, needsOf } from './conditions.ts';
import type { Need } from './conditions.ts';
import { markNeeded } from './modular-values.ts';

/** A node that is assumed to be at least zero, or above it. */
export interface Fact {
  readonly node: number;
  readonly strict: boolean;
}

/** Two expressions in one graph, with what their comparison asks about them. */
export interface Pair {
  readonly nodes: readonly GraphNode[];
  readonly above: number;
  readonly below: number;
  readonly needed: Uint8Array;
  readonly neededAbove: Uint8Array;
  readonly neededBelow: Uint8Array;
  /** Free letters, in order of appearance. */
  readonly names: readonly string[];
  readonly needsAbove: readonly Need[];
  readonly needsBelow: readonly Need[];
  /** Nodes that depend on a letter that is not a whole number. */
  readonly moving: Uint8Array;
  readonly facts: readonly Fact[];
  readonly whole: ReadonlySet<string>;
}

export function createPair(
  nodes: readonly GraphNode[],
  above: number,
  below: number,
  whole: ReadonlySet<string>,
  complex: boolean,
  facts: readonly Fact[] = [],
): Pair {
  const neededAbove = markNeeded(nodes, [above]);
  const neededBelow = markNeeded(nodes, [below]);
  const needed = neededAbove.map((mark, index) => mark | (neededBelow[index] ?? 0));
  return {
    nodes,
    above,
    below,
    needed,
    neededAbove,
    neededBelow,
    names: namesOf(nodes, needed),
    needsAbove: needsOf(nodes, neededAbove, complex),
    needsBelow: needsOf(nodes, neededBelow, complex),
    moving: markMoving(nodes, whole),
    facts,
    whole,
  };
}

function namesOf(nodes: readonly GraphNode[], needed: Uint8Array): string[] {
  const names = new Set<string>();
  nodes.forEach((node, index) => {
    if (needed[index] !== 1) return;
    if (node.op === 'letter') names.add(node.name);
    if (node.op === 'series') {
      for (const name of namesOf(node.body.nodes, markNeeded(node.body.nodes, [node.body.root]))) {
        if (name !== node.index) names.add(name);
      }
    }
  });
  return [...names];
}

function markMoving(nodes: readonly GraphNode[], whole: ReadonlySet<string>): Uint8Array {
  const moving = new Uint8Array(nodes.length);
  nodes.forEach((node, index) => {
    if (node.op === 'letter') moving[index] = whole.has(node.name) ? 0 : 1;
    else if (node.args.some((arg) => moving[arg] === 1)) moving[index] = 1;
  });
  return moving;
}

/** Numbers written in the expressions and the quotients of two of them: roots of linear parts among them. */
export function marksOf(pair: Pair): Rational[] {
  const found: Rational[] = [];
  pair.nodes.forEach((node, index) => {
    if (pair.needed[index] !== 1 || node.op !== 'number' || found.length >= 12) return;
    if (node.value.num !== 0n) found.push(node.value);
  });
  const quotients: Rational[] = [];
  for (const a of found) {
    for (const b of found) {
      if (a === b || quotients.length >= 40) continue;
      quotients.push(divided(a, b));
    }
  }
  return [...found, ...quotients];
}

function divided(a: Rational, b: Rational): Rational {
  const sign = b.num < 0n ? -1n : 1n;
  return { num: a.num * b.den * sign, den: a.den * b.num * sign };
}

export interface PairValues {
  readonly above: Value;
  readonly below: Value;
  readonly all: readonly Value[];
}

export function evaluatePair(pair: Pair, point: Point, bits: number, context: CheckContext): PairValues {
  const all = evaluateNodes(pair.nodes, point, bits, context);
  return {
    all,
    above: all[pair.above] ?? unknown('not-covered'),
    below: all[pair.below] ?? unknown('not-covered'),
  };
}

/** Whether every need that moves with a letter stays met around the point, so that it lies inside the domain. */
export function isInside(needs: readonly Need[], pair: Pair, values: readonly Value[], bits: number): boolean {
  return needs.every((need) => pair.moving[need.arg] === 0 || meetsOpenly(need, values[need.arg], bits));
}
