import type { Expr } from '../../../shared/maths/expression.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { isKnown } from '../values/arithmetic.ts';
import { evaluate } from '../values/evaluate.ts';
import { numberExpr } from '../values/node-expr.ts';
import { valueTex } from '../values/value-tex.ts';
import { rationalOf } from './build.ts';

const bits = 128;

/** An expression that was made here, its fractions written as such. */
export function readableTex(expr: Expr): string {
  return printExpr(
    mapExpr(expr, (node) =>
      node.kind === 'number' && node.written === 'integer' && node.denominator !== 1n
        ? numberExpr({ num: node.numerator, den: node.denominator })
        : node,
    ),
  );
}

/** One term of an expansion: a factor and a power. */
export function termTex(coef: Expr, power: Expr, context: CheckContext): string {
  const value = evaluate(coef, new Map(), bits, context);
  const factor = isKnown(value) ? valueTex(value, bits) : readableTex(coef);
  const exact = rationalOf(power);
  if (factor === '0' || (exact && Q.equals(exact, Q.one))) return factor;
  return factor === '1' ? readableTex(power) : `${factor}\\cdot ${readableTex(power)}`;
}
