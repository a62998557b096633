import { useEffect, useState } from 'react';

const MOMENT_MS = 250;

/**
 * True while `isOn` is, and for a moment after. What takes up room goes only then: a press on something below must
 * be let go on the thing that it was aimed at.
 */
export function useLinger(isOn: boolean): boolean {
  const [wasOn, setWasOn] = useState(isOn);
  useEffect(() => {
    const timer = setTimeout(() => setWasOn(isOn), isOn ? 0 : MOMENT_MS);
    return () => clearTimeout(timer);
  }, [isOn]);
  return isOn || wasOn;
}
