import { useState } from 'react';
import { Button } from './button.tsx';
import { useField } from './field.tsx';

export interface CopyFieldProps {
  readonly label: string;
  readonly value: string;
  readonly hint?: string;
}

/** Text to be taken elsewhere, such as a code or a link. */
export function CopyField({ label, value, hint }: CopyFieldProps) {
  const [said, setSaid] = useState('');
  const wiring = useField({ hint });
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(value);
      setSaid('Copied');
    } catch {
      // Some schools' devices close the clipboard to pages: the text is then selected, to be copied by hand.
      const input = document.getElementById(wiring.id);
      if (input instanceof HTMLInputElement) input.select();
      setSaid('Selected: copy it by hand');
    }
  };
  return (
    <div className="fld">
      <label className="flabel" htmlFor={wiring.id}>
        {label}
      </label>
      <div className="beside">
        <input
          {...wiring}
          className="in num"
          readOnly
          value={value}
          onFocus={(event) => event.currentTarget.select()}
        />
        <Button aria-label={`Copy: ${label}`} onClick={() => void copy()}>
          Copy
        </Button>
      </div>
      <p className="msg" aria-live="polite" id={hint ? `${wiring.id}-hint` : undefined}>
        {said || hint}
      </p>
    </div>
  );
}
