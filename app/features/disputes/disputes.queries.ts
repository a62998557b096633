import { queryOptions } from '@tanstack/react-query';
import type {
  Decision,
  DisputeCase,
  DisputeItem,
  DisputeNames,
  RulingEffect,
} from '../../../shared/schemas/dispute.ts';
import { api } from '../../lib/api.ts';

const at = (disputeId: string, act = '') => `/api/disputes/${encodeURIComponent(disputeId)}${act}`;

export const disputesQuery = queryOptions({
  queryKey: ['disputes', 'open'],
  queryFn: ({ signal }) => api.get<readonly DisputeItem[]>('/api/disputes', { signal }),
});
export const disputeQuery = (disputeId: string) =>
  queryOptions({
    queryKey: ['disputes', 'case', disputeId],
    queryFn: ({ signal }) => api.get<DisputeCase>(at(disputeId), { signal }),
  });
export const effectQuery = (disputeId: string, decision: Decision, along: boolean) =>
  queryOptions({
    queryKey: ['disputes', 'case', disputeId, 'effect', decision, along],
    queryFn: ({ signal }) =>
      api.get<RulingEffect>(at(disputeId, `/effect?decision=${decision}&along=${along}`), { signal }),
  });

export const revealNames = (disputeId: string) => api.post<DisputeNames>(at(disputeId, '/names'));
export const makeRuling = (disputeId: string, decision: Decision, reason: string, along: boolean) =>
  api.post<void>(at(disputeId, '/ruling'), { decision, reason, along });
export const askAuthor = (disputeId: string, question: string) =>
  api.post<void>(at(disputeId, '/question'), { question });
