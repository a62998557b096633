import { z } from 'zod';
import { job, type JobKind } from '../../lib/queue.ts';
import { SEND_MAIL, type MailService } from './mail.service.ts';

/** Sending tries for about a day: mail servers are away for hours, and grey-list for minutes. */
export function mailJobs(service: MailService): JobKind[] {
  return [
    job({
      name: SEND_MAIL,
      data: z.object({ mailId: z.uuid() }),
      retryLimit: 11,
      retryDelaySeconds: 30,
      timeoutSeconds: 120,
      parallel: 2,
      pollSeconds: 1,
      handle: ({ mailId }) => service.sendMail(mailId),
    }),
    job({ name: 'sweep-mail', data: z.object({}), cron: '41 3 * * *', handle: () => service.sweepMail() }),
  ];
}
