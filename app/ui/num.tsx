import type { ReactNode } from 'react';

const MINUS = '\u2212';

/** A number with a true minus sign. */
export function figure(value: number, digits = 0): string {
  const text = Math.abs(value).toFixed(digits);
  return value < 0 && Number(text) !== 0 ? MINUS + text : text;
}

/** Whole points with their sign, half rounded away from zero: `+83`, `−18`, `0`. */
export function signed(value: number): string {
  const whole = Math.sign(value) * Math.round(Math.abs(value));
  if (whole === 0) return '0';
  return whole > 0 ? `+${whole}` : `${MINUS}${-whole}`;
}

/** Figures in the text face, which has an open zero. */
export function Num({ children, className = '' }: { children: ReactNode; className?: string }) {
  return <span className={`num ${className}`}>{typeof children === 'number' ? figure(children) : children}</span>;
}

/** A large figure that leads a passage. */
export function BigFigure({ children }: { children: ReactNode }) {
  return <p className="big-figure num">{children}</p>;
}
