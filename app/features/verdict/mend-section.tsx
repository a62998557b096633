import { useState, type ReactNode } from 'react';
import { Button } from '../../ui/button.tsx';
import { Both } from '../../ui/page.tsx';

/** The author's way to put it right; the sheet comes when it is asked for, or when there is a mend already. */
export function MendSection({ isBegun, children }: { readonly isBegun: boolean; readonly children: ReactNode }) {
  const [isOpen, setOpen] = useState(false);
  if (!isBegun && !isOpen) {
    return (
      <Both className="mended-head">
        <Button kind="primary" wide onClick={() => setOpen(true)}>
          Mend it
        </Button>
        <p className="small muted mt-2">
          Put it right from the first fault on; it is checked at once, and earns no marks.
        </p>
      </Both>
    );
  }
  return (
    <>
      <Both className="mended-head">
        <h2>Your mend</h2>
        <p className="small muted">
          From the first fault on. It is checked like the first one, and can be changed again.
        </p>
      </Both>
      {children}
    </>
  );
}
