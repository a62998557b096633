import type { ReviewAnswer } from '../../../shared/schemas/review.ts';
import { countWord, ordinal } from '../../lib/finding-words.ts';
import { Maths } from '../../ui/maths.tsx';
import { Head } from '../../ui/page.tsx';
import { Time } from '../../ui/time.tsx';

/** Which round, until when, which of how many; and what was to be done. */
export function ReviewHead({ review }: { readonly review: ReviewAnswer }) {
  const { round, task, position, total } = review;
  return (
    <Head
      where={
        <>
          Round {round.number} ·{' '}
          {review.canEdit ? (
            <>
              reviewing until <Time iso={round.reviewingEndsAt} />
            </>
          ) : (
            'reviewing is over'
          )}
          {total > 1 ? ` · ${ordinal(position)} of ${countWord(total)}` : null}
        </>
      }
      h1={task.title}
      lead={
        <span className="muted">
          Find the first step that does not follow.
          {task.assumptions.length > 0 ? (
            <>
              {' '}
              Given that{' '}
              {task.assumptions.map((tex, i) => (
                <span key={tex}>
                  {i > 0 ? ', ' : null}
                  <Maths tex={tex} />
                </span>
              ))}
              .
            </>
          ) : null}
        </span>
      }
    />
  );
}
