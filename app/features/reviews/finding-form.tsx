import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { stakesOf } from '../../../shared/lib/scoring.ts';
import type { FindingDraft } from '../../../shared/schemas/finding.ts';
import type { ReviewAnswer } from '../../../shared/schemas/review.ts';
import { Button } from '../../ui/button.tsx';
import { HowSure, type SureOutcome } from '../../ui/how-sure.tsx';
import { Maths } from '../../ui/maths.tsx';
import { Notice } from '../../ui/notice.tsx';
import { problemWords } from '../../ui/states.tsx';
import { TextArea } from '../../ui/text-field.tsx';
import { Time } from '../../ui/time.tsx';
import type { DraftKeeper, DraftView } from './draft-keeper.ts';
import { handInFinding, reviewQuery, takeBackFinding } from './reviews.queries.ts';
import { SavedState } from './saved-state.tsx';
import { SetAside } from './set-aside.tsx';
import { StepFields } from './step-fields.tsx';

export interface FindingFormProps {
  readonly review: ReviewAnswer;
  readonly keeper: DraftKeeper;
  readonly view: DraftView;
  /** The marked part of the picked line. */
  readonly markedTex: string | null;
  readonly canMark: boolean;
}

/** The finding as a note in the margin, in the order in which one thinks: kind, should be, why, how sure. */
export function FindingForm({ review, keeper, view, markedTex, canMark }: FindingFormProps) {
  const { draft } = view;
  const steps = review.lines.length - 1;
  const isStep = typeof draft.pick === 'number';
  const isHandedIn = review.finding !== null && isSame(review.finding, draft);
  const act = useActs(review, keeper);
  return (
    <form
      className="finding stack"
      onSubmit={(event) => {
        event.preventDefault();
        act.handIn.mutate(draft);
      }}
    >
      <div>
        <h2>Your finding</h2>
        <p className="small muted">
          <Picked draft={draft} markedTex={markedTex} canMark={canMark} />
        </p>
      </div>
      {isStep ? <StepFields review={review} keeper={keeper} draft={draft} /> : null}
      <TextArea
        label="Why"
        rows={3}
        maxLength={2000}
        value={draft.why}
        onChange={(event) => keeper.edit({ why: event.currentTarget.value })}
      />
      {view.names.length > 0 ? (
        <Notice
          title={`${listed(view.names)} ${view.names.length === 1 ? 'is a name' : 'are names'} in your class.`}
          isLive
        >
          Take it out: neither side learns who the other is.
        </Notice>
      ) : null}
      <HowSure
        value={draft.sureness}
        onChange={(sureness) => keeper.edit({ sureness })}
        outcomes={draft.pick === null ? undefined : (place) => toOutcomes(draft.pick, place, steps)}
        hint={sureHint(draft)}
      />
      {act.error ? (
        <p className="msg err" role="alert">
          {act.error}
        </p>
      ) : null}
      <div className="acts">
        {isHandedIn ? null : (
          <Button
            kind={draft.sureness === 0 ? 'second' : 'primary'}
            type="submit"
            wide
            busy={act.handIn.isPending}
            disabled={draft.pick === null && draft.sureness > 0}
          >
            {draft.sureness === 0 ? 'Hand in “can’t tell”' : review.finding ? 'Hand in again' : 'Hand in finding'}
          </Button>
        )}
        {draft.pick === 'none' ? (
          <Button kind="quiet" onClick={() => keeper.edit({ pick: null })}>
            Name a step instead
          </Button>
        ) : (
          <Button kind="quiet" onClick={() => keeper.edit({ pick: 'none', markedSpan: null })}>
            There is no fault
          </Button>
        )}
      </div>
      {review.finding ? (
        <Notice
          title={isHandedIn ? 'Handed in.' : 'Changed since it was handed in.'}
          acts={
            <Button kind="quiet" small busy={act.takeBack.isPending} onClick={() => act.takeBack.mutate()}>
              Take it back
            </Button>
          }
        >
          {isHandedIn ? 'You can change it' : 'What was handed in counts'} until{' '}
          <Time iso={review.round.reviewingEndsAt} />.
        </Notice>
      ) : null}
      <div className="finding-foot">
        <SavedState view={view} onKeep={(which) => keeper.keep(which)} />
        {review.finding ? null : <SetAside review={review} />}
      </div>
    </form>
  );
}

function Picked({ draft, markedTex, canMark }: { draft: FindingDraft; markedTex: string | null; canMark: boolean }) {
  const { pick } = draft;
  if (pick === null) return <>Close the bracket on the first step that does not follow, or say that there is none.</>;
  if (pick === 'none') return <>You say that every step follows.</>;
  return (
    <>
      Step {pick}, from {pick === 1 ? 'the given' : `line ${pick - 1}`} to line {pick}.{' '}
      {markedTex ? (
        <>
          You marked <Maths tex={markedTex} />.
        </>
      ) : canMark ? (
        'Mark the term where it goes wrong.'
      ) : null}
    </>
  );
}

function toOutcomes(pick: FindingDraft['pick'], place: number, steps: number): SureOutcome[] {
  if (pick === null) return [];
  const stakes = stakesOf(pick, place, steps);
  if (stakes.noFault === null) {
    return [
      { label: 'There is no fault', points: stakes.right },
      { label: 'A step is it', points: stakes.anotherStep },
    ];
  }
  return [
    { label: 'This step is it', points: stakes.right },
    { label: 'Another step is it', points: stakes.anotherStep },
    { label: 'There is no fault', points: stakes.noFault },
  ];
}

function sureHint(draft: FindingDraft): string {
  if (draft.sureness === 0 && draft.pick !== null) return 'At “can’t tell” nothing is picked: say how sure you are.';
  return 'Honest sureness earns most. The checker advises, your teacher decides.';
}

function useActs(review: ReviewAnswer, keeper: DraftKeeper) {
  const client = useQueryClient();
  const [error, setError] = useState<string | null>(null);
  const taken = (answer: ReviewAnswer) => {
    setError(null);
    client.setQueryData(reviewQuery(review.reviewId).queryKey, answer);
    if (answer.draft) keeper.serverHas(answer.draft, answer.draftVersion);
  };
  const failed = (problem: unknown) => setError(problemWords(problem).detail || problemWords(problem).title);
  const handIn = useMutation({
    mutationFn: async (draft: FindingDraft) => {
      await keeper.flush();
      return await handInFinding(review.reviewId, draft);
    },
    onSuccess: taken,
    onError: failed,
  });
  const takeBack = useMutation({
    mutationFn: () => takeBackFinding(review.reviewId),
    onSuccess: taken,
    onError: failed,
  });
  return { handIn, takeBack, error };
}

/** Whether what is on the page says what was handed in; "can't tell" keeps the words alone. */
function isSame(handedIn: FindingDraft, draft: FindingDraft): boolean {
  if (handedIn.why !== draft.why || handedIn.sureness !== draft.sureness) return false;
  if (draft.sureness === 0) return true;
  if (handedIn.pick !== draft.pick) return false;
  return draft.pick === 'none' || JSON.stringify(sortedFields(handedIn)) === JSON.stringify(sortedFields(draft));
}

function sortedFields({ pick, markedSpan, slipKind, shouldBe }: FindingDraft) {
  return [pick, markedSpan?.start, markedSpan?.end, slipKind, shouldBe];
}

function listed(names: readonly string[]): string {
  return names.map((name) => `“${name}”`).join(', ');
}
