import type { FrozenTask } from '../../../shared/schemas/task.ts';
import type { SavedDraft, SheetTask, SheetView } from '../../../shared/schemas/derivation.ts';
import type { Class } from '../classes/classes.entity.ts';
import type { Round } from '../rounds/rounds.entity.ts';
import type { Derivation, DerivationVersion, Draft } from './derivations.entity.ts';
import type { WritingWindow } from './writing-window.ts';

export function toSavedDraft(draft: Draft): SavedDraft {
  return { document: draft.document, version: draft.version, savedAt: draft.savedAt.toISOString() };
}

/** What an author sees of the task; the frozen one, and no more of it than is needed for writing. */
export function toSheetTask(frozen: FrozenTask): SheetTask {
  const { title, instructions, given, goal, assumptions, settings } = frozen;
  return { title, instructions, given, goal, assumptions, settings };
}

export interface SheetParts {
  readonly round: Round;
  readonly frozen: FrozenTask;
  readonly of: Class;
  readonly derivation: Derivation;
  readonly draft: Draft;
  readonly version: DerivationVersion | null;
  readonly window: WritingWindow;
  readonly dealt: boolean;
  readonly now: Date;
}

export function toSheetView(parts: SheetParts): SheetView {
  const { round, frozen, of, derivation, draft, version, window, dealt, now } = parts;
  return {
    derivationId: derivation.id,
    roundId: round.id,
    roundNumber: round.number,
    className: of.name,
    timeZone: of.timeZone,
    stage: round.stage === 'planned' ? 'writing' : round.stage,
    task: toSheetTask(frozen),
    reviewers: round.reviewsPerDerivation,
    writingEndsAt: window.endsAt.toISOString(),
    lateNow: window.open && window.late,
    canWrite: window.open && version === null,
    canTakeBack: window.open && version !== null && !dealt,
    handedIn: version && {
      at: version.handedInAt.toISOString(),
      late: derivation.late,
      lines: version.lines,
    },
    draft: toSavedDraft(draft),
    now: now.toISOString(),
  };
}
