import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { RoundAnswer } from '../../../shared/schemas/round.ts';
import { ConfirmDialog, Dialog } from '../../ui/dialog.tsx';
import { ErrorState, Waiting } from '../../ui/states.tsx';
import { TextField } from '../../ui/text-field.tsx';
import { MOVE_WORDS, sayEffect, sayWarning } from './round-words.ts';
import { nextStageQuery, roundActs } from './rounds.queries.ts';
import { refusalOf, useRoundAct } from './use-round-act.ts';

const DONE = {
  writing: 'Writing is open.',
  reviewing: 'The derivations are dealt.',
  answering: 'Authors can answer now.',
  settled: 'The round is settled.',
} as const;

/** Moves a round on by hand, after showing what that will do. */
export function StageDialog({ round, onClose }: { readonly round: RoundAnswer; readonly onClose: () => void }) {
  const [reason, setReason] = useState('');
  const preview = useQuery(nextStageQuery(round.id));
  const move = useRoundAct(
    roundActs(round.id).move,
    (after) => (after.stage === 'planned' ? 'Done.' : DONE[after.stage]),
    onClose,
  );
  if (round.stage === 'settled') return null;
  const { title, act } = MOVE_WORDS[round.stage];
  const to = preview.data?.to;
  if (!preview.data || !to) {
    return (
      <Dialog isOpen onClose={onClose} title={title}>
        {preview.isError ? <ErrorState error={preview.error} onRetry={() => void preview.refetch()} /> : <Waiting />}
      </Dialog>
    );
  }
  const { effects, warnings, needsForce } = preview.data;
  return (
    <ConfirmDialog
      isOpen
      grave={needsForce}
      title={title}
      confirm={needsForce ? 'Settle all the same' : act}
      busy={move.isPending}
      error={refusalOf(move.error)}
      effects={effects.map(sayEffect)}
      onClose={onClose}
      onConfirm={() => move.mutate({ to, force: needsForce, reason: reason.trim() })}
    >
      {warnings.map((warning) => (
        <p key={warning.kind} className="mt-1">
          <b>{sayWarning(warning)}</b>
        </p>
      ))}
      {needsForce ? (
        <TextField
          label="Reason, kept in the trail"
          value={reason}
          maxLength={300}
          onChange={(event) => setReason(event.target.value)}
        />
      ) : null}
    </ConfirmDialog>
  );
}
