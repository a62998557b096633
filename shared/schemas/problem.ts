/** The kinds of problem the API answers with, as `application/problem+json` (RFC 9457); the client switches on `type`. */
export const PROBLEMS = {
  'bad-request': { status: 400, title: 'The request could not be read' },
  'invalid-fields': { status: 422, title: 'Some fields need another look' },
  'signed-out': { status: 401, title: 'Sign in first' },
  'wrong-sign-in': { status: 401, title: 'The name and the password do not match' },
  'not-allowed': { status: 403, title: 'This is not open to you' },
  'cross-site': { status: 403, title: 'The request came from another site' },
  'not-found': { status: 404, title: 'There is nothing here' },
  conflict: { status: 409, title: 'This has changed in the meantime' },
  'wrong-stage': { status: 409, title: 'The round is not at the right stage for this' },
  'too-late': { status: 409, title: 'The time for this is over' },
  gone: { status: 410, title: 'This link or code is no longer valid' },
  'too-large': { status: 413, title: 'This is too large' },
  'too-many': { status: 429, title: 'Too many tries' },
  unexpected: { status: 500, title: 'Something went wrong on our side' },
  unavailable: { status: 503, title: 'The service is not available just now' },
} as const;

export type ProblemType = keyof typeof PROBLEMS;

export interface FieldError {
  /** JSON pointer into the request body, such as `/email`. */
  readonly pointer: string;
  readonly detail: string;
}

export interface Problem {
  readonly type: ProblemType;
  readonly title: string;
  readonly status: number;
  /** What happened this time and how to mend it. */
  readonly detail?: string;
  readonly errors?: readonly FieldError[];
  readonly requestId?: string;
  /** Further members that a problem type defines, such as the current version on a conflict. */
  readonly extra?: Readonly<Record<string, unknown>>;
}
