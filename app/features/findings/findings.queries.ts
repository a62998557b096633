import { queryOptions } from '@tanstack/react-query';
import type { AnswerForm } from '../../../shared/schemas/finding.ts';
import type { AuthorDerivation, TeacherDerivation } from '../../../shared/schemas/review.ts';
import { api } from '../../lib/api.ts';

const at = (derivationId: string, act = '') => `/api/derivations/${encodeURIComponent(derivationId)}${act}`;

export const derivationQuery = (derivationId: string) =>
  queryOptions({
    queryKey: ['derivations', derivationId],
    queryFn: ({ signal }) => api.get<AuthorDerivation | TeacherDerivation>(at(derivationId), { signal }),
  });

export const answerFinding = (key: string, answer: AnswerForm) =>
  api.put<void>(`/api/findings/${encodeURIComponent(key)}/answer`, answer);
