import { useEffect, useState, useSyncExternalStore } from 'react';
import { EMPTY_DRAFT } from '../../../shared/schemas/finding.ts';
import type { ReviewAnswer } from '../../../shared/schemas/review.ts';
import { createDraftKeeper, type DraftKeeper, type DraftView } from './draft-keeper.ts';
import { saveDraft } from './reviews.queries.ts';

/** The finding being made, kept as it is typed. */
export function useDraft(review: ReviewAnswer): { keeper: DraftKeeper; view: DraftView } {
  const [keeper] = useState(() =>
    createDraftKeeper({
      key: `slipstone.review.${review.reviewId}`,
      draft: review.draft ?? review.finding ?? EMPTY_DRAFT,
      version: review.draftVersion,
      storage: localStorage,
      send: (draft, version) => saveDraft(review.reviewId, draft, version),
    }),
  );
  useEffect(() => () => keeper.close(), [keeper]);
  const view = useSyncExternalStore(keeper.subscribe, () => keeper.view);
  return { keeper, view };
}
