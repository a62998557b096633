import { contestPointsSchema } from '../../../shared/schemas/dispute.ts';
import { draftSaveSchema, findingSchema, setAsideSchema } from '../../../shared/schemas/finding.ts';
import { route, type Route } from '../../http/route.ts';
import type { ReviewsService } from './reviews.service.ts';

/** What a reviewer calls; each is answered to the reviewer alone. */
export function reviewsRoutes(reviews: ReviewsService): Route[] {
  const at = ({ params }: { params: Readonly<Record<string, string>> }) => params['reviewId'] ?? '';
  return [
    route({
      method: 'get',
      path: '/reviews/:reviewId',
      who: 'signed-in',
      handle: (call) => reviews.read(call.viewer, at(call)),
    }),
    route({
      method: 'put',
      path: '/reviews/:reviewId/draft',
      who: 'signed-in',
      body: draftSaveSchema,
      handle: (call) => reviews.saveDraft(call.viewer, at(call), call.body.draft, call.body.version),
    }),
    route({
      method: 'post',
      path: '/reviews/:reviewId/finding',
      who: 'signed-in',
      body: findingSchema,
      handle: (call) => reviews.handIn(call.viewer, at(call), call.body),
    }),
    route({
      method: 'post',
      path: '/reviews/:reviewId/take-back',
      who: 'signed-in',
      handle: (call) => reviews.takeBack(call.viewer, at(call)),
    }),
    route({
      method: 'post',
      path: '/reviews/:reviewId/set-aside',
      who: 'signed-in',
      body: setAsideSchema,
      handle: (call) => reviews.setAside(call.viewer, at(call), call.body.reason),
    }),
    route({
      method: 'post',
      path: '/reviews/:reviewId/contest',
      who: 'signed-in',
      body: contestPointsSchema,
      handle: (call) => reviews.contest(call.viewer, at(call), call.body.words),
    }),
  ];
}
