import type { ReactNode } from 'react';
import { useSyncExternalStore } from 'react';

export interface Toast {
  readonly id: number;
  readonly message: ReactNode;
  /** One act that undoes or follows up. */
  readonly act?: { readonly label: string; readonly onPress: () => void };
}

let toasts: readonly Toast[] = [];
let lastId = 0;
const listeners = new Set<() => void>();

function set(next: readonly Toast[]): void {
  toasts = next;
  for (const listener of listeners) listener();
}

/** Says at the foot of the screen that something was done; answers the toast's id. */
export function showToast(message: ReactNode, act?: Toast['act']): number {
  lastId += 1;
  set([...toasts.slice(-2), { id: lastId, message, act }]);
  return lastId;
}

export function closeToast(id: number): void {
  set(toasts.filter((toast) => toast.id !== id));
}

export function useToasts(): readonly Toast[] {
  return useSyncExternalStore(
    (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    () => toasts,
    () => toasts,
  );
}
