import { useState } from 'react';
import type { RoundAnswer } from '../../../shared/schemas/round.ts';
import { Button } from '../../ui/button.tsx';
import { RadioGroup } from '../../ui/choice.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { TextField } from '../../ui/text-field.tsx';
import { shortInstant } from './round-words.ts';
import { roundActs } from './rounds.queries.ts';
import { refusalOf, useRoundAct } from './use-round-act.ts';

const AMOUNTS = [
  { minutes: 10, label: '10 minutes' },
  { minutes: 60, label: '1 hour' },
  { minutes: 1440, label: '1 day' },
  { minutes: 2880, label: '2 days' },
] as const;

const END = {
  planned: 'opensAt',
  writing: 'writingEndsAt',
  reviewing: 'reviewingEndsAt',
  answering: 'answeringEndsAt',
} as const;
const END_WORDS = {
  planned: 'The round opens',
  writing: 'Writing ends',
  reviewing: 'Reviewing ends',
  answering: 'Answering ends',
} as const;

export interface MoreTimeProps {
  readonly round: RoundAnswer;
  readonly now: string;
  readonly onClose: () => void;
}

/** More time for everyone: the running stage ends later, and so does all that follows. */
export function MoreTimeDialog({ round, now, onClose }: MoreTimeProps) {
  const [minutes, setMinutes] = useState('60');
  const [reason, setReason] = useState('');
  const give = useRoundAct(roundActs(round.id).giveMoreTime, 'Everyone has more time.', onClose);
  if (round.stage === 'settled') return null;
  const end = new Date(Date.parse(round.instants[END[round.stage]]) + Number(minutes) * 60_000).toISOString();
  return (
    <Dialog isOpen onClose={onClose} title="Give everyone more time" isLocked={give.isPending}>
      <form
        className="stack"
        onSubmit={(event) => {
          event.preventDefault();
          give.mutate({ minutes: Number(minutes), reason });
        }}
      >
        <RadioGroup
          label="How much more"
          options={AMOUNTS.map((each) => ({ value: String(each.minutes), label: each.label }))}
          value={minutes}
          onChange={setMinutes}
        />
        <TextField
          label="Why, for the trail"
          value={reason}
          maxLength={300}
          onChange={(event) => setReason(event.currentTarget.value)}
        />
        <p className="small">
          {END_WORDS[round.stage]} <b>{shortInstant(end, round.timeZone, now)}</b>; everything after it moves by as
          much. For one person, choose the name on the board.
        </p>
        {give.error ? (
          <p className="msg err" role="alert">
            {refusalOf(give.error)}
          </p>
        ) : null}
        <div className="acts">
          <Button kind="primary" type="submit" busy={give.isPending}>
            Give more time
          </Button>
          <Button kind="quiet" small onClick={onClose}>
            Not now
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
