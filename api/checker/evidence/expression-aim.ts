import type { Expr } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { estimate } from './estimate.ts';
import { costOf, type Aim } from './mend-question.ts';
import { choosePlaces } from './places.ts';
import { findRightParts } from './right-parts.ts';

const placeCount = 3;

/** An expression of a line, and what it should equal. */
export function expressionAim(wanted: Expr, focus: Expr, context: CheckContext): Aim {
  const places = choosePlaces([wanted, focus], placeCount, context);
  const right = findRightParts(wanted, focus);
  return {
    roots: [focus],
    tree: focus,
    wanted,
    places,
    cost: costOf(focus),
    budget: context.budget,
    targets: [places.map((place) => estimate(wanted, place))],
    isRight: (node) => right.has(node),
    extra: 0,
  };
}
