import {
  excuseSchema,
  extensionSchema,
  moreTimeSchema,
  roundChangeSchema,
  roundFormSchema,
  roundListSchema,
  stageMoveSchema,
} from '../../../shared/schemas/round.ts';
import { reply, route, type Call, type Route } from '../../http/route.ts';
import type { BoardService } from './board.service.ts';
import type { PeopleInRoundService } from './people-in-round.service.ts';
import type { RoundTimeService } from './round-time.service.ts';
import type { RoundsService } from './rounds.service.ts';
import type { TodayService } from './today.service.ts';

export interface RoundServices {
  readonly rounds: RoundsService;
  readonly people: PeopleInRoundService;
  readonly time: RoundTimeService;
  readonly board: BoardService;
  readonly today: TodayService;
}

export function roundsRoutes({ rounds, people, time, board, today }: RoundServices): Route[] {
  return [
    route({ method: 'get', path: '/today', who: 'signed-in', handle: ({ viewer }) => today.getToday(viewer) }),
    ...planningRoutes(rounds),
    ...runningRoutes(rounds, board),
    ...timeRoutes(time),
    ...peopleRoutes(people),
  ];
}

const roundId = ({ params }: Pick<Call, 'params'>): string => params['roundId'] ?? '';
const userId = ({ params }: Pick<Call, 'params'>): string => params['userId'] ?? '';

function planningRoutes(rounds: RoundsService): Route[] {
  return [
    route({
      method: 'get',
      path: '/rounds',
      who: 'signed-in',
      query: roundListSchema,
      handle: ({ viewer, query }) => rounds.listRounds(viewer, query.classId ?? null),
    }),
    route({
      method: 'get',
      path: '/round-choices',
      who: 'teacher',
      handle: ({ viewer }) => rounds.listChoices(viewer),
    }),
    route({
      method: 'post',
      path: '/rounds',
      who: 'teacher',
      body: roundFormSchema,
      handle: async ({ viewer, body }) => reply({ status: 201, body: await rounds.planRound(viewer, body) }),
    }),
    route({
      method: 'get',
      path: '/rounds/:roundId',
      who: 'signed-in',
      handle: (call) => rounds.getRound(call.viewer, roundId(call)),
    }),
    route({
      method: 'put',
      path: '/rounds/:roundId',
      who: 'teacher',
      body: roundChangeSchema,
      handle: (call) => rounds.changeRound(call.viewer, roundId(call), call.body),
    }),
    route({
      method: 'delete',
      path: '/rounds/:roundId',
      who: 'teacher',
      handle: (call) => rounds.deleteRound(call.viewer, roundId(call)),
    }),
  ];
}

function runningRoutes(rounds: RoundsService, board: BoardService): Route[] {
  return [
    route({
      method: 'get',
      path: '/rounds/:roundId/board',
      who: 'signed-in',
      handle: (call) => board.getBoard(call.viewer, roundId(call)),
    }),
    route({
      method: 'get',
      path: '/rounds/:roundId/next',
      who: 'teacher',
      handle: (call) => rounds.previewNext(call.viewer, roundId(call)),
    }),
    route({
      method: 'post',
      path: '/rounds/:roundId/stage',
      who: 'teacher',
      body: stageMoveSchema,
      handle: (call) => rounds.moveByHand(call.viewer, roundId(call), call.body),
    }),
  ];
}

function timeRoutes(time: RoundTimeService): Route[] {
  return [
    route({
      method: 'post',
      path: '/rounds/:roundId/more-time',
      who: 'teacher',
      body: moreTimeSchema,
      handle: (call) => time.giveMoreTime(call.viewer, roundId(call), call.body),
    }),
    route({
      method: 'post',
      path: '/rounds/:roundId/late-batch',
      who: 'teacher',
      handle: (call) => time.dealLateNow(call.viewer, roundId(call)),
    }),
  ];
}

function peopleRoutes(people: PeopleInRoundService): Route[] {
  return [
    route({
      method: 'put',
      path: '/rounds/:roundId/people/:userId/extension',
      who: 'teacher',
      body: extensionSchema,
      handle: (call) => people.extend(call.viewer, roundId(call), userId(call), call.body),
    }),
    route({
      method: 'delete',
      path: '/rounds/:roundId/people/:userId/extension',
      who: 'teacher',
      handle: (call) => people.endExtension(call.viewer, roundId(call), userId(call)),
    }),
    route({
      method: 'put',
      path: '/rounds/:roundId/people/:userId/excuse',
      who: 'teacher',
      body: excuseSchema,
      handle: (call) => people.excuse(call.viewer, roundId(call), userId(call), call.body),
    }),
  ];
}
