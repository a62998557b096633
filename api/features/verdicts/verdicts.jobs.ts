import { z } from 'zod';
import { job, type JobKind } from '../../lib/queue.ts';
import { CHECK_JOB, type VerdictsService } from './verdicts.service.ts';

/** One check a job; safe to run twice. */
export function verdictsJobs(service: Pick<VerdictsService, 'checkVersion'>): JobKind[] {
  return [
    job({
      name: CHECK_JOB,
      data: z.object({ versionId: z.uuid() }),
      parallel: 2,
      pollSeconds: 1,
      handle: ({ versionId }) => service.checkVersion(versionId),
    }),
  ];
}
