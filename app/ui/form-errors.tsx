import { useEffect, useRef } from 'react';

export interface FormErrorsProps {
  /** What is wrong as a whole, such as the server's answer. */
  readonly message?: string;
  /** What is wrong with each field; `id` is the control's. */
  readonly fields?: readonly { readonly id?: string; readonly label: string; readonly message: string }[];
}

function titleFor(count: number): string {
  return count === 1 ? 'One field needs another look.' : `${count} fields need another look.`;
}

/** Above a form that was not taken: what is wrong, with links to the fields. Takes the focus when it appears. */
export function FormErrors({ message, fields = [] }: FormErrorsProps) {
  const box = useRef<HTMLDivElement>(null);
  const isShown = Boolean(message) || fields.length > 0;
  useEffect(() => {
    if (isShown) box.current?.focus();
  }, [isShown, message]);
  if (!isShown) return null;
  return (
    <div ref={box} className="notice grave" role="alert" tabIndex={-1}>
      {message ? (
        <p>
          <b>{message}</b>
        </p>
      ) : (
        <p>
          <b>{titleFor(fields.length)}</b>
        </p>
      )}
      {fields.length > 0 ? (
        <ul className="mt-1">
          {fields.map((field) => (
            <li key={field.label}>
              {field.id ? <a href={`#${field.id}`}>{field.label}</a> : field.label}: {field.message}
            </li>
          ))}
        </ul>
      ) : null}
    </div>
  );
}
