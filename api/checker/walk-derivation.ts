import { lettersOf } from '../../shared/maths/letters.ts';
import type { Expr, Line } from '../../shared/maths/expression.ts';
import type { DerivationInput, UndecidedReason } from '../../shared/schemas/verdict.ts';
import { mayHaveCalculus } from './calculus/name-rates.ts';
import { reduceCalculus } from './calculus/reduce.ts';
import { scopeOf } from './calculus/scope.ts';
import {
  BudgetSpent,
  createBudget,
  createContext,
  operationsPerStep,
  type CalculusScope,
  type CheckContext,
  type Definitions,
} from './context.ts';
import { letterNamed } from './letter-named.ts';
import { hasLetterI, type ReadDerivation } from './read-derivation.ts';
import { isolatedLetter, nearlyIsolatedLetter } from './rules/formula.ts';
import { meaningOf, type Meaning } from './rules/meaning.ts';
import { judgeStep, type StepAnswer } from './rules/step.ts';
import { undecided, type StepResult } from './rules/step-result.ts';
import type { RealNumber } from './solving/real-number.ts';
import { Unsettled } from './solving/unsettled.ts';
import { toStatement, type Statement } from './statements/statement.ts';

/** What does not change along a derivation. */
export interface Route {
  readonly input: DerivationInput;
  readonly read: ReadDerivation;
  readonly givenLetters: readonly string[];
  readonly unknown: string | null;
  readonly given: Statement | null;
  readonly calculus: CalculusScope;
  /** Whether an i can come up that the given did not have. */
  readonly mayBringUnit: boolean;
}

/** What a derivation has come to know before a step. */
export interface WalkState {
  /** By line; null where a line was not read or leaves nothing to start from. */
  readonly meanings: readonly (Meaning | null)[];
  readonly from: Meaning | null;
  /** What the last line said, where it was a remark. */
  readonly remark: Meaning | null;
  /** False after a line that could not be read. */
  readonly isReadable: boolean;
  readonly reference: Statement | null;
  readonly known: readonly Statement[];
  readonly afterFault: boolean;
  readonly assumptions: readonly Line[];
  readonly definitions: Definitions;
  /** Values that a step listed though they do not satisfy the reference. */
  readonly candidates: readonly { readonly step: number; readonly values: readonly RealNumber[] }[];
}

export function planRoute(input: DerivationInput, read: ReadDerivation): Route {
  const first = read.lines[0];
  return {
    input,
    read,
    givenLetters: first?.ok ? [...lettersOf(first.line)] : [],
    unknown: findUnknown(input, read),
    given: first?.ok ? toStatement(first.line) : null,
    mayBringUnit: read.numbers === 'real' && input.lines.some(hasLetterI),
    calculus: scopeOf(
      input.lines.some(mayHaveCalculus) ? read.lines.map((result) => (result.ok ? result.line : null)) : [],
      input.settings.constant ?? false,
    ),
  };
}

/** The letter that the settings or the goal name, else the one that the last line to isolate a letter isolates. */
function findUnknown(input: DerivationInput, read: ReadDerivation): string | null {
  if (input.settings.unknown) return letterNamed(input.settings.unknown);
  if (input.settings.goal?.kind === 'solved') return letterNamed(input.settings.goal.letter);
  const statements = read.lines.slice(1).flatMap((result) => (result.ok ? (toStatement(result.line) ?? []) : []));
  return lastNotNull(statements, isolatedLetter) ?? lastNotNull(statements, nearlyIsolatedLetter);
}

function lastNotNull(statements: readonly Statement[], find: (statement: Statement) => string | null): string | null {
  for (const statement of [...statements].reverse()) {
    const letter = find(statement);
    if (letter) return letter;
  }
  return null;
}

export function startWalk(route: Route): WalkState {
  const { read } = route;
  const empty: WalkState = {
    meanings: [null],
    from: null,
    remark: null,
    isReadable: true,
    reference: null,
    known: [],
    afterFault: false,
    assumptions: read.assumptions,
    definitions: { letters: assumedValues(read), functions: new Map() },
    candidates: [],
  };
  const first = read.lines[0];
  if (!first?.ok) return { ...empty, isReadable: false };
  if (isDefinition(first.line)) {
    const { state } = judgeLine(route, empty, 0, first.line);
    return state;
  }
  return startAgain(empty, meaningOf(first.line));
}

/** Letters whose value the task states: a line may have the one or the other. */
function assumedValues({ assumptions }: ReadDerivation): ReadonlyMap<string, Expr> {
  const values = new Map<string, Expr>();
  for (const line of assumptions) {
    if (line.kind !== 'relation' || line.sign !== '=' || line.left.kind !== 'letter') continue;
    if (lettersOf(line.right).length === 0) values.set(line.left.name, line.right);
  }
  return values;
}

function isDefinition(line: Line): boolean {
  return line.kind === 'definition' || (line.kind === 'all' && line.parts.every(isDefinition));
}

/** The line becomes what later values have to satisfy. */
function startAgain(state: WalkState, meaning: Meaning | null): WalkState {
  const statement = meaning?.kind === 'statement' ? meaning.statement : null;
  return {
    ...state,
    meanings: [...state.meanings.slice(0, -1), meaning],
    from: meaning,
    reference: statement,
    known: statement ? [statement] : [],
  };
}

export interface WalkStep {
  readonly result: StepResult;
  readonly state: WalkState;
}

/** Rules on the line of one step and goes on to the next. */
export function judgeLine(
  route: Route,
  state: WalkState,
  step: number,
  line: Line,
  context = contextOf(route, state),
): WalkStep {
  const start = startOf(route, state, step);
  const answer = start === 'not-read' ? notRead(line) : attempt(route, state, step, line, start, context);
  const { ruling, reached, notes, evidence } = answer.result;
  return {
    result: { ruling, reached, notes: notes.length > 1 ? [...new Set(notes)] : notes, evidence },
    state: advance(route, state, step, answer),
  };
}

function notRead(line: Line): StepAnswer {
  return {
    result: undecided('not-read'),
    meaning: meaningOf(line),
    candidates: [],
    shrunk: [],
    defines: null,
    remark: null,
  };
}

export function contextOf(route: Route, state: WalkState): CheckContext {
  return createContext({
    numbers: route.read.numbers,
    assumptions: state.assumptions,
    wholeLetters: route.read.wholeLetters,
    realLetters: route.read.realLetters,
    definitions: state.definitions,
    calculus: route.calculus,
    reduceCalculus,
    budget: createBudget(operationsPerStep),
  });
}

/** The line above, or the lines that the author named. */
function startOf(route: Route, state: WalkState, step: number): Meaning | null | 'not-read' {
  const uses = route.input.uses?.[step];
  if (!uses || uses.length === 0) return state.isReadable ? state.from : 'not-read';
  const named = [...new Set(uses)]
    .filter((line) => line >= 0 && line < step)
    .map((line) => state.meanings[line] ?? null);
  const found = named.filter((meaning) => meaning !== null);
  if (found.length === 0) return state.isReadable ? state.from : 'not-read';
  if (found.length < named.length && uses.some((line) => route.read.lines[line]?.ok === false)) return 'not-read';
  if (found.length === 1) return found[0] as Meaning;
  const parts = found.flatMap((meaning) => (meaning.kind === 'statement' ? [meaning.statement] : []));
  if (parts.length < found.length) return found[found.length - 1] as Meaning;
  return { kind: 'statement', statement: { kind: 'all', parts }, last: null };
}

function attempt(
  route: Route,
  state: WalkState,
  step: number,
  line: Line,
  from: Meaning | null,
  context: CheckContext,
): StepAnswer {
  try {
    return judgeStep({
      line,
      from,
      remark: state.remark,
      reference: state.reference,
      known: route.input.uses?.[step]?.length && from?.kind === 'statement' ? [from.statement] : state.known,
      givenLetters: route.givenLetters,
      unknown: route.unknown,
      given: route.given,
      afterFault: state.afterFault,
      isLast: step === route.read.lines.length - 1,
      later: () => laterLetters(route, step),
      mayBringUnit: route.mayBringUnit,
      settings: route.input.settings,
      context,
    });
  } catch (cause) {
    return {
      result: undecided(reasonOf(cause)),
      meaning: meaningOf(line),
      candidates: [],
      shrunk: [],
      defines: null,
      remark: null,
    };
  }
}

function laterLetters({ read }: Route, step: number): string[] {
  return read.lines.slice(step + 1).flatMap((result) => (result.ok ? lettersOf(result.line) : []));
}

/** Only what the work on a step is known to end with; anything else is a broken invariant and goes on up. */
function reasonOf(cause: unknown): UndecidedReason {
  if (cause instanceof Unsettled) return cause.reason;
  if (cause instanceof BudgetSpent || cause instanceof RangeError) return 'limit';
  throw cause;
}

function advance(route: Route, state: WalkState, step: number, answer: StepAnswer): WalkState {
  const { result, meaning } = answer;
  const moved: WalkState = {
    ...state,
    meanings: [...state.meanings.slice(0, step), meaning],
    from: meaning ?? state.from,
    remark: answer.remark,
    isReadable: true,
    definitions: answer.defines ?? state.definitions,
    candidates:
      answer.candidates.length > 0 ? [...state.candidates, { step, values: answer.candidates }] : state.candidates,
  };
  if (result.ruling !== 'holds') {
    const afterFault = state.afterFault || result.ruling === 'fails';
    return startAgain({ ...moved, afterFault, assumptions: route.read.assumptions }, meaning ?? state.from);
  }
  const known = meaning?.kind === 'statement' ? [...state.known, meaning.statement] : state.known;
  const reference = state.reference ?? (meaning?.kind === 'statement' ? meaning.statement : null);
  return { ...moved, known, reference, assumptions: [...state.assumptions, ...answer.shrunk] };
}

/** Goes past a line that could not be read. */
export function skipLine(state: WalkState): WalkState {
  return { ...state, meanings: [...state.meanings, null], from: null, isReadable: false, reference: null, known: [] };
}

/** Goes past a step that took too long: the next one starts from its line. */
export function passStep(state: WalkState, line: Line): WalkState {
  const meaning = meaningOf(line);
  return startAgain({ ...state, meanings: [...state.meanings, meaning], isReadable: true }, meaning ?? state.from);
}
