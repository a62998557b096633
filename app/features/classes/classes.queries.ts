import { queryOptions } from '@tanstack/react-query';
import type {
  ClassAnswer,
  ClassListItem,
  MemberAnswer,
  OwnPlaceAnswer,
  PersonLine,
  RosterProblem,
} from '../../../shared/schemas/class.ts';
import { api } from '../../lib/api.ts';

export const classesQuery = queryOptions({
  queryKey: ['classes'],
  queryFn: ({ signal }) => api.get<readonly ClassListItem[]>('/api/classes', { signal }),
});
export const classQuery = (classId: string) =>
  queryOptions({
    queryKey: ['classes', classId],
    queryFn: ({ signal }) => api.get<ClassAnswer>(`/api/classes/${classId}`, { signal }),
  });
export const ownPlaceQuery = (classId: string) =>
  queryOptions({
    queryKey: ['own-place', classId],
    queryFn: ({ signal }) => api.get<OwnPlaceAnswer>(`/api/classes/${classId}/me`, { signal }),
  });
export const aliasesQuery = (classId: string) =>
  queryOptions({
    queryKey: ['own-place', classId, 'aliases'],
    queryFn: ({ signal }) =>
      api.get<{ readonly aliases: readonly string[] }>(`/api/classes/${classId}/aliases`, { signal }),
    staleTime: Infinity,
  });

export interface InvitationLink {
  readonly name: string;
  readonly token: string;
}
export type ClassSettings = Partial<
  Pick<ClassAnswer, 'name' | 'timeZone' | 'hasEmail' | 'joinOpen' | 'standingsOn' | 'assistantsSeeNames'>
>;

/** The teacher's acts on one class. */
export const classActs = (classId: string) => {
  const base = `/api/classes/${classId}`;
  return {
    changeSettings: (form: ClassSettings) => api.patch<void>(base, form),
    renewCode: () => api.post<{ joinCode: string }>(`${base}/code`),
    startTerm: () => api.post<void>(`${base}/term`),
    archive: () => api.post<void>(`${base}/archive`),
    bringBack: () => api.delete<void>(`${base}/archive`),
    decide: (requestId: string, accept: boolean) => api.post<void>(`${base}/requests/${requestId}`, { accept }),
    invite: (role: MemberAnswer['role'], people: readonly PersonLine[]) =>
      api.post<{ links: readonly InvitationLink[] }>(`${base}/invitations`, { role, people }),
    revoke: (invitationId: string) => api.delete<void>(`${base}/invitations/${invitationId}`),
    importRoster: (csv: string) =>
      api.put<{ people: readonly PersonLine[]; problems: readonly RosterProblem[] }>(`${base}/roster`, { csv }),
    changeRole: (membershipId: string, role: MemberAnswer['role']) =>
      api.patch<void>(`${base}/members/${membershipId}`, { role }),
    remove: (membershipId: string) => api.delete<void>(`${base}/members/${membershipId}`),
    issueCode: (membershipId: string) =>
      api.post<{ code: string; expiresAt: string }>(`${base}/members/${membershipId}/sign-in-code`),
    addPair: (firstId: string, secondId: string, note: string) =>
      api.post<{ id: string }>(`${base}/pairs`, { firstId, secondId, note }),
    removePair: (pairId: string) => api.delete<void>(`${base}/pairs/${pairId}`),
  };
};
export const createClass = (form: { name: string; timeZone: string; hasEmail: boolean }) =>
  api.post<{ id: string }>('/api/classes', form);
export const changeAlias = (classId: string, alias: string) =>
  api.put<void>(`/api/classes/${classId}/alias`, { alias });
