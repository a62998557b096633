import { optOutSchema } from '../../../shared/schemas/standings.ts';
import { route, type Route } from '../../http/route.ts';
import type { StandingsService } from './standings.service.ts';

/** The list for everyone in a class; the own line to its owner. */
export function standingsRoutes(standings: StandingsService): Route[] {
  return [
    route({
      method: 'get',
      path: '/classes/:classId/standings',
      who: 'signed-in',
      handle: ({ viewer, params }) => standings.read(viewer, params['classId'] ?? ''),
    }),
    route({
      method: 'put',
      path: '/classes/:classId/standings/opt-out',
      who: 'signed-in',
      body: optOutSchema,
      handle: ({ viewer, params, body }) => standings.setOptOut(viewer, params['classId'] ?? '', body.optOut),
    }),
  ];
}
