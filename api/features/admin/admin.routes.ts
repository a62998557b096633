import {
  peopleQuerySchema,
  personStateSchema,
  schoolSettingsSchema,
  staffInvitationSchema,
  trailQuerySchema,
} from '../../../shared/schemas/admin.ts';
import { reply, route, type Route } from '../../http/route.ts';
import type { AdminService } from './admin.service.ts';

export function adminRoutes(admin: AdminService): Route[] {
  return [
    route({ method: 'get', path: '/admin/school', who: 'admin', handle: ({ viewer }) => admin.getSchool(viewer) }),
    route({
      method: 'put',
      path: '/admin/school',
      who: 'admin',
      body: schoolSettingsSchema,
      handle: ({ viewer, body }) => admin.changeSchool(viewer, body),
    }),
    route({
      method: 'get',
      path: '/admin/people',
      who: 'admin',
      query: peopleQuerySchema,
      handle: ({ viewer, query }) => admin.listPeople(viewer, query.search),
    }),
    route({
      method: 'put',
      path: '/admin/people/:personId/state',
      who: 'admin',
      body: personStateSchema,
      handle: ({ viewer, params, body }) => admin.setDisabled(viewer, params['personId'] ?? '', body),
    }),
    route({
      method: 'post',
      path: '/admin/invitations',
      who: 'admin',
      body: staffInvitationSchema,
      handle: async ({ viewer, body }) => {
        await admin.inviteStaff(viewer, body);
        return reply({ status: 201, body: {} });
      },
    }),
    route({
      method: 'get',
      path: '/admin/trail',
      who: 'admin',
      query: trailQuerySchema,
      handle: ({ viewer, query }) => admin.listTrail(viewer, query),
    }),
    route({ method: 'get', path: '/admin/mail', who: 'admin', handle: ({ viewer }) => admin.getMailState(viewer) }),
  ];
}
