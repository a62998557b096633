import { queryOptions } from '@tanstack/react-query';
import type { FindingDraft } from '../../../shared/schemas/finding.ts';
import type { DraftSaved, ReviewAnswer } from '../../../shared/schemas/review.ts';
import { api } from '../../lib/api.ts';

const at = (reviewId: string, act = '') => `/api/reviews/${encodeURIComponent(reviewId)}${act}`;

export const reviewQuery = (reviewId: string) =>
  queryOptions({
    queryKey: ['reviews', reviewId],
    queryFn: ({ signal }) => api.get<ReviewAnswer>(at(reviewId), { signal }),
    // What is being typed stands over what the server has; nothing may replace it from behind.
    refetchOnWindowFocus: false,
  });

export const saveDraft = (reviewId: string, draft: FindingDraft, version: number) =>
  api.put<DraftSaved>(at(reviewId, '/draft'), { draft, version });
export const handInFinding = (reviewId: string, finding: FindingDraft) =>
  api.post<ReviewAnswer>(at(reviewId, '/finding'), finding);
export const takeBackFinding = (reviewId: string) => api.post<ReviewAnswer>(at(reviewId, '/take-back'));
export const setReviewAside = (reviewId: string, reason: 'cannot-read' | 'know-the-author') =>
  api.post<ReviewAnswer>(at(reviewId, '/set-aside'), { reason });
export const contestPoints = (reviewId: string, words: string) =>
  api.post<ReviewAnswer>(at(reviewId, '/contest'), { words });
