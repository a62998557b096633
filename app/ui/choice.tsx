import type { InputHTMLAttributes, ReactNode, Ref } from 'react';
import { useId } from 'react';
import { FieldNotes } from './field.tsx';

export interface RadioOption<V extends string = string> {
  readonly value: V;
  readonly label: ReactNode;
  readonly hint?: ReactNode;
  readonly disabled?: boolean;
}

export interface RadioGroupProps<V extends string> {
  readonly label: ReactNode;
  readonly hideLabel?: boolean;
  readonly options: readonly RadioOption<V>[];
  readonly value: V | null;
  readonly onChange: (value: V) => void;
  readonly name?: string;
  readonly hint?: ReactNode;
  readonly error?: string;
  readonly disabled?: boolean;
}

/** One of a few, all in sight. */
export function RadioGroup<V extends string>(props: RadioGroupProps<V>) {
  const id = useId();
  const { label, hideLabel, options, value, onChange, name = id, hint, error, disabled } = props;
  const described = [error ? `${id}-error` : null, hint ? `${id}-hint` : null].filter(Boolean).join(' ');
  return (
    <fieldset
      disabled={disabled}
      role="radiogroup"
      aria-labelledby={`${id}-label`}
      aria-describedby={described || undefined}
      aria-invalid={error ? true : undefined}
    >
      <legend id={`${id}-label`} className={hideLabel ? 'sr-only' : 'flabel'}>
        {label}
      </legend>
      {options.map((option) => (
        <label key={option.value} className="opt">
          <input
            type="radio"
            name={name}
            value={option.value}
            checked={value === option.value}
            disabled={option.disabled}
            onChange={() => onChange(option.value)}
          />
          <span>
            {option.label}
            {option.hint ? <span className="msg">{option.hint}</span> : null}
          </span>
        </label>
      ))}
      <FieldNotes id={id} hint={hint} error={error} />
    </fieldset>
  );
}

export interface CheckboxProps extends InputHTMLAttributes<HTMLInputElement> {
  readonly label: ReactNode;
  readonly hint?: ReactNode;
  readonly error?: string;
  readonly ref?: Ref<HTMLInputElement>;
}

function Tick({ label, hint, error, isSwitch, ...rest }: CheckboxProps & { isSwitch?: boolean }) {
  const own = useId();
  const id = rest.id ?? own;
  const described = [error ? `${id}-error` : null, hint ? `${id}-hint` : null].filter(Boolean).join(' ');
  return (
    <div>
      <label className={isSwitch ? 'chk switch' : 'chk'}>
        <input
          {...rest}
          id={id}
          type="checkbox"
          role={isSwitch ? 'switch' : undefined}
          aria-describedby={described || undefined}
          aria-invalid={error ? true : undefined}
        />
        <span>{label}</span>
      </label>
      <FieldNotes id={id} hint={hint} error={error} />
    </div>
  );
}

/** Yes or no, sent with its form. */
export function Checkbox(props: CheckboxProps) {
  return <Tick {...props} />;
}

/** On or off, at once. */
export function Switch(props: CheckboxProps) {
  return <Tick {...props} isSwitch />;
}
