import type { ReactNode } from 'react';
import { useId } from 'react';

export interface FieldWords {
  readonly label: ReactNode;
  /** One sentence below, before anything is wrong. */
  readonly hint?: ReactNode;
  /** What is wrong and how to mend it. */
  readonly error?: string;
}

export interface FieldWiring {
  readonly id: string;
  readonly 'aria-describedby': string | undefined;
  readonly 'aria-invalid': true | undefined;
}

/** Ids that tie a control to its label, hint and error. */
export function useField({ hint, error }: Pick<FieldWords, 'hint' | 'error'>, givenId?: string): FieldWiring {
  const own = useId();
  const id = givenId ?? own;
  const described = [error ? `${id}-error` : null, hint ? `${id}-hint` : null].filter(Boolean).join(' ');
  return { id, 'aria-describedby': described || undefined, 'aria-invalid': error ? true : undefined };
}

/** The sentences under a control. */
export function FieldNotes({ id, hint, error }: { id: string; hint?: ReactNode; error?: string }) {
  return (
    <>
      {error ? (
        <p className="msg err" id={`${id}-error`}>
          {error}
        </p>
      ) : null}
      {hint ? (
        <p className="msg" id={`${id}-hint`}>
          {hint}
        </p>
      ) : null}
    </>
  );
}

/** A label above any control, with its sentences below. */
export function Field({
  label,
  hint,
  error,
  wiring,
  children,
}: FieldWords & { wiring: FieldWiring; children: ReactNode }) {
  return (
    <div className="fld">
      <label className="flabel" htmlFor={wiring.id}>
        {label}
      </label>
      {children}
      <FieldNotes id={wiring.id} hint={hint} error={error} />
    </div>
  );
}
