import { z } from 'zod';
import { job, type JobKind } from '../../lib/queue.ts';
import type { StandingsService } from './standings.service.ts';

/** Looks every hour; a class gets its sheet in the first hour of the week that is not within a day of a settling. */
export function standingsJobs(standings: StandingsService): JobKind[] {
  return [
    job({
      name: 'standings-sheets',
      data: z.object({}),
      cron: '23 * * * *',
      handle: async () => {
        await standings.refresh();
      },
    }),
  ];
}
