import type { Expr, Line, RelationSign } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { CheckSettings, Note } from '../../../shared/schemas/verdict.ts';
import { judgeWithRates } from '../calculus/implicit.ts';
import { sidesOfSame } from '../calculus/orders.ts';
import { rateNamed } from '../calculus/rates.ts';
import { indefiniteVariables } from '../calculus/scope.ts';
import {
  hasIntegral,
  inferredDefinition,
  isOperatorValue,
  judgeSubstitution,
  withDefinition,
} from '../calculus/substitution-line.ts';
import type { CheckContext, Definitions } from '../context.ts';
import type { RealNumber } from '../solving/real-number.ts';
import { isEmptySet, isWholeLine } from '../solving/real-set.ts';
import { continueFrom, exprsOfStatement, toStatement, type Statement } from '../statements/statement.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { solveStatement } from '../statements/solve.ts';
import { judgeExpressions, judgeLinks } from './expression-step.ts';
import { freeLetters, meaningOf, type Meaning } from './meaning.ts';
import { judgeRootPair } from './root-pair.ts';
import { judgeRoundedLinks } from './rounded-links.ts';
import { judgeRunningEquals } from './running-equals.ts';
import { judgeStatements } from './statement-step.ts';
import { judgeAside } from './aside.ts';
import { fails, holds, undecided, type StepResult } from './step-result.ts';
import { isSplit } from './split-number.ts';

/** One step: the line, what it starts from, and what the derivation knows so far. */
export interface StepQuestion {
  readonly line: Line;
  /** null where the lines before this one were definitions only. */
  readonly from: Meaning | null;
  /** The line before this one where it was a remark: a line that continues goes on from there. */
  readonly remark: Meaning | null;
  readonly reference: Statement | null;
  readonly known: readonly Statement[];
  readonly givenLetters: readonly string[];
  readonly unknown: string | null;
  readonly isLast: boolean;
  /** Letters of the lines after this one. */
  readonly later: () => readonly string[];
  /** False where no line has an i. */
  readonly mayBringUnit: boolean;
  readonly given: Statement | null;
  readonly afterFault: boolean;
  readonly settings: CheckSettings;
  readonly context: CheckContext;
}

export interface StepAnswer {
  readonly result: StepResult;
  /** What the next step starts from; null: from where this one started (a remark or a definition). */
  readonly meaning: Meaning | null;
  readonly candidates: readonly RealNumber[];
  /** Conditions that later steps stand under. */
  readonly shrunk: readonly Line[];
  readonly defines: Definitions | null;
  /** What the line said, where it was a remark. */
  readonly remark: Meaning | null;
}

function answer(result: StepResult, meaning: Meaning | null, rest: Partial<StepAnswer> = {}): StepAnswer {
  return { result, meaning, candidates: [], shrunk: [], defines: null, remark: null, ...rest };
}

/** Rules on one step; throws Unsettled and BudgetSpent. */
export function judgeStep(question: StepQuestion): StepAnswer {
  const { line, from, context } = question;
  if (question.mayBringUnit && bringsUnit(question)) return answer(undecided('no-agreed-meaning'), meaningOf(line));
  if (line.kind === 'definition') return define([line], context);
  if (line.kind === 'all') {
    const parts = line.parts.filter((part) => part.kind === 'definition');
    if (parts.length === line.parts.length) return define(parts, context);
  }
  if (line.kind === 'continuation') return judgeContinuation(line, question);
  const meaning = meaningOf(line);
  if (!meaning) return answer(undecided('not-covered'), null);
  if (meaning.kind === 'expression') {
    if (from === null && usesDefinition(meaning.expr, context)) return answer(holds('proved'), meaning);
    if (from?.kind !== 'expression') return answer(undecided('change-of-kind'), meaning);
    if (from.exact) return judgeRounded(from.expr, from.exact, [meaning.expr], ['='], context);
    const found = judgeExpressions(from.expr, meaning.expr, context);
    const substituted = found.ruling === 'undecided' ? judgeInferred(from.expr, meaning, context) : null;
    if (substituted) return substituted;
    if (from.isUnsure && found.ruling === 'fails') return answer(undecided('change-of-kind'), meaning);
    return answer(found, meaning, { shrunk: found.shrunk });
  }
  const fresh = from?.kind === 'statement' ? freshDefinition(line, question) : null;
  if (fresh) return define([fresh], context);
  const helped = from?.kind === 'statement' ? judgeWithHelpers(line, question) : null;
  if (helped) return helped;
  const pair = from?.kind === 'statement' ? judgeRootPair(line, from.statement, context) : null;
  if (pair) return answer(pair, null);
  const aside =
    from?.kind === 'statement'
      ? judgeAside({ line, from: from.statement, met: metLetters(question), later: question.later, context })
      : null;
  if (aside) return answer(aside.result, null, { defines: aside.defines });
  const helper = from?.kind === 'expression' ? judgeSubstitution(line, from.expr, context) : null;
  if (helper) return answer(helper.result, null, { defines: helper.defines });
  const named = from?.kind === 'expression' ? freshDefinition(line, question) : null;
  if (named && question.later().includes(named.name)) return define([named], context);
  const isAboutNumbers =
    freeLetters(meaning.statement, context).length === 0 &&
    exprsOfStatement(meaning.statement).every((expr) => indefiniteVariables(expr).length === 0);
  if (isAboutNumbers && !isValueOf(from)) {
    const remark = judgeRemark(meaning, question);
    if (remark) return remark;
  }
  if (from?.kind === 'statement') return judgeFromStatement(meaning, from.statement, question);
  return judgeAfterExpression(line, meaning, question);
}

/** An integral by a letter that nothing was said of: a substitution, where it is clear which. */
function judgeInferred(
  above: Expr,
  meaning: Extract<Meaning, { kind: 'expression' }>,
  context: CheckContext,
): StepAnswer | null {
  if (!hasIntegral(above) || !hasIntegral(meaning.expr)) return null;
  const judged = (within: CheckContext): StepResult => judgeExpressions(above, meaning.expr, within);
  const defines = inferredDefinition(above, meaning.expr, context, (within) => judged(within).ruling === 'holds');
  return defines && answer(withNote(judged({ ...context, definitions: defines }), 'definition'), meaning, { defines });
}

/** An i that comes up in a task about real numbers may be a letter or the unit. */
function bringsUnit({ line, givenLetters, known, context }: StepQuestion): boolean {
  if (context.numbers === 'complex' || givenLetters.includes('i') || !lettersOf(line).includes('i')) return false;
  return !known.some((statement) => freeLetters(statement, context).includes('i'));
}

type Definition = Extract<Line, { kind: 'definition' }>;

function define(lines: readonly Definition[], context: CheckContext): StepAnswer {
  const defines = lines.reduce((all, line) => addDefinition(all, line), context.definitions);
  return answer(holds('proved', ['definition']), null, { defines });
}

function addDefinition(definitions: Definitions, { name, params, value }: Definition): Definitions {
  if (params.length === 0) return withDefinition(definitions, name, value);
  return { ...definitions, functions: new Map(definitions.functions).set(name, { params, value }) };
}

/** Rule 5 comes first where the line above is the value of an integral, limit or sum. */
function isValueOf(from: Meaning | null): boolean {
  return from?.kind === 'expression' && isOperatorValue(from.expr);
}

function metLetters({ givenLetters, known, context }: StepQuestion): string[] {
  return [
    ...givenLetters,
    ...known.flatMap((statement) => freeLetters(statement, context)),
    ...context.definitions.letters.keys(),
  ];
}

/** A letter that occurs for the first time, said to be an expression in the known ones: as good as "let u = ...". */
function freshDefinition(line: Line, question: StepQuestion): Extract<Line, { kind: 'definition' }> | null {
  if (line.kind !== 'relation' || line.sign !== '=' || line.left.kind !== 'letter') return null;
  const { name } = line.left;
  if (rateNamed(name) !== null) return null;
  const { context, from } = question;
  const used = [...metLetters(question), ...(from?.kind === 'expression' ? lettersOf(from.expr) : [])];
  if (from?.kind === 'statement' && isSplit(name, line.right, used, context))
    return { kind: 'definition', name, params: [], value: line.right, span: line.span };
  if (from === null || used.includes(name) || context.definitions.letters.has(name)) return null;
  const right = toStatement({ kind: 'relation', left: line.right, sign: '=', right: line.right, span: line.span });
  const letters = right ? freeLetters(right, context) : [];
  const isKnown = letters.length > 0 && letters.every((letter) => used.includes(letter));
  return isKnown && !letters.includes(name)
    ? { kind: 'definition', name, params: [], value: line.right, span: line.span }
    : null;
}

/** t=x^2, t^2-5t+4=0: letters that occur for the first time are defined, the rest of the line is judged with them. */
function judgeWithHelpers(line: Line, question: StepQuestion): StepAnswer | null {
  if (line.kind !== 'all') return null;
  const isHelper = (part: Line): Definition | null => freshDefinition(part, question);
  const helpers = line.parts.flatMap((part) => isHelper(part) ?? []);
  const rest = line.parts.filter((part) => !isHelper(part));
  if (helpers.length === 0) return null;
  const defined = define(helpers, question.context);
  const [only] = rest;
  if (!only || !defined.defines) return defined;
  const context = { ...question.context, definitions: defined.defines };
  const found = judgeStep({ ...question, line: rest.length > 1 ? { ...line, parts: rest } : only, context });
  return { ...found, result: withNote(found.result, 'definition'), defines: found.defines ?? defined.defines };
}

/** A statement without letters: a true one is a remark (rule 6c), a false one is judged as what it claims. */
function judgeRemark(meaning: Extract<Meaning, { kind: 'statement' }>, question: StepQuestion): StepAnswer | null {
  const { statement } = meaning;
  if (statement.kind !== 'compare' && statement.kind !== 'all') return null;
  const { from, context } = question;
  const env = { letter: '', given: new Map(), context, window: null, hints: [], families: new Set<string>() };
  const truth = solveStatement(statement, env);
  if (isWholeLine(truth)) {
    const isFirst = from === null || (from.kind === 'statement' && freeLetters(from.statement, context).length === 0);
    return answer(holds(truth.reached, isFirst ? [] : ['remark']), null, { remark: meaning });
  }
  if (from?.kind === 'statement' && freeLetters(from.statement, context).length > 0) return null;
  if (!isEmptySet(truth)) return null;
  return answer(fails(truth.reached, { witness: { at: {}, above: 'true', below: 'false' } }), {
    kind: 'statement',
    statement,
    last: null,
  });
}

function judgeFromStatement(
  meaning: Extract<Meaning, { kind: 'statement' }>,
  above: Statement,
  question: StepQuestion,
): StepAnswer {
  const asked = {
    above,
    below: meaning.statement,
    reference: question.reference ?? above,
    known: question.known,
    givenLetters: question.givenLetters,
    unknown: question.unknown,
    isLast: question.isLast,
    given: question.given,
    afterFault: question.afterFault,
    settings: question.settings,
    context: question.context,
  };
  try {
    const found = judgeWithRates(asked, judgeStatements);
    const direct = found.ruling === 'undecided' ? judgeRightSides(above, meaning.statement, question.context) : null;
    return direct ? answer(direct, meaning) : answer(found, meaning, { candidates: found.candidates });
  } catch (cause) {
    const direct = cause instanceof Unsettled ? judgeRightSides(above, meaning.statement, question.context) : null;
    if (!direct) throw cause;
    return answer(direct, meaning);
  }
}

/** Equations for the same unknown quantity, by their right sides; null for all others. */
function judgeRightSides(above: Statement, below: Statement, context: CheckContext): StepResult | null {
  const sides = sidesOfSame(above, below, context);
  return sides && judgeExpressions(...sides, context);
}

/** A relation after an expression is a chain of identities (rule 5), else a change of kind (rule 6d). */
function judgeAfterExpression(line: Line, meaning: Meaning, question: StepQuestion): StepAnswer {
  const { from, context } = question;
  const members = line.kind === 'relation' ? [line.left, line.right] : line.kind === 'chain' ? line.members : [];
  const signs = line.kind === 'relation' ? [line.sign] : line.kind === 'chain' ? line.signs : [];
  if (members.length === 0 || signs.some((sign) => sign !== '=')) return answer(undecided('change-of-kind'), meaning);
  const last = { kind: 'expression', expr: members[members.length - 1] as Expr } as const;
  if (from === null) return judgeAfterDefinitions(members, meaning, context);
  if (from.kind !== 'expression') return answer(undecided('change-of-kind'), meaning);
  const found = judgeLinks(from.expr, members, context);
  if (found.ruling === 'holds') return answer(found, last, { shrunk: found.shrunk });
  if (isValueOf(from)) return answer(found, last);
  return answer(undecided('change-of-kind'), { ...last, isUnsure: true });
}

/**
 * After definitions only, a line claims an identity, and the next one starts afresh from them; or it is a question, such
 * as f(x)=0, that nothing above it leads to.
 */
function judgeAfterDefinitions(members: readonly Expr[], meaning: Meaning, context: CheckContext): StepAnswer {
  const first = members[0] as Expr;
  const found = judgeLinks(first, members.slice(1), context);
  if (found.ruling === 'holds') return answer(found, null, { shrunk: found.shrunk, remark: meaning });
  const isAsked = !members.slice(1).some((member) => lettersOf(member).length > 0) || isPlainValue(first, context);
  return answer(found.ruling === 'fails' && isAsked ? undecided('change-of-kind') : found, meaning);
}

/** f(x), where f was defined as f(x). */
function isPlainValue(expr: Expr, { definitions }: CheckContext): boolean {
  if (expr.kind !== 'apply' || expr.primes > 0) return false;
  const own = definitions.functions.get(expr.name);
  return expr.args.every((arg, k) => arg.kind === 'letter' && arg.name === own?.params[k]);
}

/** Whether an expression is written with something that the derivation defined, or defined something with. */
function usesDefinition(expr: Expr, context: CheckContext): boolean {
  const { letters, functions } = context.definitions;
  if (expr.kind === 'letter' && letters.has(expr.name)) return true;
  if (expr.kind === 'apply' && functions.has(expr.name)) return true;
  const known = [...letters.values()].flatMap((value) => lettersOf(value));
  if (expr.kind === 'letter' && known.includes(expr.name)) return true;
  return childrenOf(expr).some((part) => usesDefinition(part, context));
}

function judgeContinuation(line: Extract<Line, { kind: 'continuation' }>, question: StepQuestion): StepAnswer {
  const { from, context, remark } = question;
  if (remark?.kind === 'statement' && remark.last) return continueRemark(line, remark, remark.last, context);
  if (from === null) return answer(undecided('not-covered'), null);
  if (from.kind === 'expression') return continueExpression(line, from.expr, question);
  if (!from.last) return answer(undecided('not-covered'), null);
  const links = continueFrom(from.last, line.members, line.signs);
  const last = line.members[line.members.length - 1] as Expr;
  const statement: Statement = { kind: 'all', parts: [from.statement, links] };
  if (line.signs.every((sign) => sign === '=')) {
    const found = judgeLinks(from.last, line.members, context);
    if (found.ruling === 'holds') {
      const replaced = replaceLast(from.statement, last) ?? statement;
      return answer(
        withNote(found, 'continued'),
        { kind: 'statement', statement: replaced, last },
        { shrunk: found.shrunk },
      );
    }
  }
  const replaced = line.signs.every((sign) => sign === '=') ? replaceLast(from.statement, last) : null;
  const direct = replaced && judgeRightSides(from.statement, replaced, context);
  if (replaced && direct && direct.ruling !== 'undecided')
    return answer(withNote(direct, 'continued'), { kind: 'statement', statement: replaced, last });
  const found = judgeFromStatement({ kind: 'statement', statement, last }, from.statement, question);
  return { ...found, result: withNote(found.result, 'continued') };
}

function continueRemark(
  line: Extract<Line, { kind: 'continuation' }>,
  remark: Extract<Meaning, { kind: 'statement' }>,
  first: Expr,
  context: CheckContext,
): StepAnswer {
  if (line.signs.some((sign) => sign !== '=')) return answer(undecided('not-covered'), null);
  const found = withNote(judgeLinks(first, line.members, context), 'continued');
  return answer(found, null, { remark: { ...remark, last: line.members[line.members.length - 1] as Expr } });
}

/** left = old becomes left = new, where the statement is one equation. */
function replaceLast(statement: Statement, last: Expr): Statement | null {
  return statement.kind === 'compare' ? { ...statement, right: last } : null;
}

function withNote(result: StepResult, note: Note): StepResult {
  return { ...result, notes: [...result.notes, note] };
}

function continueExpression(
  line: Extract<Line, { kind: 'continuation' }>,
  above: Expr,
  question: StepQuestion,
): StepAnswer {
  const { context, settings, from } = question;
  const exact = from?.kind === 'expression' ? from.exact : undefined;
  if (exact || line.signs.includes('approx')) {
    if (line.signs.every((sign) => sign === '=' || sign === 'approx')) {
      const found = judgeRounded(above, exact ?? null, line.members, line.signs, context);
      return { ...found, result: withNote(found.result, 'continued') };
    }
  }
  const last: Meaning = { kind: 'expression', expr: line.members[line.members.length - 1] as Expr };
  if (line.signs.every((sign) => sign === '=')) {
    const found = judgeLinks(above, line.members, context);
    const running =
      found.ruling === 'fails' && settings.presentation === 'note'
        ? judgeRunningEquals(above, line.members, context)
        : null;
    return answer(withNote(running ?? found, 'continued'), last, { shrunk: running ? [] : found.shrunk });
  }
  const statement = continueFrom(above, line.members, line.signs);
  const letters = freeLetters(statement, context);
  if (letters.length > 1) return answer(undecided('change-of-kind'), last);
  const env = {
    letter: letters[0] ?? '',
    given: new Map(),
    context,
    window: null,
    hints: [],
    families: new Set<string>(),
  };
  const truth = solveStatement(statement, env);
  if (isWholeLine(truth) && !truth.open) return answer(holds(truth.reached, ['continued']), last);
  if (letters.length === 0)
    return answer(fails(truth.reached, { witness: { at: {}, above: 'true', below: 'false' } }, ['continued']), last);
  return answer(undecided('change-of-kind'), last);
}

/** Rule 9 after an approximation sign. */
function judgeRounded(
  above: Expr,
  exact: Expr | null,
  members: readonly Expr[],
  signs: readonly RelationSign[],
  context: CheckContext,
): StepAnswer {
  const start = { expr: above, exact: exact ?? above, isRounded: exact !== null };
  const { result, last } = judgeRoundedLinks(start, members, signs, context);
  return answer(result, { kind: 'expression', expr: last.expr, ...(last.isRounded ? { exact: last.exact } : {}) });
}
