import { useId } from 'react';
import { readLine } from '../../../shared/maths/read.ts';
import type { TaskSettings } from '../../../shared/schemas/task.ts';
import { MathsField } from '../../ui/maths-field.tsx';
import { MathsReading } from '../../ui/maths-reading.tsx';

export interface MathsInputProps {
  readonly label: string;
  /** Hides the label where a heading above says the same. */
  readonly isLabelHidden?: boolean;
  readonly value: string;
  readonly onChange: (tex: string) => void;
  readonly settings: Pick<TaskSettings, 'numbers' | 'decimal'>;
  readonly hint?: string;
  readonly error?: string;
}

/** A labelled line of maths in a form, with how it is read below. */
export function MathsInput({ label, isLabelHidden, value, onChange, settings, hint, error }: MathsInputProps) {
  const id = useId();
  const reading = value.trim() === '' ? null : readLine(value, { ...settings, functions: [] });
  const described = [error ? `${id}-error` : null, `${id}-reading`, hint ? `${id}-hint` : null].filter(Boolean);
  return (
    <div className="fld">
      <p className={isLabelHidden ? 'sr-only' : 'flabel'} aria-hidden="true">
        {label}
      </p>
      <MathsField
        label={label}
        value={value}
        onChange={onChange}
        decimal={settings.decimal}
        describedBy={described.join(' ')}
        invalid={Boolean(error)}
        keys
      />
      {error ? (
        <p className="msg err" id={`${id}-error`}>
          {error}
        </p>
      ) : null}
      {reading && !(error && !reading.ok) ? (
        <MathsReading
          id={`${id}-reading`}
          tex={value}
          reading={reading}
          decimal={settings.decimal}
          onChange={onChange}
        />
      ) : null}
      {hint ? (
        <p className="msg" id={`${id}-hint`}>
          {hint}
        </p>
      ) : null}
    </div>
  );
}
