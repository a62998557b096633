import type { ErrorRequestHandler, Request, Response } from 'express';
import { QueryFailedError } from 'typeorm';
import { ZodError } from 'zod';
import { PROBLEMS, type FieldError, type Problem } from '../../shared/schemas/problem.ts';
import type { Logger } from '../lib/logger.ts';
import { ProblemError } from './problem-error.ts';

/** What to say when a named unique constraint stopped a write; every other violation is our mistake (500). */
export type UniqueConflicts = Readonly<Record<string, { readonly pointer?: string; readonly detail: string }>>;

/** The last middleware: every error becomes `application/problem+json`, and nothing of its inside leaves. */
export function answerProblems(logger: Logger, conflicts: UniqueConflicts): ErrorRequestHandler {
  return (error: unknown, req, res, next) => {
    if (res.headersSent) return next(error);
    const problem = toProblemError(error, conflicts);
    if (PROBLEMS[problem.type].status >= 500) logger.error({ err: error, reqId: req.id }, 'request failed');
    sendProblem(req, res, problem);
  };
}

/** Maps whatever was thrown to one of the table's kinds. */
export function toProblemError(error: unknown, conflicts: UniqueConflicts): ProblemError {
  if (error instanceof ProblemError) return error;
  if (error instanceof ZodError) return new ProblemError('invalid-fields', { errors: toFieldErrors(error) });
  if (isConnectionLost(error)) return new ProblemError('unavailable', { cause: error });
  if (error instanceof QueryFailedError) return fromDatabase(error, conflicts);
  return fromExpress(error) ?? new ProblemError('unexpected', { cause: error });
}

/** All bad fields at once, each with a JSON pointer into what was sent. */
export function toFieldErrors(error: ZodError): FieldError[] {
  return error.issues.map((issue) => ({
    pointer: issue.path.map((part) => `/${String(part).replaceAll('~', '~0').replaceAll('/', '~1')}`).join(''),
    detail: issue.message,
  }));
}

function sendProblem(req: Request, res: Response, { type, details }: ProblemError): void {
  const problem: Problem = {
    type,
    ...PROBLEMS[type],
    ...(details.detail !== undefined && { detail: details.detail }),
    ...(details.errors && { errors: details.errors }),
    ...(details.extra && { extra: details.extra }),
    requestId: String(req.id),
  };
  const retryAfter = details.extra?.['retryAfterSeconds'];
  if (typeof retryAfter === 'number') res.setHeader('retry-after', String(retryAfter));
  res.status(problem.status).type('application/problem+json').send(JSON.stringify(problem));
}

function fromDatabase(error: QueryFailedError, conflicts: UniqueConflicts): ProblemError {
  const { code, constraint } = error.driverError as { code?: string; constraint?: string };
  if (code === '23505' && constraint && conflicts[constraint]) {
    const { pointer, detail } = conflicts[constraint];
    return new ProblemError('conflict', { detail, cause: error, ...(pointer && { errors: [{ pointer, detail }] }) });
  }
  // A NUL character, or half of a surrogate pair, in a text: PostgreSQL cannot keep it.
  if (code === '22021' || code === '22P05') return new ProblemError('bad-request', { cause: error });
  return new ProblemError('unexpected', { cause: error });
}

/** The database is not there: refused, cut off, shutting down, starting up, or all connections in use. */
function isConnectionLost(error: unknown): boolean {
  const cause: unknown = error instanceof QueryFailedError ? error.driverError : error;
  if (!(cause instanceof Error)) return false;
  const code = 'code' in cause ? String(cause.code) : '';
  return /^(ECONNREFUSED|ECONNRESET|EPIPE|ETIMEDOUT|57P0[1-3]|53300|08...)$/.test(code) || LOST.test(cause.message);
}

const LOST =
  /^(Connection terminated|timeout exceeded when trying to connect|Client has encountered a connection error)/;

/** Errors of Express and body-parser carry `status`, and `type` when a body could not be read. */
function fromExpress(error: unknown): ProblemError | null {
  if (!(error instanceof Error) || !('status' in error)) return null;
  if (error.status === 413) return new ProblemError('too-large', { cause: error });
  if (error.status === 404) return new ProblemError('not-found', { cause: error });
  return typeof error.status === 'number' && error.status < 500
    ? new ProblemError('bad-request', { cause: error })
    : null;
}
