import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { ReviewAnswer } from '../../../shared/schemas/review.ts';
import { Button } from '../../ui/button.tsx';
import { ConfirmDialog } from '../../ui/dialog.tsx';
import { problemWords } from '../../ui/states.tsx';
import { reviewQuery, setReviewAside } from './reviews.queries.ts';

const WORDS = {
  'cannot-read': {
    act: 'I cannot read this',
    confirm: 'Set it aside',
    title: 'Set this review aside?',
    words: 'You cannot make out what is written. Your teacher sees that, and it costs you nothing.',
  },
  'know-the-author': {
    act: 'I know whose this is',
    confirm: 'Set it aside',
    title: 'Set this review aside?',
    words: 'You know who wrote it, so you cannot review it blind. Your teacher sees that, and it costs you nothing.',
  },
} as const;

/** Two honest ways out of a review. */
export function SetAside({ review }: { review: ReviewAnswer }) {
  const client = useQueryClient();
  const [reason, setReason] = useState<keyof typeof WORDS | null>(null);
  const act = useMutation({
    mutationFn: (why: keyof typeof WORDS) => setReviewAside(review.reviewId, why),
    onSuccess: (answer) => client.setQueryData(reviewQuery(review.reviewId).queryKey, answer),
  });
  return (
    <div className="acts">
      {(Object.keys(WORDS) as (keyof typeof WORDS)[]).map((each) => (
        <Button key={each} kind="quiet" small onClick={() => setReason(each)}>
          {WORDS[each].act}
        </Button>
      ))}
      <ConfirmDialog
        isOpen={reason !== null}
        onClose={() => setReason(null)}
        title={reason ? WORDS[reason].title : ''}
        confirm={reason ? WORDS[reason].confirm : ''}
        busy={act.isPending}
        error={act.error ? problemWords(act.error).detail : undefined}
        onConfirm={() => reason && act.mutate(reason)}
      >
        {reason ? WORDS[reason].words : null}
      </ConfirmDialog>
    </div>
  );
}
