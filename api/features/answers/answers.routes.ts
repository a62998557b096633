import { contestVerdictSchema, questionAnswerSchema } from '../../../shared/schemas/dispute.ts';
import { answerSchema } from '../../../shared/schemas/finding.ts';
import { route, type Route } from '../../http/route.ts';
import type { AnswersService } from './answers.service.ts';

/** What an author calls; the teacher reads the same derivation from the other side. */
export function answersRoutes(answers: AnswersService): Route[] {
  return [
    route({
      method: 'get',
      path: '/derivations/:derivationId',
      who: 'signed-in',
      handle: ({ viewer, params }) => answers.read(viewer, params['derivationId'] ?? ''),
    }),
    route({
      method: 'put',
      path: '/findings/:authorKey/answer',
      who: 'signed-in',
      body: answerSchema,
      handle: ({ viewer, params, body }) => answers.answer(viewer, params['authorKey'] ?? '', body),
    }),
    route({
      method: 'post',
      path: '/derivations/:derivationId/contest',
      who: 'signed-in',
      body: contestVerdictSchema,
      handle: ({ viewer, params, body }) =>
        answers.contestVerdict(viewer, params['derivationId'] ?? '', body.step, body.words),
    }),
    route({
      method: 'post',
      path: '/derivations/:derivationId/question-answer',
      who: 'signed-in',
      body: questionAnswerSchema,
      handle: ({ viewer, params, body }) => answers.answerQuestion(viewer, params['derivationId'] ?? '', body.answer),
    }),
  ];
}
