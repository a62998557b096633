import { REPLY, type MarkedReply, type Route, type Viewer } from '../../http/route.ts';

type Method = Route['method'];

/** Does one thing as one person, by the same routes and with the same checks of what is sent as over HTTP. */
export interface RouteCaller {
  call<Answer = unknown>(viewer: Viewer, method: Method, path: string, body?: object): Promise<Answer>;
}

/** Calls routes without HTTP in between; paths are below /api and may carry a query. */
export function createRouteCaller(routes: readonly Route[]): RouteCaller {
  const table = routes.map((route) => ({ route, pattern: toPattern(route.path) }));
  return {
    async call<Answer>(viewer: Viewer, method: Method, path: string, body?: object) {
      const [plain = '', search = ''] = path.split('?');
      for (const { route, pattern } of table) {
        const match = route.method === method ? pattern.exec(plain) : null;
        if (!match) continue;
        if (route.who !== 'anyone' && route.who !== 'signed-in' && route.who !== viewer.role) {
          throw new Error(`${method} ${path} is for a ${route.who}, not for a ${viewer.role}`);
        }
        const answer = await route.handle({
          viewer,
          params: match.groups ?? {},
          query: route.query?.parse(Object.fromEntries(new URLSearchParams(search))),
          body: route.body?.parse(body ?? {}),
          ip: '127.0.0.1',
          userAgent: 'demo',
          requestId: 'demo',
        } as never);
        return (isReply(answer) ? answer.body : answer) as Answer;
      }
      throw new Error(`There is no route ${method} ${path}`);
    },
  };
}

function toPattern(path: string): RegExp {
  return new RegExp(`^${path.replace(/:(\w+)/g, '(?<$1>[^/]+)')}$`);
}

function isReply(answer: unknown): answer is MarkedReply {
  return typeof answer === 'object' && answer !== null && REPLY in answer;
}
