import type { StepState } from '../../shared/lib/step-words.ts';
import { SPOKEN_STATES } from './edge-strokes.ts';

/** A step of the small edge; walked: a reviewer has looked at it. */
export type SmallStep = StepState | 'walked';

export interface SmallEdgeProps {
  readonly states: readonly SmallStep[];
  /** Instead of the states one by one, such as `one of five steps walked`. */
  readonly label?: string;
  /** Pixels a step; 18 unless said otherwise, 12 on dense lists. */
  readonly step?: number;
  /** Where words beside it already say the same. */
  readonly isDecoration?: boolean;
  readonly className?: string;
}

const MIDDLE = 9;
const WORDS: Record<SmallStep, string> = { ...SPOKEN_STATES, plain: 'not yet judged', walked: 'walked' };

function Piece({ state, x, step, isAfterFault }: { state: SmallStep; x: number; step: number; isAfterFault: boolean }) {
  const half = step / 2;
  const line = `M${x} ${MIDDLE}h${step}`;
  const notch = Math.min(4, half - 1);
  const lead = half - notch;
  const ground = isAfterFault ? 'm-carried' : 'm-holds';
  switch (state) {
    case 'fault':
      return (
        <>
          <path d={`M${x} ${MIDDLE}h${lead}`} />
          <path className="m-fault" d={`M${x + lead} ${MIDDLE}l${notch} 7l${notch} -7h${lead}`} />
        </>
      );
    case 'also-fails':
      return <path className="m-also" d={`${`M${x} ${MIDDLE}h${lead}`}l${notch} 4l${notch} -4h${lead}`} />;
    case 'undecided':
      return (
        <>
          <path className={ground} d={`M${x} ${MIDDLE}h${half - 6}M${x + half + 6} ${MIDDLE}h${half - 6}`} />
          <text x={x + half} y="13.5">
            ?
          </text>
        </>
      );
    case 'holds':
      return <path d={line} />;
    default:
      return <path className={`m-${state}`} d={line} />;
  }
}

/** The edge laid flat, for rows and lists. */
export function SmallEdge({ states, label, step = 18, isDecoration, className = '' }: SmallEdgeProps) {
  const fault = states.indexOf('fault');
  const width = states.length * step + 2;
  const naming = isDecoration
    ? { 'aria-hidden': true }
    : { role: 'img', 'aria-label': label ?? (states.map((state) => WORDS[state]).join(', ') || 'no steps yet') };
  return (
    <svg className={`mini ${className}`} width={width} height="18" viewBox={`0 0 ${width} 18`} {...naming}>
      {states.map((state, index) => (
        <Piece key={index} state={state} x={1 + index * step} step={step} isAfterFault={fault >= 0 && index > fault} />
      ))}
      {Array.from({ length: states.length + 1 }, (_, index) => (
        <path key={index} className="m-tick" d={`M${1 + index * step} 4V14`} />
      ))}
    </svg>
  );
}
