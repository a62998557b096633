import { queryOptions } from '@tanstack/react-query';
import { ApiProblem, api } from '../../lib/api.ts';

export interface ViewerClass {
  readonly id: string;
  readonly name: string;
  /** IANA name, such as `Europe/Berlin`. */
  readonly timeZone: string;
  readonly role: 'teacher' | 'assistant' | 'student';
  readonly alias: string | null;
}

/** Who is signed in, and where they belong. */
export interface Viewer {
  readonly user: {
    readonly id: string;
    readonly name: string;
    readonly role: 'admin' | 'teacher' | 'student';
    readonly email: string | null;
    readonly userName: string | null;
  };
  readonly school: { readonly id: string; readonly name: string };
  readonly classes: readonly ViewerClass[];
}

async function fetchViewer(signal: AbortSignal): Promise<Viewer | null> {
  try {
    return await api.get<Viewer>('/api/me', { signal });
  } catch (error) {
    if (error instanceof ApiProblem && error.type === 'signed-out') return null;
    throw error;
  }
}

/** The signed-in person, or null when nobody is. */
export const viewerQuery = queryOptions({
  queryKey: ['viewer'],
  queryFn: ({ signal }) => fetchViewer(signal),
  staleTime: 5 * 60_000,
});
