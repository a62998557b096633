import type { MailCatcher } from '../../lib/mail-catcher.ts';
import { route, type Route } from '../../http/route.ts';

/** The demo's letters, for everybody who tries the demo; never mounted in production. */
export function mailboxRoutes(mailbox: Pick<MailCatcher, 'list'>): Route[] {
  return [
    route({
      method: 'get',
      path: '/mailbox',
      who: 'anyone',
      handle: async () => ({
        letters: mailbox
          .list()
          .map(({ id, receivedAt, to, subject, text, html }) => ({ id, receivedAt, to, subject, text, html })),
      }),
    }),
  ];
}
