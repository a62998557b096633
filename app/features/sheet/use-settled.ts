import { useEffect, useState } from 'react';

const PAUSE_MS = 900;

/** Whether nothing has been typed for a moment; half a formula is no mistake yet. Always so while not `typing`. */
export function useSettled(value: string, typing: boolean): boolean {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(value), PAUSE_MS);
    return () => clearTimeout(timer);
  }, [value]);
  return !typing || settled === value;
}
