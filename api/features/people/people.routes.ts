import {
  changeEmailSchema,
  changeNameSchema,
  changePasswordSchema,
  newPasswordFormSchema,
  resetRequestSchema,
  signInCodeSchema,
  signInSchema,
} from '../../../shared/schemas/people.ts';
import { reply, route, type Route } from '../../http/route.ts';
import type { PeopleService } from './people.service.ts';

/** A whole class signs in at once from one address, so the tries an address has are wide; the service counts tries a person. */
export function peopleRoutes(people: PeopleService): Route[] {
  return [...sessionRoutes(people), ...secretRoutes(people), ...accountRoutes(people)];
}

function sessionRoutes(people: PeopleService): Route[] {
  return [
    route({ method: 'get', path: '/me', who: 'signed-in', handle: ({ viewer }) => people.findViewer(viewer) }),
    route({
      method: 'post',
      path: '/session',
      who: 'anyone',
      body: signInSchema,
      triesPerMinute: 120,
      handle: async ({ body, ip, userAgent }) => signedIn(await people.signIn({ ...body, ip, userAgent })),
    }),
    route({
      method: 'delete',
      path: '/session',
      who: 'signed-in',
      handle: async ({ viewer }) => {
        await people.signOut(viewer);
        return reply({ sessionCookie: null });
      },
    }),
    route({
      method: 'delete',
      path: '/sessions',
      who: 'signed-in',
      handle: async ({ viewer }) => {
        await people.signOutEverywhere(viewer);
        return reply({ sessionCookie: null });
      },
    }),
  ];
}

function secretRoutes(people: PeopleService): Route[] {
  return [
    route({
      method: 'post',
      path: '/resets',
      who: 'anyone',
      body: resetRequestSchema,
      triesPerMinute: 40,
      handle: async ({ body }) => {
        await people.askForReset(body.email);
        return reply({ status: 202 });
      },
    }),
    route({
      method: 'post',
      path: '/resets/:token',
      who: 'anyone',
      body: newPasswordFormSchema,
      triesPerMinute: 60,
      handle: async ({ params, body, userAgent }) =>
        signedIn(await people.resetPassword(params['token'] ?? '', body.password, userAgent)),
    }),
    route({
      method: 'post',
      path: '/session/by-code',
      who: 'anyone',
      body: signInCodeSchema,
      triesPerMinute: 60,
      handle: async ({ body, userAgent }) =>
        signedIn(await people.signInByCode(body.name, body.code, body.password, userAgent)),
    }),
    route({
      method: 'post',
      path: '/email-changes/:token',
      who: 'anyone',
      triesPerMinute: 60,
      handle: ({ params }) => people.changeEmail(params['token'] ?? ''),
    }),
  ];
}

function accountRoutes(people: PeopleService): Route[] {
  return [
    route({
      method: 'patch',
      path: '/account',
      who: 'signed-in',
      body: changeNameSchema,
      handle: ({ viewer, body }) => people.changeName(viewer, body.name),
    }),
    route({
      method: 'post',
      path: '/account/password',
      who: 'signed-in',
      body: changePasswordSchema,
      handle: async ({ viewer, body, userAgent }) =>
        signedIn(await people.changePassword(viewer, body.current, body.password, userAgent)),
    }),
    route({
      method: 'post',
      path: '/account/email',
      who: 'signed-in',
      body: changeEmailSchema,
      handle: async ({ viewer, body }) => {
        await people.askForEmailChange(viewer, body.email, body.password);
        return reply({ status: 202 });
      },
    }),
  ];
}

function signedIn(token: string) {
  return reply({ status: 204, sessionCookie: token });
}
