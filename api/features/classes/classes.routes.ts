import {
  aliasSchema,
  classSettingsSchema,
  conflictPairSchema,
  decideSchema,
  invitationsSchema,
  memberRoleSchema,
  newClassSchema,
  rosterCsvSchema,
} from '../../../shared/schemas/class.ts';
import {
  acceptInvitationSchema,
  joinByCodeSchema,
  signUpByMailSchema,
  signUpByNameSchema,
} from '../../../shared/schemas/people.ts';
import { reply, route, type Route } from '../../http/route.ts';
import type { ClassesService } from './classes.service.ts';
import type { JoiningService } from './joining.service.ts';
import type { MembersService } from './members.service.ts';

export interface ClassServices {
  readonly classes: ClassesService;
  readonly members: MembersService;
  readonly joining: JoiningService;
}

export function classRoutes({ classes, members, joining }: ClassServices): Route[] {
  return [...joiningRoutes(joining), ...classesRoutes(classes), ...ownPlaceRoutes(classes), ...memberRoutes(members)];
}

function joiningRoutes(joining: JoiningService): Route[] {
  return [
    route({
      method: 'post',
      path: '/class-code',
      who: 'anyone',
      body: joinByCodeSchema,
      triesPerMinute: 60,
      handle: ({ body }) => joining.findClassOfCode(body.code),
    }),
    route({
      method: 'post',
      path: '/sign-up/by-mail',
      who: 'anyone',
      body: signUpByMailSchema,
      triesPerMinute: 60,
      handle: async ({ body }) => {
        await joining.signUpByMail(body.code, body.email);
        return reply({ status: 202 });
      },
    }),
    route({
      method: 'post',
      path: '/sign-up/by-name',
      who: 'anyone',
      body: signUpByNameSchema,
      triesPerMinute: 60,
      handle: async ({ body, userAgent }) =>
        reply({ status: 201, sessionCookie: await joining.signUpByName(body.code, body, userAgent), body: {} }),
    }),
    route({
      method: 'post',
      path: '/join-requests',
      who: 'signed-in',
      body: joinByCodeSchema,
      triesPerMinute: 60,
      handle: async ({ viewer, body }) => reply({ status: 201, body: await joining.joinByCode(viewer, body.code) }),
    }),
    route({
      method: 'get',
      path: '/invitations/:token',
      who: 'anyone',
      triesPerMinute: 120,
      handle: ({ params }) => joining.findInvitation(params['token'] ?? ''),
    }),
    route({
      method: 'post',
      path: '/invitations/:token/account',
      who: 'anyone',
      body: acceptInvitationSchema,
      triesPerMinute: 60,
      handle: async ({ params, body, userAgent }) =>
        reply({
          status: 201,
          sessionCookie: await joining.acceptInvitation(params['token'] ?? '', body, userAgent),
          body: {},
        }),
    }),
    route({
      method: 'post',
      path: '/invitations/:token/accept',
      who: 'signed-in',
      triesPerMinute: 60,
      handle: ({ viewer, params }) => joining.acceptSignedIn(viewer, params['token'] ?? ''),
    }),
  ];
}

function classesRoutes(classes: ClassesService): Route[] {
  return [
    route({ method: 'get', path: '/classes', who: 'signed-in', handle: ({ viewer }) => classes.listClasses(viewer) }),
    route({
      method: 'post',
      path: '/classes',
      who: 'teacher',
      body: newClassSchema,
      handle: async ({ viewer, body }) => reply({ status: 201, body: await classes.createClass(viewer, body) }),
    }),
    route({
      method: 'get',
      path: '/classes/:classId',
      who: 'teacher',
      handle: ({ viewer, params }) => classes.getClass(viewer, id(params, 'classId')),
    }),
    route({
      method: 'patch',
      path: '/classes/:classId',
      who: 'teacher',
      body: classSettingsSchema,
      handle: ({ viewer, params, body }) => classes.changeSettings(viewer, id(params, 'classId'), body),
    }),
    route({
      method: 'post',
      path: '/classes/:classId/code',
      who: 'teacher',
      handle: ({ viewer, params }) => classes.renewCode(viewer, id(params, 'classId')),
    }),
    route({
      method: 'post',
      path: '/classes/:classId/term',
      who: 'teacher',
      handle: ({ viewer, params }) => classes.startTerm(viewer, id(params, 'classId')),
    }),
    route({
      method: 'post',
      path: '/classes/:classId/archive',
      who: 'teacher',
      handle: ({ viewer, params }) => classes.setArchived(viewer, id(params, 'classId'), true),
    }),
    route({
      method: 'delete',
      path: '/classes/:classId/archive',
      who: 'teacher',
      handle: ({ viewer, params }) => classes.setArchived(viewer, id(params, 'classId'), false),
    }),
  ];
}

function ownPlaceRoutes(classes: ClassesService): Route[] {
  return [
    route({
      method: 'get',
      path: '/classes/:classId/me',
      who: 'student',
      handle: ({ viewer, params }) => classes.getOwnPlace(viewer, id(params, 'classId')),
    }),
    route({
      method: 'get',
      path: '/classes/:classId/aliases',
      who: 'student',
      handle: ({ viewer, params }) => classes.offerAliases(viewer, id(params, 'classId')),
    }),
    route({
      method: 'put',
      path: '/classes/:classId/alias',
      who: 'student',
      body: aliasSchema,
      handle: ({ viewer, params, body }) => classes.changeAlias(viewer, id(params, 'classId'), body.alias),
    }),
  ];
}

function memberRoutes(members: MembersService): Route[] {
  return [
    route({
      method: 'post',
      path: '/classes/:classId/requests/:requestId',
      who: 'teacher',
      body: decideSchema,
      handle: ({ viewer, params, body }) =>
        members.decideRequest(viewer, id(params, 'classId'), id(params, 'requestId'), body.accept),
    }),
    route({
      method: 'post',
      path: '/classes/:classId/invitations',
      who: 'teacher',
      body: invitationsSchema,
      handle: async ({ viewer, params, body }) =>
        reply({ status: 201, body: await members.invite(viewer, id(params, 'classId'), body) }),
    }),
    route({
      method: 'delete',
      path: '/classes/:classId/invitations/:invitationId',
      who: 'teacher',
      handle: ({ viewer, params }) =>
        members.revokeInvitation(viewer, id(params, 'classId'), id(params, 'invitationId')),
    }),
    route({
      method: 'put',
      path: '/classes/:classId/roster',
      who: 'teacher',
      body: rosterCsvSchema,
      handle: ({ viewer, params, body }) => members.importRoster(viewer, id(params, 'classId'), body.csv),
    }),
    route({
      method: 'patch',
      path: '/classes/:classId/members/:membershipId',
      who: 'teacher',
      body: memberRoleSchema,
      handle: ({ viewer, params, body }) =>
        members.changeRole(viewer, id(params, 'classId'), id(params, 'membershipId'), body.role),
    }),
    route({
      method: 'delete',
      path: '/classes/:classId/members/:membershipId',
      who: 'teacher',
      handle: ({ viewer, params }) => members.removeMember(viewer, id(params, 'classId'), id(params, 'membershipId')),
    }),
    route({
      method: 'post',
      path: '/classes/:classId/members/:membershipId/sign-in-code',
      who: 'teacher',
      triesPerMinute: 40,
      handle: ({ viewer, params }) =>
        members.issueSignInCode(viewer, id(params, 'classId'), id(params, 'membershipId')),
    }),
    route({
      method: 'post',
      path: '/classes/:classId/pairs',
      who: 'teacher',
      body: conflictPairSchema,
      handle: async ({ viewer, params, body }) =>
        reply({ status: 201, body: await members.addPair(viewer, id(params, 'classId'), body) }),
    }),
    route({
      method: 'delete',
      path: '/classes/:classId/pairs/:pairId',
      who: 'teacher',
      handle: ({ viewer, params }) => members.removePair(viewer, id(params, 'classId'), id(params, 'pairId')),
    }),
  ];
}

function id(params: Readonly<Record<string, string>>, name: string): string {
  return params[name] ?? '';
}
