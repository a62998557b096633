import type { InputHTMLAttributes, Ref, SelectHTMLAttributes, TextareaHTMLAttributes } from 'react';
import { useState } from 'react';
import { Button } from './button.tsx';
import { classNames } from './class-names.ts';
import type { FieldWords } from './field.tsx';
import { Field, FieldNotes, useField } from './field.tsx';

export interface TextFieldProps extends FieldWords, InputHTMLAttributes<HTMLInputElement> {
  readonly ref?: Ref<HTMLInputElement>;
}

/** One line of text; spreads react-hook-form's `register(name)`. */
export function TextField({ label, hint, error, className, ...rest }: TextFieldProps) {
  const wiring = useField({ hint, error }, rest.id);
  return (
    <Field label={label} hint={hint} error={error} wiring={wiring}>
      <input {...rest} {...wiring} className={classNames('in', className)} />
    </Field>
  );
}

/** A password, which its owner may look at while typing. */
export function PasswordField({ label, hint, error, className, ...rest }: TextFieldProps) {
  const [shown, setShown] = useState(false);
  const wiring = useField({ hint, error }, rest.id);
  return (
    <div className="fld">
      <div className="beside-label">
        <label className="flabel" htmlFor={wiring.id}>
          {label}
        </label>
        <Button
          kind="quiet"
          small
          aria-controls={wiring.id}
          aria-label={shown ? 'Hide the password' : 'Show the password'}
          onClick={() => setShown(!shown)}
        >
          {shown ? 'Hide' : 'Show'}
        </Button>
      </div>
      <input
        {...rest}
        {...wiring}
        type={shown ? 'text' : 'password'}
        spellCheck={false}
        className={classNames('in', className)}
      />
      <FieldNotes id={wiring.id} hint={hint} error={error} />
    </div>
  );
}

export interface TextAreaProps extends FieldWords, TextareaHTMLAttributes<HTMLTextAreaElement> {
  readonly ref?: Ref<HTMLTextAreaElement>;
}

/** Several lines of text. */
export function TextArea({ label, hint, error, className, rows = 3, ...rest }: TextAreaProps) {
  const wiring = useField({ hint, error }, rest.id);
  return (
    <Field label={label} hint={hint} error={error} wiring={wiring}>
      <textarea {...rest} {...wiring} rows={rows} className={classNames('in', className)} />
    </Field>
  );
}

export interface SelectOption {
  readonly value: string;
  readonly label: string;
  readonly disabled?: boolean;
}

export interface SelectProps extends FieldWords, SelectHTMLAttributes<HTMLSelectElement> {
  readonly options: readonly SelectOption[];
  /** Words for the empty choice; without them there is none. */
  readonly placeholder?: string;
  readonly ref?: Ref<HTMLSelectElement>;
}

/** One of several, in the device's own list. */
export function Select({ label, hint, error, options, placeholder, className, ...rest }: SelectProps) {
  const wiring = useField({ hint, error }, rest.id);
  return (
    <Field label={label} hint={hint} error={error} wiring={wiring}>
      <select {...rest} {...wiring} className={classNames('in', className)}>
        {placeholder === undefined ? null : <option value="">{placeholder}</option>}
        {options.map((option) => (
          <option key={option.value} value={option.value} disabled={option.disabled}>
            {option.label}
          </option>
        ))}
      </select>
    </Field>
  );
}
