import { reply, route, type Route } from '../../http/route.ts';

export interface HealthDeps {
  readonly pingDatabase: () => Promise<unknown>;
  readonly workersHealthy: () => Promise<boolean>;
}

/** For load balancers and people on duty: 200 when all parts answer, else 503 with the part that does not. */
export function healthRoutes(deps: HealthDeps): Route[] {
  return [
    route({
      method: 'get',
      path: '/health',
      who: 'anyone',
      handle: async () => {
        const [database, workers] = await Promise.all([
          answers(async () => void (await deps.pingDatabase())),
          answers(deps.workersHealthy),
        ]);
        const state = { database: database ? 'up' : 'down', workers: workers ? 'up' : 'down' };
        return reply({ status: database && workers ? 200 : 503, body: state });
      },
    }),
  ];
}

const PATIENCE_MS = 2_000;

async function answers(ping: () => Promise<boolean | void>): Promise<boolean> {
  let timer: NodeJS.Timeout | undefined;
  const tooLong = new Promise<false>((resolve) => {
    timer = setTimeout(() => resolve(false), PATIENCE_MS);
  });
  const answer = ping().then(
    (healthy) => healthy !== false,
    () => false,
  );
  try {
    return await Promise.race([answer, tooLong]);
  } finally {
    clearTimeout(timer);
  }
}
