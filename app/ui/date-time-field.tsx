import { useState } from 'react';
import { toInstant, toLocal } from '../lib/dates.ts';
import type { FieldWords } from './field.tsx';
import { Field, useField } from './field.tsx';
import { useZone } from './time.tsx';

export interface DateTimeFieldProps extends FieldWords {
  /** An instant: ISO, UTC; null while nothing is set. */
  readonly value: string | null;
  readonly onChange: (iso: string | null) => void;
  /** The zone (IANA) whose clocks are meant; the class's own unless said otherwise. */
  readonly zone?: string;
  /** Earliest and latest instants offered. */
  readonly min?: string;
  readonly max?: string;
  readonly name?: string;
  readonly disabled?: boolean;
  readonly required?: boolean;
  readonly onBlur?: () => void;
}

/** A date and time of day on the class's clocks, kept as an instant. */
export function DateTimeField({ label, hint, error, value, onChange, zone, min, max, ...rest }: DateTimeFieldProps) {
  const around = useZone();
  const own = zone ?? around;
  // What is typed is kept as it is while it is no instant yet, or names one that the clocks show differently.
  const [typed, setTyped] = useState<{ local: string; iso: string | null } | null>(null);
  const words = hint ?? `${own.split('/').at(-1)?.replaceAll('_', ' ')} time`;
  const wiring = useField({ hint: words, error });
  const isTyped = typed !== null && typed.iso === value;
  const shown = isTyped ? typed.local : value ? toLocal(value, own) : '';
  const change = (local: string) => {
    const iso = toInstant(local, own);
    setTyped({ local, iso });
    onChange(iso);
  };
  return (
    <Field label={label} hint={words} error={error} wiring={wiring}>
      <input
        {...rest}
        {...wiring}
        type="datetime-local"
        className="in num"
        value={shown}
        min={min ? toLocal(min, own) : undefined}
        max={max ? toLocal(max, own) : undefined}
        onChange={(event) => change(event.currentTarget.value)}
        onBlur={() => {
          setTyped(null);
          rest.onBlur?.();
        }}
      />
    </Field>
  );
}
