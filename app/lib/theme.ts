import { useSyncExternalStore } from 'react';

/** What the reader chose; `system` follows the device. */
export type ThemeChoice = 'system' | 'light' | 'dark';

const KEY = 'slipstone.theme';
const DARK = '(prefers-color-scheme: dark)';
const listeners = new Set<() => void>();

/** The choice kept on this device; `system` where none is, or where storage is closed. */
export function readThemeChoice(): ThemeChoice {
  try {
    const kept = localStorage.getItem(KEY);
    return kept === 'light' || kept === 'dark' ? kept : 'system';
  } catch {
    return 'system';
  }
}

function isSystemDark(): boolean {
  return typeof matchMedia === 'function' && matchMedia(DARK).matches;
}

/** Puts the theme on the document. */
export function applyTheme(): void {
  const choice = readThemeChoice();
  document.documentElement.dataset['theme'] = choice === 'system' ? (isSystemDark() ? 'dark' : 'light') : choice;
  for (const listener of listeners) listener();
}

/** Keeps a choice on this device and puts it on the document. */
export function chooseTheme(choice: ThemeChoice): void {
  try {
    if (choice === 'system') localStorage.removeItem(KEY);
    else localStorage.setItem(KEY, choice);
  } catch {
    document.documentElement.dataset['theme'] = choice === 'dark' ? 'dark' : 'light';
    return;
  }
  applyTheme();
}

/** Applies the theme now and whenever the device changes its own. */
export function startTheme(): void {
  applyTheme();
  if (typeof matchMedia === 'function') matchMedia(DARK).addEventListener('change', applyTheme);
}

/** The reader's choice, kept in step everywhere on the page. */
export function useThemeChoice(): ThemeChoice {
  return useSyncExternalStore(
    (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    readThemeChoice,
    () => 'system',
  );
}
