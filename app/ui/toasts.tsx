import { useEffect, useState } from 'react';
import { Button } from './button.tsx';
import type { Toast } from './toast-store.ts';
import { closeToast, useToasts } from './toast-store.ts';

const STAYS_MS = 10_000;

function ToastStrip({ toast }: { toast: Toast }) {
  const [isHeld, setHeld] = useState(false);
  useEffect(() => {
    if (isHeld) return undefined;
    const timer = setTimeout(() => closeToast(toast.id), STAYS_MS);
    return () => clearTimeout(timer);
  }, [isHeld, toast.id]);
  return (
    <div
      className="toast"
      onPointerEnter={() => setHeld(true)}
      onPointerLeave={() => setHeld(false)}
      onFocus={() => setHeld(true)}
      onBlur={() => setHeld(false)}
    >
      <span>{toast.message}</span>
      {toast.act ? (
        <Button
          kind="quiet"
          small
          onClick={() => {
            toast.act?.onPress();
            closeToast(toast.id);
          }}
        >
          {toast.act.label}
        </Button>
      ) : null}
      <Button kind="quiet" small onClick={() => closeToast(toast.id)}>
        Close
      </Button>
    </div>
  );
}

/** Small ink strips at the foot of the screen, read out as they come; they wait while pointed at or in focus. */
export function Toasts() {
  const toasts = useToasts();
  return (
    <div className="toasts" aria-live="polite">
      {toasts.map((toast) => (
        <ToastStrip key={toast.id} toast={toast} />
      ))}
    </div>
  );
}
