import { useQuery } from '@tanstack/react-query';
import type { DisputeCase } from '../../../shared/schemas/dispute.ts';
import { countWord } from '../../lib/finding-words.ts';
import { Button } from '../../ui/button.tsx';
import { Checkbox } from '../../ui/choice.tsx';
import { Kbd } from '../../ui/kbd.tsx';
import { TextArea } from '../../ui/text-field.tsx';
import { Time } from '../../ui/time.tsx';
import { counted, effectWords } from './dispute-words.ts';
import { effectQuery } from './disputes.queries.ts';

export type Choice = 'holds' | 'fails' | 'presentation' | 'ask';
export const CHOICES: readonly Choice[] = ['holds', 'fails', 'presentation', 'ask'];

export interface RuleColumnProps {
  readonly dispute: DisputeCase;
  readonly choice: Choice | null;
  readonly onChoose: (choice: Choice) => void;
  readonly reason: string;
  readonly onReason: (reason: string) => void;
  readonly along: boolean;
  readonly onAlong: (along: boolean) => void;
  readonly onRule: () => void;
  readonly isBusy: boolean;
  readonly error: string | undefined;
  readonly isLast: boolean;
  /** Enter in the reason. */
  readonly onReasonEnter: () => void;
  readonly reasonId: string;
}

/** The rulings by number, the reason, and what it will change before the button. */
export function RuleColumn(props: RuleColumnProps) {
  const { dispute, choice, onChoose, reason, onReason, along, onAlong, onRule, isBusy, error, isLast } = props;
  const isAsking = choice === 'ask';
  return (
    <aside className="rule-col" aria-label="Rule">
      <h2 id="rule-head">Rule</h2>
      <div className="rulings" role="radiogroup" aria-labelledby="rule-head">
        {CHOICES.map((each, i) => (
          <label
            key={each}
            className={choice === each ? 'rk sel' : 'rk'}
            data-off={(each === 'ask' && !dispute.mayAsk) || undefined}
          >
            <input
              type="radio"
              className="sr-only"
              name="ruling"
              checked={choice === each}
              disabled={each === 'ask' && !dispute.mayAsk}
              onChange={() => onChoose(each)}
            />
            <Kbd>{i + 1}</Kbd>
            <span>
              {wordsOf(each, dispute).label} <em>{wordsOf(each, dispute).hint}</em>
            </span>
          </label>
        ))}
      </div>
      {dispute.sameStep > 0 && !isAsking ? (
        <Checkbox
          label={`Rule the ${dispute.sameStep === 1 ? 'other one' : `${countWord(dispute.sameStep)} others`} with the same step along`}
          checked={along}
          onChange={(event) => onAlong(event.currentTarget.checked)}
        />
      ) : null}
      <TextArea
        id={props.reasonId}
        onKeyDown={(event) => {
          if (event.key !== 'Enter' || event.shiftKey || event.nativeEvent.isComposing) return;
          event.preventDefault();
          props.onReasonEnter();
        }}
        label={isAsking ? 'Question to the author' : reasonLabel(dispute, along)}
        rows={3}
        maxLength={2000}
        value={reason}
        error={error}
        onChange={(event) => onReason(event.currentTarget.value)}
      />
      {choice && choice !== 'ask' ? <Effect dispute={dispute} choice={choice} along={along} /> : null}
      {isAsking ? <p className="eff small">The dispute stays open until the author has replied.</p> : null}
      <Button
        kind="primary"
        className="wide-b"
        wide
        busy={isBusy}
        disabled={choice === null || reason.trim() === ''}
        onClick={onRule}
      >
        {isAsking ? 'Ask, then the next' : isLast ? 'Rule' : 'Rule, then the next'} <span className="kin">Enter</span>
      </Button>
      <p className="fine muted mt-2">
        {dispute.round.stage === 'settled'
          ? 'Everyone concerned is mailed at once.'
          : 'No student sees this before the round is settled.'}
      </p>
      <Earlier dispute={dispute} />
    </aside>
  );
}

function Effect({ dispute, choice, along }: { dispute: DisputeCase; choice: Exclude<Choice, 'ask'>; along: boolean }) {
  const effect = useQuery(effectQuery(dispute.disputeId, choice, along));
  return (
    <p className="eff small" aria-live="polite">
      {effect.data ? (
        <>
          <b>{counted(effect.data.people, 'person').replace('persons', 'people')}:</b> {effectWords(effect.data)}
        </>
      ) : (
        <span className="muted">
          {effect.isError ? 'What it changes could not be reckoned.' : 'Reckoning what it changes…'}
        </span>
      )}
    </p>
  );
}

function Earlier({ dispute }: { dispute: DisputeCase }) {
  if (dispute.earlier.length === 0) return null;
  return (
    <div className="prec">
      <h2>Ruled before</h2>
      {dispute.earlier.map((ruling) => (
        <p key={ruling.rulingId} className="small">
          Round {ruling.roundNumber}, {ruling.taskTitle}
          <br />
          {ruling.reason} <b>{DECISIONS[ruling.decision]}</b>{' '}
          <span className="muted">
            <Time iso={ruling.at} style="date" />
          </span>
        </p>
      ))}
    </div>
  );
}

const DECISIONS = { holds: 'Holds.', fails: 'Fails.', presentation: 'Presentation only.', stands: 'Stands.' } as const;

function wordsOf(choice: Choice, { step, verdict, mayAsk, round }: DisputeCase): { label: string; hint: string } {
  const state = verdict?.steps.find((each) => each.step === step)?.state;
  const fails = state === 'fault' || state === 'also-fails';
  switch (choice) {
    case 'holds':
      return {
        label: `Step ${step} holds`,
        hint: state === 'holds' || state === 'carried' ? 'the checker stands' : 'it follows from the line above',
      };
    case 'fails':
      return { label: `Step ${step} fails`, hint: fails ? 'the checker stands' : 'it does not follow' };
    case 'presentation':
      return { label: 'Presentation only', hint: 'a note, no fault' };
    case 'ask':
      return {
        label: 'Ask the author',
        hint: mayAsk
          ? 'stays open until the reply'
          : round.stage === 'settled'
            ? 'there is no author to ask'
            : 'only after settling',
      };
  }
}

function reasonLabel(dispute: DisputeCase, along: boolean): string {
  if (!along && dispute.sameStep > 0) return 'Reason, which everyone concerned will read';
  return dispute.people > 1
    ? `Reason, which all ${countWord(dispute.people)} will read`
    : 'Reason, which everyone concerned will read';
}
