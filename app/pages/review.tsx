import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import type { ReviewAnswer } from '../../shared/schemas/review.ts';
import { stepWords } from '../../shared/lib/step-words.ts';
import { ReviewDesk } from '../features/reviews/review-desk.tsx';
import { ReviewDone } from '../features/reviews/review-done.tsx';
import { ReviewHead } from '../features/reviews/review-head.tsx';
import { contestPoints, reviewQuery } from '../features/reviews/reviews.queries.ts';
import { ReviewerResult } from '../features/verdict/reviewer-result.tsx';
import { ApiProblem } from '../lib/api.ts';
import { Page } from '../ui/page.tsx';
import { ErrorState, Waiting } from '../ui/states.tsx';
import { ZoneProvider } from '../ui/time.tsx';
import { NotFound } from './not-found.tsx';

/** One review: the desk while reviewing is open, what was handed in until settling, the result after it. */
export function Component() {
  const { reviewId = '' } = useParams();
  const review = useQuery(reviewQuery(reviewId));
  if (review.error instanceof ApiProblem && review.error.type === 'not-found') return <NotFound />;
  if (!review.data) {
    return (
      <Page work>
        <div className="head">
          {review.isError ? <ErrorState error={review.error} onRetry={() => void review.refetch()} /> : <Waiting />}
        </div>
      </Page>
    );
  }
  return (
    <ZoneProvider zone={review.data.round.timeZone}>
      <Page work={review.data.canEdit} className="review-page">
        <Review key={reviewId} review={review.data} />
      </Page>
    </ZoneProvider>
  );
}

function Review({ review }: { review: ReviewAnswer }) {
  const client = useQueryClient();
  if (review.result) {
    const contest = async (words: string) =>
      client.setQueryData(reviewQuery(review.reviewId).queryKey, await contestPoints(review.reviewId, words));
    return <ReviewerResult review={review} result={review.result} wordStep={stepWords} onContest={contest} />;
  }
  return (
    <>
      <ReviewHead review={review} />
      {review.canEdit ? <ReviewDesk review={review} /> : <ReviewDone review={review} />}
    </>
  );
}
