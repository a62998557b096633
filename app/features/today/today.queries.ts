import { queryOptions } from '@tanstack/react-query';
import type { RoundListItem } from '../../../shared/schemas/round.ts';
import type { TodayAnswer } from '../../../shared/schemas/today.ts';
import { api } from '../../lib/api.ts';

/** What is due for the reader; looked at anew each minute while the page is open. */
export const todayQuery = queryOptions({
  queryKey: ['today'],
  queryFn: ({ signal }) => api.get<TodayAnswer>('/api/today', { signal }),
  refetchInterval: 60_000,
});

/** Every round of the reader's classes, for looking back. */
export const allRoundsQuery = queryOptions({
  queryKey: ['rounds', 'all'],
  queryFn: ({ signal }) => api.get<readonly RoundListItem[]>('/api/rounds', { signal }),
});
