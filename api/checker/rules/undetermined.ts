import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { divExprs, subExprs, zeroExpr } from '../calculus/build.ts';
import { differentiate } from '../calculus/differentiate.ts';
import { polynomialIn } from '../calculus/integrand.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import { exprsOfStatement, type CompareStatement, type Statement } from '../statements/statement.ts';
import type { StatementQuestion } from './statement-question.ts';
import { holds, undecided, type StepResult } from './step-result.ts';

const variables: readonly string[] = ['x', 't', 's', 'n'];

/**
 * Undetermined coefficients: 5x+1 = A(x+2)+B(x-1) is meant for every x, so that lines without x say what its coefficients
 * say, and lines with x are the same up to a factor in x. Null where the lines are no such identity.
 */
export function judgeUndetermined(
  question: StatementQuestion,
  judge: (question: StatementQuestion) => StepResult,
): StepResult | null {
  const { above, below, known, context } = question;
  const before = [...known, above];
  const variable = variables.find((name) => before.some((statement) => identityIn(statement, name)));
  if (variable === undefined) return null;
  const inside = lettersIn(below);
  if (inside.includes(variable)) {
    const [a, b] = [identityIn(above, variable), identityIn(below, variable)];
    return a && b ? sameIdentity(a, b, question) : null;
  }
  if (inside.length === 0 || !inside.every(isCoefficient)) return null;
  const equations = before.flatMap((statement) => coefficientsOf(statement, variable) ?? []);
  if (equations.length === 0) return null;
  const plain = before.filter((statement) => !lettersIn(statement).includes(variable));
  const system: Statement = { kind: 'all', parts: [...equations, ...plain] };
  const { calculus, ...rest } = context;
  const asked = {
    ...question,
    above: system,
    known: [system],
    reference: system,
    given: null,
    unknown: null,
    context: calculus ? { ...rest, calculus: { ...calculus, constants: new Set<string>() } } : context,
  };
  return judge(asked);
}

function isCoefficient(name: string): boolean {
  return /^[A-Z](?:_.*)?$/.test(name);
}

function lettersIn(statement: Statement): string[] {
  return [...new Set(exprsOfStatement(statement).flatMap((expr) => [...lettersOf(expr)]))];
}

/** An equation in one variable and two or more coefficients with capital names, which stand on one side only. */
function identityIn(statement: Statement, variable: string): CompareStatement | null {
  if (statement.kind !== 'compare' || statement.sign !== '=') return null;
  const letters = lettersIn(statement);
  const coefficients = letters.filter(isCoefficient);
  const sides = [statement.left, statement.right].map((side) => lettersOf(side).filter(isCoefficient).length);
  const isWhole = letters.length === coefficients.length + 1 && letters.includes(variable);
  return isWhole && coefficients.length > 1 && sides.includes(0) ? statement : null;
}

function coefficientsOf(statement: Statement, variable: string): CompareStatement[] | null {
  const identity = identityIn(statement, variable);
  const coefs = identity && polynomialIn(subExprs(identity.left, identity.right), variable);
  return coefs && coefs.map((left): CompareStatement => ({ kind: 'compare', left, sign: '=', right: zeroExpr }));
}

/** Whether the one difference is the other times something without the coefficients. */
function sameIdentity(above: CompareStatement, below: CompareStatement, { context }: StatementQuestion): StepResult {
  const [a, b] = [above, below].map(({ left, right }) => subExprs(left, right)) as [Expr, Expr];
  const names = [...new Set([...lettersOf(a), ...lettersOf(b)])].filter(isCoefficient);
  const isFactor = names.every((name) => {
    const slope = differentiate(divExprs(b, a), name, context, true);
    return compareExpressions(slope, zeroExpr, context).kind === 'equal';
  });
  return isFactor ? holds('sampled') : undecided('not-settled');
}
