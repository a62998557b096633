import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { rateNamed } from '../calculus/rates.ts';
import { withDefinition } from '../calculus/substitution-line.ts';
import { createContext, type CheckContext, type Definitions } from '../context.ts';
import { rational } from '../numbers/rational.ts';
import { toFraction } from '../solving/fraction.ts';
import type { Statement } from '../statements/statement.ts';
import { prepare } from '../values/evaluate.ts';
import { differenceExpr, numberExpr } from './build-expr.ts';
import { judgeLinks } from './expression-step.ts';
import { freeLetters } from './meaning.ts';
import { fails, holds, undecided, type StepResult } from './step-result.ts';

export interface AsideQuestion {
  readonly line: Line;
  readonly from: Statement;
  /** Letters that the derivation has met before this line. */
  readonly met: readonly string[];
  /** Letters of the lines after this one. */
  readonly later: () => readonly string[];
  readonly context: CheckContext;
}

export interface AsideAnswer {
  readonly result: StepResult;
  readonly defines: Definitions | null;
}

/**
 * A line about letters of its own, from which the derivation goes back to the old ones: a discriminant, a helper value.
 * What it claims among its own parts is judged; what its letters stand for is taken as the author's definition, except
 * for the customary D and a, b, c of a quadratic, which must agree with it. Null where the line is no such thing.
 */
export function judgeAside(question: AsideQuestion): AsideAnswer | null {
  const { line, from, met, later, context } = question;
  const members = membersOf(line);
  if (!members) return null;
  const own = lettersOf(line).filter((name) => name !== 'C');
  if (own.length === 0 || own.some((name) => met.includes(baseOf(name)) || met.includes(name) || rateNamed(name)))
    return null;
  const ahead = later();
  if (!freeLetters(from, context).some((name) => ahead.includes(name))) return null;
  const [first, ...rest] = members as [Expr, ...Expr[]];
  const plain = rest.filter((member) => lettersOf(member).length === 0);
  const [start, ...others] = plain;
  if (!start) return null;
  const links = judgeLinks(start, others, context);
  if (others.length > 0 && links.ruling !== 'holds') {
    return { result: shiftLink(links, members.indexOf(others[0] as Expr)), defines: null };
  }
  const value = plain[plain.length - 1] as Expr;
  const custom = agreesWithQuadratic(first, rest, own, question);
  if (custom === false) return { result: undecided('no-agreed-meaning'), defines: null };
  if (first.kind !== 'letter')
    return { result: custom ? holds('proved', ['remark']) : undecided('no-unknown'), defines: null };
  return { result: holds('proved', ['definition']), defines: withDefinition(context.definitions, first.name, value) };
}

function membersOf(line: Line): readonly Expr[] | null {
  if (line.kind === 'relation') return line.sign === '=' ? [line.left, line.right] : null;
  if (line.kind === 'chain') return line.signs.every((sign) => sign === '=') ? line.members : null;
  return null;
}

/** `x` of `x_1`. */
function baseOf(name: string): string {
  return name.split('_', 1)[0] ?? name;
}

function shiftLink(links: StepResult, index: number): StepResult {
  const link = (links.evidence.link ?? 1) + index - 1;
  return links.ruling === 'fails' ? fails('proved', { ...links.evidence, link }) : links;
}

/** True where D, or what is written in a, b and c, is worth what it is for the quadratic above; null where custom says nothing. */
function agreesWithQuadratic(
  first: Expr,
  rest: readonly Expr[],
  own: readonly string[],
  question: AsideQuestion,
): boolean | null {
  const names = new Set(own);
  const isCustomary = [...names].every((name) => ['a', 'b', 'c', 'D', '\\Delta'].includes(name));
  const coefficients = isCustomary ? quadraticOf(question) : null;
  if (!coefficients) return null;
  const { a, b, c } = coefficients;
  const letters = new Map<string, Expr>(Object.entries({ a, b, c }).map(([name, value]) => [name, numberExpr(value)]));
  const disc = rational(
    b.num * b.num * a.den * c.den - 4n * a.num * c.num * b.den * b.den,
    b.den * b.den * a.den * c.den,
  );
  for (const name of ['D', '\\Delta']) letters.set(name, numberExpr(disc));
  const bound = createContext({ ...question.context, definitions: { ...question.context.definitions, letters } });
  return judgeLinks(first, rest, bound).ruling === 'holds';
}

function quadraticOf({ from, context }: AsideQuestion) {
  const [letter, ...more] = freeLetters(from, context);
  if (from.kind !== 'compare' || from.sign !== '=' || letter === undefined || more.length > 0) return null;
  const fraction = toFraction(prepare(differenceExpr(from.left, from.right), context), letter);
  if (!fraction || fraction.den.length !== 1 || fraction.num.length !== 3) return null;
  const den = fraction.den[0] as bigint;
  const [c, b, a] = fraction.num.map((each) => rational(each, den));
  return a && b && c ? { a, b, c } : null;
}
