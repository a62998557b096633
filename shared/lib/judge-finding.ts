import type { Span } from '../maths/expression.ts';
import type { ReadStep, ScoreOutcome, StepState } from '../schemas/review.ts';
import type { Note, StepRuling, Verdict } from '../schemas/verdict.ts';
import { pointsOf, type Truth } from './scoring.ts';

/** A step with one of these notes may be picked in good faith; such a pick is void unless it is the first fault. */
const VOIDING_NOTES: ReadonlySet<Note> = new Set(['presentation', 'domain', 'constant', 'one-way']);

export interface JudgedFinding {
  readonly pick: number | null;
  readonly noFault: boolean;
  /** Tenths. */
  readonly sureness: number;
  readonly markedSpan: Span | null;
  readonly slipKind: string | null;
}

export interface Judgement {
  readonly outcome: ScoreOutcome;
  /** Four decimals. */
  readonly points: number;
  /** false: void, it enters no standing. */
  readonly counted: boolean;
  /** null where the slip could not be named. */
  readonly slipNamed: boolean | null;
  readonly termMarked: boolean | null;
}

/** Whether a marked part lies within one term of a line; the reading of the line decides what a term is. */
export type WithinOneTerm = (span: Span, line: number) => boolean;

/**
 * Scores a finding against a verdict. A verdict that is undecided voids it; `voided` does the same for a finding whose
 * dispute was never ruled on.
 */
export function judgeFinding(
  finding: JudgedFinding,
  verdict: Verdict,
  withinOneTerm: WithinOneTerm,
  voided = false,
): Judgement {
  const outcome = voided ? 'void' : outcomeOf(finding, verdict);
  if (outcome === 'void') return { outcome, points: 0, counted: false, slipNamed: null, termMarked: null };
  const truth: Truth = verdict.firstFault ?? 'none';
  const pick = finding.noFault ? 'none' : finding.pick;
  const points = pointsOf(pick, finding.sureness, truth, verdict.steps.length);
  return { outcome, points, counted: true, ...namedApart(finding, verdict, outcome, withinOneTerm) };
}

/** How each step stands along the edge. A fault behind an undecided step is never called the first. */
export function stateOf({ step, ruling }: Pick<StepRuling, 'step' | 'ruling'>, firstFault: number | null): StepState {
  if (ruling === 'undecided') return 'undecided';
  if (ruling === 'fails') return step === firstFault ? 'fault' : 'also-fails';
  return firstFault !== null && step > firstFault ? 'carried' : 'holds';
}

export function toReadSteps(verdict: Pick<Verdict, 'firstFault' | 'steps'>): ReadStep[] {
  return verdict.steps.map((ruling) => ({
    step: ruling.step,
    state: stateOf(ruling, verdict.firstFault),
    reached: ruling.reached,
    notes: ruling.notes,
    evidence: ruling.evidence,
  }));
}

/** Outcome and first fault of steps as they are ruled: a number exactly when everything before it holds. */
export function concludeSteps(steps: readonly StepRuling[]): Pick<Verdict, 'outcome' | 'firstFault'> {
  const open = steps.find(({ ruling }) => ruling !== 'holds');
  if (!open) return { outcome: 'sound', firstFault: null };
  return open.ruling === 'fails'
    ? { outcome: 'faulty', firstFault: open.step }
    : { outcome: 'undecided', firstFault: null };
}

function outcomeOf({ pick, noFault, sureness }: JudgedFinding, verdict: Verdict): ScoreOutcome {
  if (verdict.outcome === 'undecided') return 'void';
  const { firstFault } = verdict;
  if (noFault && sureness > 0) return firstFault === null ? 'right' : 'missed';
  if (pick === null || sureness === 0) return 'no-pick';
  if (pick === firstFault) return 'right';
  const step = verdict.steps.find((each) => each.step === pick);
  if (step?.notes.some((note) => VOIDING_NOTES.has(note))) return 'void';
  if (firstFault === null) return 'false-alarm';
  return pick > firstFault && step?.ruling === 'holds' ? 'carried' : 'not-first';
}

/** The kind of slip and the marked part earn nothing; they are counted of those faults that were found and could be named. */
function namedApart(finding: JudgedFinding, verdict: Verdict, outcome: ScoreOutcome, withinOneTerm: WithinOneTerm) {
  const fault = verdict.steps.find(({ step }) => step === verdict.firstFault);
  if (outcome !== 'right' || !fault) return { slipNamed: null, termMarked: null };
  const { slip, wrongPart } = fault.evidence;
  const marked = finding.markedSpan;
  return {
    slipNamed: slip ? finding.slipKind === slip.kind : null,
    termMarked: wrongPart
      ? marked !== null && overlaps(marked, wrongPart.span) && withinOneTerm(marked, fault.step)
      : null,
  };
}

function overlaps(a: Span, b: Span): boolean {
  return a.start < b.end && b.start < a.end;
}
