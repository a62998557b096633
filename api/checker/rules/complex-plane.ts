import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { isZeroExpr, letterOf, mulExprs, rationalOf, zeroExpr } from '../calculus/build.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { exprsOfStatement, type CompareStatement, type Statement } from '../statements/statement.ts';
import { partsOf, squaredSize, type LetterParts, type Parts } from './complex-parts.ts';
import { judgeFormula } from './formula.ts';
import { freeLetters } from './meaning.ts';
import type { StatementQuestion } from './statement-question.ts';
import { undecided, type StepResult } from './step-result.ts';

const complexNames: ReadonlySet<string> = new Set(['z', 'w']);

function isComplex(name: string): boolean {
  return complexNames.has(name.split('_', 1)[0] ?? name);
}

/**
 * Equations with conjugates and bars, or about the two real letters of z = x + yi: real and imaginary parts are compared
 * over the real numbers. Null where that cannot be done. Throws Unsettled.
 */
export function judgePlane(
  question: StatementQuestion,
  judge: (question: StatementQuestion) => StepResult,
): StepResult | null {
  const { above, below, known, reference, given, context } = question;
  const all = [above, below, ...known, reference, ...(given ? [given] : [])];
  const names = [...new Set(all.flatMap(exprsOfStatement).flatMap((expr) => lettersOf(expr)))];
  const letters = lettersFor(names, context);
  if (!letters) return null;
  const isInStep = [above, below].flatMap(exprsOfStatement).some((expr) => lettersOf(expr).some(isComplex));
  const convert = (statement: Statement): Statement | null => toReal(statement, letters.of, context);
  const [a, b, r] = [above, below, reference].map(convert);
  const earlier = known.map(convert);
  if (!a || !b || !r || earlier.includes(null)) return null;
  const definitions = { ...context.definitions, letters: new Map<string, Expr>() };
  const asked: StatementQuestion = {
    ...question,
    above: a,
    below: b,
    known: earlier as Statement[],
    reference: r,
    given: given && convert(given),
    givenLetters: [a, ...earlier].flatMap((statement) => (statement ? lettersIn(statement) : [])),
    unknown: null,
    context: { ...context, numbers: 'real', definitions },
  };
  const found = judgeReal(asked, judge);
  // That z is x + yi where no line says so is custom.
  return isInStep && letters.isByCustom && found.ruling === 'fails' ? undecided('no-agreed-meaning') : found;
}

function lettersIn(statement: Statement): string[] {
  return exprsOfStatement(statement).flatMap((expr) => [...lettersOf(expr)]);
}

/** z is x + yi, with letters of the lines where they have two; other letters are real where there are two or more. */
function lettersFor(names: readonly string[], context: CheckContext): { of: LetterParts; isByCustom: boolean } | null {
  const free = names.filter((name) => !context.definitions.letters.has(name));
  const complex = free.filter(isComplex);
  const plain = names.filter((name) => !isComplex(name));
  if (complex.length > 1 || (complex.length === 0 && plain.length < 2)) return null;
  const pairs = [
    ['x', 'y'],
    ['a', 'b'],
  ] as const;
  const met = pairs.find((pair) => pair.every((name) => plain.includes(name)));
  const [re, im] = met ?? ['x', 'y'];
  if (complex.length > 0 && !met && plain.some((name) => name === re || name === im)) return null;
  const z: Parts = { re: letterOf(re), im: letterOf(im) };
  return {
    of: (name) => (isComplex(name) ? z : { re: letterOf(name), im: zeroExpr }),
    isByCustom: complex.length > 0 && met !== undefined,
  };
}

function toReal(statement: Statement, letters: LetterParts, context: CheckContext): Statement | null {
  switch (statement.kind) {
    case 'compare':
      return compareParts(statement, letters, context);
    case 'all':
    case 'any': {
      const parts = statement.parts.map((part) => toReal(part, letters, context));
      return parts.includes(null) ? null : { kind: statement.kind, parts: parts as Statement[] };
    }
    case 'member': {
      const { letter, set, negated } = statement;
      if (!letter || set.kind !== 'finite' || negated) return null;
      const parts = set.items.map((right) =>
        compareParts({ kind: 'compare', left: letter, sign: '=', right }, letters, context),
      );
      return parts.includes(null) ? null : { kind: 'any', parts: parts as Statement[] };
    }
    default:
      return statement;
  }
}

function compareParts(statement: CompareStatement, letters: LetterParts, context: CheckContext): Statement | null {
  const { left, sign, right } = statement;
  const squared = sizes(left, right, letters, context);
  if (squared) return { kind: 'compare', left: squared[0], sign, right: squared[1] };
  const [a, b] = [partsOf(left, letters, context), partsOf(right, letters, context)];
  if (!a || !b) return null;
  const isZero = (part: Expr): boolean =>
    isZeroExpr(part) || compareExpressions(part, zeroExpr, { ...context, numbers: 'real' }).kind === 'equal';
  const hasImaginary = !isZero(a.im) || !isZero(b.im);
  const re: CompareStatement = { kind: 'compare', left: a.re, sign, right: b.re };
  if (!hasImaginary) return re;
  if (sign !== '=') return null;
  const im: CompareStatement = { kind: 'compare', left: a.im, sign, right: b.im };
  return isZero(a.re) && isZero(b.re) ? im : { kind: 'all', parts: [re, im] };
}

/** |u| compared with |v| or with a number that is not negative: the squares are compared. */
function sizes(left: Expr, right: Expr, letters: LetterParts, context: CheckContext): readonly [Expr, Expr] | null {
  const squares = [left, right].map((side) => {
    if (side.kind === 'call' && side.name === 'abs' && side.args[0]) {
      const parts = partsOf(side.args[0], letters, context);
      return parts && squaredSize(parts);
    }
    const value = rationalOf(side);
    return value && value.num >= 0n ? mulExprs(side, side) : null;
  });
  const [a, b] = squares;
  const hasBars = [left, right].some((side) => side.kind === 'call' && side.name === 'abs');
  return a && b && hasBars ? [a, b] : null;
}

function judgeReal(question: StatementQuestion, judge: (question: StatementQuestion) => StepResult): StepResult {
  const found = attempt(() => judge(question));
  if (found.ruling !== 'undecided') return found;
  const { above, below, reference, settings, context } = question;
  const letters = [...new Set([...freeLetters(above, context), ...freeLetters(below, context)])];
  if (letters.length !== 2 || above.kind !== 'compare' || below.kind !== 'compare') return found;
  // A curve in the plane: each of its letters by the other, since one alone does not see lines along its axis.
  const each = letters.map((letter) =>
    attempt(() => judgeFormula({ above, below, letter, reference, families: new Set(), settings, context })),
  );
  const fault = each.find(({ ruling }) => ruling === 'fails');
  if (fault) return fault;
  const isBlind = (result: StepResult): boolean => result.evidence.reason === 'no-domain';
  const held = each.find(({ ruling }) => ruling === 'holds');
  return held && each.every((result) => result.ruling === 'holds' || isBlind(result)) ? held : found;
}

function attempt(judge: () => StepResult): StepResult {
  try {
    return judge();
  } catch (cause) {
    if (cause instanceof Unsettled) return undecided(cause.reason);
    throw cause;
  }
}
