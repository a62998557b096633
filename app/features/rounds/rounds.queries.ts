import { queryOptions } from '@tanstack/react-query';
import type {
  BoardAnswer,
  ExtensionForm,
  MoreTime,
  RoundAnswer,
  RoundChange,
  RoundChoices,
  RoundForm,
  RoundListItem,
  StageMove,
  StagePreview,
} from '../../../shared/schemas/round.ts';
import { api } from '../../lib/api.ts';

const BOARD_EVERY_MS = 5_000;

export const roundChoicesQuery = queryOptions({
  queryKey: ['round-choices'],
  queryFn: ({ signal }) => api.get<RoundChoices>('/api/round-choices', { signal }),
});

export const classRoundsQuery = (classId: string) =>
  queryOptions({
    queryKey: ['rounds', 'of-class', classId],
    queryFn: ({ signal }) => api.get<readonly RoundListItem[]>(`/api/rounds?classId=${classId}`, { signal }),
  });

/** The board of a round; it keeps itself up to date while it is looked at. */
export const boardQuery = (roundId: string) =>
  queryOptions({
    queryKey: ['rounds', roundId, 'board'],
    queryFn: ({ signal }) => api.get<BoardAnswer>(`/api/rounds/${roundId}/board`, { signal }),
    refetchInterval: BOARD_EVERY_MS,
    staleTime: 0,
  });

/** What moving the round on would do, as it stands now. */
export const nextStageQuery = (roundId: string) =>
  queryOptions({
    queryKey: ['rounds', roundId, 'next'],
    queryFn: ({ signal }) => api.get<StagePreview>(`/api/rounds/${roundId}/next`, { signal }),
    staleTime: 0,
    gcTime: 0,
  });

export const planRound = (form: RoundForm) => api.post<{ readonly id: string }>('/api/rounds', form);

/** The teacher's acts on one round. */
export const roundActs = (roundId: string) => {
  const base = `/api/rounds/${roundId}`;
  return {
    change: (form: RoundChange) => api.put<RoundAnswer>(base, form),
    remove: () => api.delete<void>(base),
    move: (move: StageMove) => api.post<RoundAnswer>(`${base}/stage`, move),
    giveMoreTime: (form: MoreTime) => api.post<void>(`${base}/more-time`, form),
    dealLate: () => api.post<{ readonly reviews: number }>(`${base}/late-batch`),
    extend: (userId: string, form: ExtensionForm) => api.put<void>(`${base}/people/${userId}/extension`, form),
    endExtension: (userId: string) => api.delete<void>(`${base}/people/${userId}/extension`),
    excuse: (userId: string, form: { excused: boolean; reason: string }) =>
      api.put<void>(`${base}/people/${userId}/excuse`, form),
  };
};
