import type { FieldError, Problem, ProblemType } from '../../shared/schemas/problem.ts';
import { PROBLEMS } from '../../shared/schemas/problem.ts';

/** What a request can fail with: a problem that the server named, or no connection to it. */
export type ApiProblemType = ProblemType | 'offline';

/** A request that did not succeed; switch on `type`, show `title` and `detail`. */
export class ApiProblem extends Error {
  override readonly name = 'ApiProblem';
  readonly type: ApiProblemType;
  readonly title: string;
  /** HTTP status; 0 when the server could not be reached. */
  readonly status: number;
  readonly detail: string | undefined;
  readonly errors: readonly FieldError[];
  readonly requestId: string | undefined;
  readonly extra: Readonly<Record<string, unknown>>;

  constructor(problem: Omit<Problem, 'type'> & { readonly type: ApiProblemType }, options?: ErrorOptions) {
    super(problem.detail ?? problem.title, options);
    this.type = problem.type;
    this.title = problem.title;
    this.status = problem.status;
    this.detail = problem.detail;
    this.errors = problem.errors ?? [];
    this.requestId = problem.requestId;
    this.extra = problem.extra ?? {};
  }
}

export interface RequestOptions {
  readonly signal?: AbortSignal;
  /** Sent as `Idempotency-Key`, so that a repeated send counts once. */
  readonly idempotencyKey?: string;
  readonly headers?: Readonly<Record<string, string>>;
}

type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';

const OFFLINE: Omit<Problem, 'type'> & { type: 'offline' } = {
  type: 'offline',
  title: 'No connection',
  status: 0,
  detail: 'The school’s server did not answer. Nothing you typed is lost.',
};

function isAbort(error: unknown): boolean {
  return error instanceof DOMException && error.name === 'AbortError';
}

function problemTypeOf(status: number): ProblemType {
  const types = Object.keys(PROBLEMS) as ProblemType[];
  return types.find((type) => PROBLEMS[type].status === status) ?? (status >= 500 ? 'unexpected' : 'bad-request');
}

async function toApiProblem(response: Response): Promise<ApiProblem> {
  const isProblem = (response.headers.get('content-type') ?? '').startsWith('application/problem+json');
  if (isProblem) return new ApiProblem((await response.json()) as Problem);
  // A gateway in front of the server answers in its own words: they say nothing to the reader.
  const type = problemTypeOf(response.status);
  return new ApiProblem({ type, title: PROBLEMS[type].title, status: response.status });
}

function toInit(method: Method, body: unknown, options: RequestOptions): RequestInit {
  const headers: Record<string, string> = { accept: 'application/json', ...options.headers };
  const isRaw = body instanceof FormData || body instanceof Blob;
  if (body !== undefined && !isRaw) headers['content-type'] = 'application/json';
  if (options.idempotencyKey) headers['idempotency-key'] = options.idempotencyKey;
  return {
    method,
    headers,
    credentials: 'same-origin',
    ...(options.signal ? { signal: options.signal } : {}),
    ...(body === undefined ? {} : { body: isRaw ? body : JSON.stringify(body) }),
  };
}

async function send<T>(method: Method, path: string, body?: unknown, options: RequestOptions = {}): Promise<T> {
  let response: Response;
  try {
    response = await fetch(path, toInit(method, body, options));
  } catch (error) {
    if (isAbort(error)) throw error;
    throw new ApiProblem(OFFLINE, { cause: error });
  }
  if (!response.ok) throw await toApiProblem(response);
  if (response.status === 204 || response.headers.get('content-length') === '0') return undefined as T;
  const isJson = (response.headers.get('content-type') ?? '').includes('json');
  return (isJson ? await response.json() : await response.text()) as T;
}

/** Requests to the application's own server; each rejects with `ApiProblem`, or with `AbortError` when its signal fires. */
export const api = {
  get: <T>(path: string, options?: RequestOptions) => send<T>('GET', path, undefined, options),
  post: <T>(path: string, body?: unknown, options?: RequestOptions) => send<T>('POST', path, body, options),
  put: <T>(path: string, body?: unknown, options?: RequestOptions) => send<T>('PUT', path, body, options),
  patch: <T>(path: string, body?: unknown, options?: RequestOptions) => send<T>('PATCH', path, body, options),
  delete: <T>(path: string, body?: unknown, options?: RequestOptions) => send<T>('DELETE', path, body, options),
};
