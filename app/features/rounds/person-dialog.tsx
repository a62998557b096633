import { useState } from 'react';
import type { BoardPerson, RoundAnswer } from '../../../shared/schemas/round.ts';
import { paths } from '../../lib/paths.ts';
import { Button, LinkButton } from '../../ui/button.tsx';
import { DateTimeField } from '../../ui/date-time-field.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { TextField } from '../../ui/text-field.tsx';
import { plural, shortInstant } from './round-words.ts';
import { roundActs } from './rounds.queries.ts';
import { refusalOf, useRoundAct } from './use-round-act.ts';

export interface PersonDialogProps {
  readonly round: RoundAnswer;
  readonly person: BoardPerson & { readonly userId: string };
  readonly now: string;
  readonly onClose: () => void;
}

const HOUR = 3_600_000;

/** What stands about one person, and what the teacher can do for them. */
export function PersonDialog({ round, person, now, onClose }: PersonDialogProps) {
  const acts = roundActs(round.id);
  const [reason, setReason] = useState('');
  const isExcused = person.state === 'excused';
  const excuse = useRoundAct(
    () => acts.excuse(person.userId, { excused: !isExcused, reason }),
    isExcused ? `${person.name} takes part again.` : `${person.name} is excused.`,
    onClose,
  );
  const mayExtend =
    !isExcused && (round.stage === 'planned' || round.stage === 'writing' || round.stage === 'reviewing');
  return (
    <Dialog isOpen onClose={onClose} title={person.name} isLocked={excuse.isPending}>
      <div className="stack">
        <p className="small muted">{describe(round, person, now)}</p>
        {person.derivationId ? (
          <p>
            <LinkButton to={paths.derivation(person.derivationId)}>See the derivation</LinkButton>
          </p>
        ) : null}
        {mayExtend ? <Extend round={round} person={person} onClose={onClose} /> : null}
        {round.stage === 'settled' ? null : (
          <section className="stack border-t border-rule pt-4">
            <p className="small">
              {isExcused
                ? 'Missing work counts for nothing while excused.'
                : 'Excused: missing work counts for nothing, and reviews not begun go to others.'}
            </p>
            {isExcused ? null : (
              <TextField
                label="Why, for the trail"
                value={reason}
                maxLength={300}
                onChange={(event) => setReason(event.currentTarget.value)}
              />
            )}
            {excuse.error ? (
              <p className="msg err" role="alert">
                {refusalOf(excuse.error)}
              </p>
            ) : null}
            <div className="acts">
              <Button busy={excuse.isPending} onClick={() => excuse.mutate()}>
                {isExcused ? 'End the excuse' : 'Excuse from this round'}
              </Button>
            </div>
          </section>
        )}
      </div>
    </Dialog>
  );
}

function Extend({ round, person, onClose }: Omit<PersonDialogProps, 'now'>) {
  const acts = roundActs(round.id);
  const isWriting = round.stage !== 'reviewing' || !person.handedInAt;
  const mayWrite = isWriting && !person.handedInAt;
  const current = mayWrite ? person.ownWritingEndsAt : person.ownReviewingEndsAt;
  const general = mayWrite ? round.instants.writingEndsAt : round.instants.reviewingEndsAt;
  const [until, setUntil] = useState<string | null>(current ?? new Date(Date.parse(general) + 24 * HOUR).toISOString());
  const extend = useRoundAct(
    () =>
      acts.extend(person.userId, {
        writingEndsAt: mayWrite ? until : person.ownWritingEndsAt,
        reviewingEndsAt: mayWrite ? person.ownReviewingEndsAt : until,
        reason: '',
      }),
    `${person.name} has more time.`,
    onClose,
  );
  const end = useRoundAct(() => acts.endExtension(person.userId), 'The longer time has ended.', onClose);
  return (
    <form
      className="stack border-t border-rule pt-4"
      onSubmit={(event) => {
        event.preventDefault();
        extend.mutate();
      }}
    >
      <DateTimeField
        label={mayWrite ? 'More time to write, until' : 'More time to review, until'}
        zone={round.timeZone}
        value={until}
        min={general}
        max={mayWrite ? round.instants.reviewingEndsAt : round.instants.answeringEndsAt}
        onChange={setUntil}
        error={refusalOf(extend.error)}
      />
      <div className="acts">
        <Button kind="primary" type="submit" busy={extend.isPending} disabled={!until}>
          Give this person more time
        </Button>
        {current ? (
          <Button kind="quiet" small busy={end.isPending} onClick={() => end.mutate()}>
            End it
          </Button>
        ) : null}
      </div>
    </form>
  );
}

function describe(round: RoundAnswer, person: BoardPerson, now: string): string {
  const { reviews, findings } = person;
  const say = (iso: string) => shortInstant(iso, round.timeZone, now);
  return [
    person.handedInAt
      ? `Handed in ${say(person.handedInAt)}${person.late ? ', late' : ''}, ${plural(person.lines, 'line')}.`
      : person.lines > 0
        ? `${plural(person.lines, 'line')} written, not handed in.`
        : person.hasOpened
          ? 'Has read the task.'
          : 'Has not opened the task.',
    reviews.dealt > 0 ? `${reviews.done} of ${plural(reviews.dealt, 'review')} handed in.` : '',
    findings.received > 0 ? `${plural(findings.received, 'finding')} received.` : '',
    person.ownWritingEndsAt ? `May write until ${say(person.ownWritingEndsAt)}.` : '',
    person.ownReviewingEndsAt ? `May review until ${say(person.ownReviewingEndsAt)}.` : '',
  ]
    .filter(Boolean)
    .join(' ');
}
