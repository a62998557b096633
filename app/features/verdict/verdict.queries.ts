import type { AuthorDerivation } from '../../../shared/schemas/review.ts';
import { api } from '../../lib/api.ts';

const at = (derivationId: string, act: string) => `/api/derivations/${encodeURIComponent(derivationId)}${act}`;

export const contestVerdict = (derivationId: string, step: number, words: string) =>
  api.post<AuthorDerivation>(at(derivationId, '/contest'), { step, words });
export const answerQuestion = (derivationId: string, answer: string) =>
  api.post<AuthorDerivation>(at(derivationId, '/question-answer'), { answer });
export const overrule = (derivationId: string, firstFault: number | null, reason: string) =>
  api.post<void>(at(derivationId, '/ruling'), { firstFault, reason });
