import { z } from 'zod';
import {
  effectQuerySchema,
  overruleSchema,
  questionSchema,
  rulingFormSchema,
} from '../../../shared/schemas/dispute.ts';
import { route, type Route } from '../../http/route.ts';
import type { DisputesService } from './disputes.service.ts';

/** The desk, for the teachers and assistants of a class. */
export function disputesRoutes(disputes: DisputesService): Route[] {
  const at = ({ params }: { params: Readonly<Record<string, string>> }) => params['disputeId'] ?? '';
  return [
    route({
      method: 'get',
      path: '/disputes',
      who: 'signed-in',
      query: z.object({ classId: z.uuid().optional() }),
      handle: ({ viewer, query }) => disputes.list(viewer, query.classId),
    }),
    route({
      method: 'get',
      path: '/disputes/:disputeId',
      who: 'signed-in',
      handle: (call) => disputes.read(call.viewer, at(call)),
    }),
    route({
      method: 'post',
      path: '/disputes/:disputeId/names',
      who: 'signed-in',
      handle: (call) => disputes.revealNames(call.viewer, at(call)),
    }),
    route({
      method: 'get',
      path: '/disputes/:disputeId/effect',
      who: 'signed-in',
      query: effectQuerySchema,
      handle: (call) => disputes.findEffect(call.viewer, at(call), call.query.decision, call.query.along),
    }),
    route({
      method: 'post',
      path: '/disputes/:disputeId/ruling',
      who: 'signed-in',
      body: rulingFormSchema,
      handle: (call) => disputes.rule(call.viewer, at(call), call.body),
    }),
    route({
      method: 'post',
      path: '/disputes/:disputeId/question',
      who: 'signed-in',
      body: questionSchema,
      handle: (call) => disputes.ask(call.viewer, at(call), call.body.question),
    }),
    route({
      method: 'post',
      path: '/derivations/:derivationId/ruling',
      who: 'signed-in',
      body: overruleSchema,
      handle: ({ viewer, params, body }) => disputes.overrule(viewer, params['derivationId'] ?? '', body),
    }),
  ];
}
