import { queryOptions } from '@tanstack/react-query';
import type { StandingsAnswer } from '../../../shared/schemas/standings.ts';
import { api } from '../../lib/api.ts';

const at = (classId: string, act = '') => `/api/classes/${encodeURIComponent(classId)}/standings${act}`;

export const standingsQuery = (classId: string) =>
  queryOptions({
    queryKey: ['standings', classId],
    queryFn: ({ signal }) => api.get<StandingsAnswer>(at(classId), { signal }),
  });

export const setOptOut = (classId: string, optOut: boolean) =>
  api.put<StandingsAnswer>(at(classId, '/opt-out'), { optOut });
