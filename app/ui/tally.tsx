export interface TallyProps {
  /** Long strokes. */
  readonly long: number;
  /** Short strokes after them. */
  readonly short?: number;
  /** Says both numbers in words. */
  readonly label: string;
}

const STRIDE = 7;
const GROUP_GAP = 6;
const placeOf = (index: number) => 1.5 + index * STRIDE + Math.floor(index / 5) * GROUP_GAP;

/** Counted by strokes, in fives: long for one kind, short for the other. */
export function Tally({ long, short = 0, label }: TallyProps) {
  const all = long + short;
  const width = Math.max(4, placeOf(Math.max(0, all - 1)) + 3);
  return (
    <svg className="tally" width={width} height="18" viewBox={`0 0 ${width} 18`} role="img" aria-label={label}>
      {Array.from({ length: all }, (_, index) => (
        <path
          key={index}
          className={index < long ? 'long' : 'short'}
          d={`M${placeOf(index)} ${index < long ? 2 : 9}V16`}
        />
      ))}
    </svg>
  );
}
