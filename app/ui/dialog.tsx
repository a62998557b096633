import type { ReactNode } from 'react';
import { lazy, Suspense } from 'react';
import { Button } from './button.tsx';
import type { DialogProps } from './dialog-modal.tsx';

export type { DialogProps };

const DialogModal = lazy(async () => ({ default: (await import('./dialog-modal.tsx')).DialogModal }));

/** A dialog over the page: holds the focus, closes with Escape, gives the focus back. */
export function Dialog({ isOpen, ...rest }: DialogProps) {
  if (!isOpen) return null;
  return (
    <Suspense fallback={null}>
      <DialogModal {...rest} />
    </Suspense>
  );
}

export interface ConfirmDialogProps extends Omit<DialogProps, 'children' | 'isLocked'> {
  /** One sentence on what this is about. */
  readonly children?: ReactNode;
  /** What it will do, one fact a line. */
  readonly effects?: readonly ReactNode[];
  /** The act in its own verb, such as `Remove`. */
  readonly confirm: string;
  readonly cancel?: string;
  readonly busy?: boolean;
  /** Why it could not be done. */
  readonly error?: string;
  readonly onConfirm: () => void;
}

/** Asks before an act, and says what the act will change. */
export function ConfirmDialog(props: ConfirmDialogProps) {
  const { children, effects = [], confirm, cancel = 'Not now', busy, error, onConfirm, ...dialog } = props;
  return (
    <Dialog {...dialog} isLocked={busy}>
      {children ? <div className="small">{children}</div> : null}
      {effects.length > 0 ? (
        <ul className="effects" aria-label="What it will do">
          {effects.map((effect, index) => (
            <li key={index}>{effect}</li>
          ))}
        </ul>
      ) : null}
      {error ? (
        <p className="msg err" role="alert">
          {error}
        </p>
      ) : null}
      <div className="acts">
        <Button kind={dialog.grave ? 'grave' : 'primary'} busy={busy} onClick={onConfirm}>
          {confirm}
        </Button>
        <Button kind="quiet" small disabled={busy} onClick={dialog.onClose}>
          {cancel}
        </Button>
      </div>
    </Dialog>
  );
}
