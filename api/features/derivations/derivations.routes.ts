import { handInSchema, saveSheetSchema } from '../../../shared/schemas/derivation.ts';
import { route, type Route } from '../../http/route.ts';
import type { DerivationsService } from './derivations.service.ts';
import type { MendService } from './mend.service.ts';

export function derivationsRoutes(sheets: DerivationsService, mends: MendService): Route[] {
  return [
    route({
      method: 'get',
      path: '/rounds/:roundId/sheet',
      who: 'student',
      handle: ({ params, viewer }) => sheets.readSheet(params['roundId'] ?? '', viewer),
    }),
    route({
      method: 'put',
      path: '/rounds/:roundId/sheet',
      who: 'student',
      body: saveSheetSchema,
      handle: ({ params, viewer, body }) => sheets.save(params['roundId'] ?? '', viewer, body),
    }),
    route({
      method: 'get',
      path: '/rounds/:roundId/sheet/preview',
      who: 'student',
      handle: ({ params, viewer }) => sheets.preview(params['roundId'] ?? '', viewer),
    }),
    route({
      method: 'post',
      path: '/rounds/:roundId/sheet/hand-in',
      who: 'student',
      body: handInSchema,
      handle: ({ params, viewer, body }) => sheets.handIn(params['roundId'] ?? '', viewer, body.draftVersion),
    }),
    route({
      method: 'post',
      path: '/rounds/:roundId/sheet/take-back',
      who: 'student',
      handle: ({ params, viewer }) => sheets.takeBack(params['roundId'] ?? '', viewer),
    }),
    route({
      method: 'get',
      path: '/derivations/:derivationId/mend',
      who: 'student',
      handle: ({ params, viewer }) => mends.readMend(params['derivationId'] ?? '', viewer),
    }),
    route({
      method: 'put',
      path: '/derivations/:derivationId/mend',
      who: 'student',
      body: saveSheetSchema,
      handle: ({ params, viewer, body }) => mends.save(params['derivationId'] ?? '', viewer, body),
    }),
    route({
      method: 'post',
      path: '/derivations/:derivationId/mend/hand-in',
      who: 'student',
      body: handInSchema,
      triesPerMinute: 20,
      handle: ({ params, viewer, body }) => mends.handIn(params['derivationId'] ?? '', viewer, body.draftVersion),
    }),
  ];
}
