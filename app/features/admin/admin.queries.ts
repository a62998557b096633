import { queryOptions } from '@tanstack/react-query';
import type { MailStateAnswer, PersonAnswer, SchoolSettings, TrailAnswer } from '../../../shared/schemas/admin.ts';
import { api } from '../../lib/api.ts';

export const schoolQuery = queryOptions({
  queryKey: ['admin', 'school'],
  queryFn: ({ signal }) => api.get<SchoolSettings>('/api/admin/school', { signal }),
});
export const peopleQuery = (search: string) =>
  queryOptions({
    queryKey: ['admin', 'people', search],
    queryFn: ({ signal }) =>
      api.get<readonly PersonAnswer[]>(`/api/admin/people?search=${encodeURIComponent(search)}`, { signal }),
    placeholderData: (before) => before,
  });
export const trailQuery = (search: string, before: string | null) =>
  queryOptions({
    queryKey: ['admin', 'trail', search, before],
    queryFn: ({ signal }) => {
      const query = new URLSearchParams({ ...(search && { search }), ...(before && { before }) });
      return api.get<TrailAnswer>(`/api/admin/trail?${query}`, { signal });
    },
    placeholderData: (earlier) => earlier,
  });
export const mailStateQuery = queryOptions({
  queryKey: ['admin', 'mail'],
  queryFn: ({ signal }) => api.get<MailStateAnswer>('/api/admin/mail', { signal }),
});

export const adminActs = {
  changeSchool: (form: SchoolSettings) => api.put<void>('/api/admin/school', form),
  setDisabled: (personId: string, disabled: boolean, reason: string) =>
    api.put<void>(`/api/admin/people/${personId}/state`, { disabled, reason }),
  inviteStaff: (form: { name: string; email: string; role: 'teacher' | 'admin' }) =>
    api.post<void>('/api/admin/invitations', form),
};
