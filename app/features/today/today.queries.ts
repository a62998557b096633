import { queryOptions } from '@tanstack/react-query';
import type { TodayAnswer } from '../../../shared/schemas/today.ts';
import { api } from '../../lib/api.ts';

/** What is due for the reader; looked at anew each minute while the page is open. */
export const todayQuery = queryOptions({
  queryKey: ['today'],
  queryFn: ({ signal }) => api.get<TodayAnswer>('/api/today', { signal }),
  refetchInterval: 60_000,
});
