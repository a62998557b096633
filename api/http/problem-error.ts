import type { FieldError, ProblemType } from '../../shared/schemas/problem.ts';

export interface ProblemDetails {
  readonly detail?: string;
  readonly errors?: readonly FieldError[];
  readonly extra?: Readonly<Record<string, unknown>>;
  readonly cause?: unknown;
}

/** Thrown by services and routes; the last middleware turns it into problem+json. */
export class ProblemError extends Error {
  readonly type: ProblemType;
  readonly details: ProblemDetails;

  constructor(type: ProblemType, details: ProblemDetails = {}) {
    super(details.detail ?? type, { cause: details.cause });
    this.name = 'ProblemError';
    this.type = type;
    this.details = details;
  }
}

/** "Not yours" and "not there" answer the same. */
export function notFound(): ProblemError {
  return new ProblemError('not-found');
}
