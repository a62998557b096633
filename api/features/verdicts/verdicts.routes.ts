import { tryTaskSchema } from '../../../shared/schemas/derivation.ts';
import { route, type Route } from '../../http/route.ts';
import type { VerdictsService } from './verdicts.service.ts';

/** Only a teacher may have lines of their own choosing ruled on. */
export function verdictsRoutes(service: Pick<VerdictsService, 'tryTask'>): Route[] {
  return [
    route({
      method: 'post',
      path: '/tasks/try',
      who: 'teacher',
      body: tryTaskSchema,
      triesPerMinute: 60,
      handle: ({ body }) => service.tryTask(body),
    }),
  ];
}
