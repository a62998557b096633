import type { FieldValues, Path, UseFormSetError } from 'react-hook-form';
import { ApiProblem } from './api.ts';

/** `/lines/0/tex` names the field `lines.0.tex`. */
export function pointerToField(pointer: string): string {
  return pointer
    .split('/')
    .slice(1)
    .map((part) => part.replaceAll('~1', '/').replaceAll('~0', '~'))
    .join('.');
}

/**
 * Puts what the server said about the fields beside them, and what belongs to none above the form as `root`.
 * Answers false for an error that is no problem of the API, which the caller should throw on.
 */
export function showProblem<T extends FieldValues>(
  error: unknown,
  setError: UseFormSetError<T>,
  fields: readonly string[],
): boolean {
  if (!(error instanceof ApiProblem)) return false;
  const unplaced: string[] = [];
  for (const { pointer, detail } of error.errors) {
    const field = pointerToField(pointer);
    if (fields.includes(field) || fields.includes(field.split('.')[0] ?? ''))
      setError(field as Path<T>, { type: 'server', message: detail });
    else unplaced.push(detail);
  }
  if (error.errors.length === 0) unplaced.push(error.detail ?? error.title);
  if (unplaced.length > 0) setError('root', { type: error.type, message: unplaced.join(' ') });
  return true;
}
