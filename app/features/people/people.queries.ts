import { queryOptions } from '@tanstack/react-query';
import type { InvitationAnswer, SignIn } from '../../../shared/schemas/people.ts';
import { api } from '../../lib/api.ts';

export const invitationQuery = (token: string) =>
  queryOptions({
    queryKey: ['invitation', token],
    queryFn: ({ signal }) => api.get<InvitationAnswer>(`/api/invitations/${encodeURIComponent(token)}`, { signal }),
    retry: false,
    staleTime: Infinity,
  });

export interface NewAccount {
  readonly name: string;
  readonly userName?: string | undefined;
  readonly password: string;
}

export const people = {
  signIn: (form: SignIn) => api.post<void>('/api/session', form),
  signInByCode: (form: { name: string; code: string; password: string }) =>
    api.post<void>('/api/session/by-code', form),
  signOut: () => api.delete<void>('/api/session'),
  signOutEverywhere: () => api.delete<void>('/api/sessions'),
  findClassOfCode: (code: string) => api.post<{ className: string; hasEmail: boolean }>('/api/class-code', { code }),
  signUpByMail: (code: string, email: string) => api.post<void>('/api/sign-up/by-mail', { code, email }),
  signUpByName: (form: NewAccount & { code: string }) => api.post<void>('/api/sign-up/by-name', form),
  joinByCode: (code: string) => api.post<{ accepted: boolean; className: string }>('/api/join-requests', { code }),
  makeAccount: (token: string, form: NewAccount) =>
    api.post<void>(`/api/invitations/${encodeURIComponent(token)}/account`, form),
  acceptInvitation: (token: string) => api.post<void>(`/api/invitations/${encodeURIComponent(token)}/accept`),
  askForReset: (email: string) => api.post<void>('/api/resets', { email }),
  resetPassword: (token: string, password: string) =>
    api.post<void>(`/api/resets/${encodeURIComponent(token)}`, { password }),
  changeName: (name: string) => api.patch<void>('/api/account', { name }),
  changePassword: (current: string, password: string) => api.post<void>('/api/account/password', { current, password }),
  changeEmail: (email: string, password: string) => api.post<void>('/api/account/email', { email, password }),
  confirmEmail: (token: string) => api.post<void>(`/api/email-changes/${encodeURIComponent(token)}`),
};
