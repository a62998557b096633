import { vi } from 'vitest';
import type { Problem } from '../../shared/schemas/problem.ts';

export interface FakeCall {
  readonly what: string;
  readonly body: unknown;
}

/** What a fake address answers with instead of its body. */
export class FakeProblem {
  constructor(readonly problem: Problem) {}
}

type Answer = object | string | number | null | undefined | ((body: unknown) => unknown);

/**
 * Stands in for the server: answers by `GET /api/today` and the like, keeps what was asked. An address that is not
 * listed answers 404. Undo with `vi.unstubAllGlobals()`.
 */
export function fakeApi(answers: Readonly<Record<string, Answer>>): FakeCall[] {
  const calls: FakeCall[] = [];
  vi.stubGlobal('fetch', async (path: string, init: RequestInit) => {
    const what = `${init.method} ${path}`;
    const body: unknown = typeof init.body === 'string' ? JSON.parse(init.body) : undefined;
    calls.push({ what, body });
    if (!(what in answers))
      return toResponse(new FakeProblem({ type: 'not-found', title: 'There is nothing here', status: 404 }));
    const answer = answers[what];
    return toResponse(typeof answer === 'function' ? answer(body) : answer);
  });
  return calls;
}

function toResponse(answer: unknown): Response {
  if (answer === undefined) return new Response(null, { status: 204 });
  if (!(answer instanceof FakeProblem)) return Response.json(answer);
  const headers = { 'content-type': 'application/problem+json' };
  return new Response(JSON.stringify(answer.problem), { status: answer.problem.status, headers });
}
