import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { AuthorFinding } from '../../../shared/schemas/review.ts';
import { Button } from '../../ui/button.tsx';
import { RadioGroup } from '../../ui/choice.tsx';
import { problemWords } from '../../ui/states.tsx';
import { TextArea } from '../../ui/text-field.tsx';
import { answerFinding, derivationQuery } from './findings.queries.ts';

/** The author's reply to one finding; it can be changed until answering ends. */
export function AnswerForm({ derivationId, finding }: { derivationId: string; finding: AuthorFinding }) {
  const client = useQueryClient();
  const { answer } = finding;
  const [kind, setKind] = useState(answer?.kind ?? null);
  const [reason, setReason] = useState(answer?.reason ?? '');
  const act = useMutation({
    mutationFn: (given: 'accept' | 'contest') =>
      answerFinding(finding.key, { kind: given, reason: given === 'contest' ? reason : '' }),
    onSuccess: () => client.invalidateQueries({ queryKey: derivationQuery(derivationId).queryKey }),
  });
  const isKept = answer !== null && answer.kind === kind && (kind === 'accept' || answer.reason === reason.trim());
  const error = act.error ? problemWords(act.error).detail : undefined;
  return (
    <form
      className="answer stack"
      onSubmit={(event) => {
        event.preventDefault();
        if (kind) act.mutate(kind);
      }}
    >
      <RadioGroup
        label="Your answer"
        value={kind}
        onChange={(chosen) => {
          setKind(chosen);
          if (chosen === 'accept') act.mutate('accept');
        }}
        options={[
          { value: 'accept', label: 'I see it: accepted' },
          { value: 'contest', label: 'I contest it' },
        ]}
      />
      {kind === 'contest' ? (
        <>
          <TextArea
            label="Why you contest it"
            rows={2}
            maxLength={2000}
            value={reason}
            error={error}
            onChange={(event) => setReason(event.currentTarget.value)}
          />
          <Button type="submit" busy={act.isPending} disabled={isKept || reason.trim() === ''}>
            {answer?.kind === 'contest' ? 'Change the reason' : 'Contest'}
          </Button>
        </>
      ) : null}
      <output className="fine muted" aria-live="polite">
        {act.isPending ? 'Saving…' : isKept ? 'Saved' : kind === 'accept' && error ? error : null}
      </output>
    </form>
  );
}
