import { mailPreferenceSchema } from '../../../shared/schemas/mail.ts';
import { reply, route, type Route } from '../../http/route.ts';
import type { MailService } from './mail.service.ts';
import { toUnsubscribePage } from './unsubscribe-page.ts';

export function mailRoutes(service: MailService): Route[] {
  return [
    route({
      method: 'get',
      path: '/mail-preferences',
      who: 'signed-in',
      handle: async ({ viewer }) => ({ preferences: await service.listPreferences(viewer) }),
    }),
    route({
      method: 'put',
      path: '/mail-preferences',
      who: 'signed-in',
      body: mailPreferenceSchema,
      handle: ({ viewer, body }) => service.setPreference(viewer, body.kind, body.wanted),
    }),
    // Mail programs and their virus scanners follow links by themselves, so a GET changes nothing.
    route({
      method: 'get',
      path: '/unsubscribe/:token',
      who: 'anyone',
      handle: async ({ params: { token = '' } }) => {
        const { words } = service.readUnsubscription(token);
        return reply({ text: { type: 'html', content: toUnsubscribePage({ words, done: false }) } });
      },
    }),
    route({
      method: 'post',
      path: '/unsubscribe/:token',
      who: 'anyone',
      fromAnywhere: true,
      handle: async ({ params: { token = '' } }) => {
        const { words } = await service.unsubscribe(token);
        return reply({ text: { type: 'html', content: toUnsubscribePage({ words, done: true }) } });
      },
    }),
  ];
}
