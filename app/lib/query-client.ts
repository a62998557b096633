import { QueryClient } from '@tanstack/react-query';
import { ApiProblem } from './api.ts';

const RETRIES = 2;

/** Asking again helps only where the connection or the server failed, never where the request was refused. */
export function shouldRetry(failureCount: number, error: unknown): boolean {
  if (error instanceof ApiProblem && error.status >= 400 && error.status < 500) return false;
  return failureCount < RETRIES;
}

/** The client's one store of what the server answered. */
export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: { retry: shouldRetry, staleTime: 30_000, refetchOnWindowFocus: true },
      mutations: { retry: false },
    },
  });
}

export const queryClient = createQueryClient();
