import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { exprsOf } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import { antiderivative } from './antiderivative.ts';
import { expanded, sumExpr } from './monomials.ts';
import { expressionAim } from './expression-aim.ts';
import type { Aim, MendQuestion } from './mend-question.ts';
import { onlyDifference } from './only-difference.ts';
import { relationAims } from './relation-aims.ts';
import { substituteLetter } from './substitute.ts';
import { workOut } from './worked-out.ts';

/** The expression that the line above says of a line's expression, and that expression; null for statements. */
export function expressionsIn({
  above,
  line,
  link,
}: MendQuestion): { readonly above: Expr; readonly focus: Expr } | null {
  if (above.kind !== 'expression') return null;
  if (line.kind === 'expression') return { above: above.expr, focus: line.expr };
  if (line.kind !== 'relation' && line.kind !== 'chain' && line.kind !== 'continuation') return null;
  const members = exprsOf(line);
  const focus = members[link - 1];
  const from = link > 1 ? members[link - 2] : above.expr;
  return focus && from ? { above: from, focus } : null;
}

/**
 * What a line's parts have to come to. First the one part in which the two lines differ, where the rest was left as it
 * was; looked at only where that does not help: the whole.
 */
export function aimsOf(question: MendQuestion): { readonly narrow: readonly Aim[]; readonly wide: readonly Aim[] } {
  const { above, line, context } = question;
  const pair = expressionsIn(question);
  if (pair) return expressionAims(pair.above, pair.focus, context);
  if (above.kind === 'all' && line.kind === 'relation')
    return { narrow: substituted(above.parts, line).flatMap((from) => relationAims(from, line, context)), wide: [] };
  if (above.kind !== 'relation' || line.kind !== 'relation') return { narrow: [], wide: [] };
  const inner = insideOf(above);
  if (inner) return { narrow: relationAims(inner, line, context), wide: relationAims(above, line, context) };
  const [left, right] = [
    sameExpr(above.right, line.right) ? expressionAims(above.left, line.left, context) : null,
    sameExpr(above.left, line.left) ? expressionAims(above.right, line.right, context) : null,
  ];
  const sides = [left, right].flatMap((found) => (found ? [...found.narrow, ...found.wide] : []));
  return { narrow: sides, wide: relationAims(above, line, context) };
}

type Relation = Extract<Line, { kind: 'relation' }>;

/** The exponents of powers of one number that are equal, or the arguments of logarithms that are. */
function insideOf({ left, sign, right, span }: Relation): Relation | null {
  if (sign !== '=') return null;
  const isNumber = left.kind === 'power' && lettersOf(left.base).length === 0;
  if (isNumber && right.kind === 'power' && sameExpr(left.base, right.base))
    return { kind: 'relation', left: left.exponent, sign, right: right.exponent, span };
  const [first, second] = [argumentOf(left), argumentOf(right)];
  const isSame = left.kind === right.kind && (left.kind !== 'log' || right.kind !== 'log' || sameBase(left, right));
  return first && second && isSame ? { kind: 'relation', left: first, sign, right: second, span } : null;
}

function argumentOf(expr: Expr): Expr | null {
  if (expr.kind === 'log') return expr.argument;
  return expr.kind === 'call' && expr.name === 'ln' ? (expr.args[0] ?? null) : null;
}

function sameBase(a: Extract<Expr, { kind: 'log' }>, b: Extract<Expr, { kind: 'log' }>): boolean {
  return a.base && b.base ? sameExpr(a.base, b.base) : a.base === b.base;
}

/** What a line in fewer letters may come from: one equation of a system put into another. */
function substituted(parts: readonly Line[], line: Relation): Relation[] {
  const equations = parts.filter((part): part is Relation => part.kind === 'relation' && part.sign === '=');
  const letters = lettersOf(line);
  return equations.flatMap(({ left, right }) => {
    if (left.kind !== 'letter' || letters.includes(left.name) || lettersOf(right).includes(left.name)) return [];
    const put = (side: Expr): Expr => substituteLetter(side, left.name, right);
    return equations
      .filter((other) => other.left !== left && lettersOf(other).includes(left.name))
      .map((other) => ({ ...other, left: put(other.left), right: put(other.right) }));
  });
}

function expressionAims(above: Expr, focus: Expr, context: CheckContext): { narrow: Aim[]; wide: Aim[] } {
  const wanted = workOut(above, focus, context);
  const inner = innermost(above, focus) ?? innermost(wanted, focus) ?? antiderivatives(above, focus, context);
  return {
    narrow: inner ? [expressionAim(workOut(inner[0], inner[1], context), inner[1], context)] : [],
    wide: [expressionAim(wanted, focus, context)],
  };
}

/** What is to be evaluated between the limits of an integral. */
function antiderivatives(above: Expr, focus: Expr, context: CheckContext): readonly [Expr, Expr] | null {
  if (above.kind !== 'integral' || focus.kind !== 'evaluated' || !above.from || !above.to || !focus.from) return null;
  if (!sameExpr(above.from, focus.from) || !sameExpr(above.to, focus.to)) return null;
  const found = antiderivative(above.integrand, above.variable, context);
  return found && [sumOfTerms(found), focus.operand];
}

function sumOfTerms(expr: Expr): Expr {
  const terms = expanded(expr);
  return terms ? sumExpr(terms) : expr;
}

/** As far in as only one part differs. */
function innermost(above: Expr, focus: Expr): readonly [Expr, Expr] | null {
  const inner = onlyDifference(above, focus);
  return inner && (innermost(inner[0], inner[1]) ?? inner);
}
