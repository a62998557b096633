import type { OwnStanding } from '../../../shared/schemas/standings.ts';
import { figure } from '../../ui/num.tsx';

const WIDTH = 540;
const HEIGHT = 190;
const LEFT = 46;
const RIGHT = 478;
const TOP = 26;
const BOTTOM = 138;

/** Mean points by round: the own line with its ticks, the class dotted behind it. */
export function ProgressChart({ rounds }: { readonly rounds: OwnStanding['rounds'] }) {
  const shown = rounds.slice(-8);
  const scale = scaleOf(shown.flatMap(({ mean, classMean }) => [mean, ...(classMean === null ? [] : [classMean])]));
  const x = (i: number) => (shown.length === 1 ? (LEFT + RIGHT) / 2 : LEFT + (i * (RIGHT - LEFT)) / (shown.length - 1));
  const own = shown.map(({ mean }, i) => [x(i), scale.y(mean)] as const);
  const others = shown.flatMap(({ classMean }, i) => (classMean === null ? [] : [[x(i), scale.y(classMean)] as const]));
  const last = own.at(-1);
  const lastOther = others.at(-1);
  return (
    <figure className="prog">
      <svg viewBox={`0 0 ${WIDTH} ${HEIGHT}`} role="img" aria-label={spoken(shown)}>
        <g className="ax">
          {scale.marks.map((mark) => (
            <g key={mark}>
              <path className={mark === 0 ? undefined : 'g'} d={`M30 ${scale.y(mark)}H520`} />
              <text x="0" y={scale.y(mark) + 4}>
                {figure(mark)}
              </text>
            </g>
          ))}
        </g>
        <path className="class-line" d={pathOf(others)} />
        <path className="own-line" d={pathOf(own)} />
        {shown.map(({ number, mean }, i) => {
          const [at, y] = own[i] ?? [0, 0];
          const isLow = standsBelow(own, others, i);
          return (
            <g key={number}>
              <path className="own-line" d={`M${at} ${y - 6}V${y + 6}`} />
              <text className="v halo" x={at} y={isLow ? y + 23 : y - 13} textAnchor="middle">
                {figure(mean)}
              </text>
              <text x={at} y={HEIGHT - 4} textAnchor="middle">
                round {number}
              </text>
            </g>
          );
        })}
        {last ? (
          <text className="v" x={last[0] + 14} y={last[1] + 4}>
            you
          </text>
        ) : null}
        {lastOther && last ? (
          <text x={lastOther[0] + 14} y={apart(lastOther[1], last[1]) + 4}>
            class
          </text>
        ) : null}
      </svg>
      <figcaption className="small muted">
        Mean points of your findings, round by round. Only you and your teacher see it.
      </figcaption>
    </figure>
  );
}

/** Zero is always in sight; marks at whole fifties, or at tens where all values are small. */
function scaleOf(values: readonly number[]) {
  const low = Math.min(0, ...values);
  const high = Math.max(10, ...values);
  const every = high - low > 60 ? 50 : 20;
  const marks: number[] = [];
  for (let mark = Math.ceil(low / every) * every; mark <= high; mark += every) marks.push(mark === 0 ? 0 : mark);
  const y = (value: number) => Math.round(10 * (BOTTOM - ((value - low) / (high - low)) * (BOTTOM - TOP))) / 10;
  return { marks, y };
}

function pathOf(points: readonly Point[]): string {
  return points.map(([x, y], i) => `${i === 0 ? 'M' : 'L'}${x} ${y}`).join('');
}

type Point = readonly [number, number];

/** Whether the number stands better below its tick: in a valley of the own line, unless the class's line runs there. */
function standsBelow(own: readonly Point[], others: readonly Point[], i: number): boolean {
  const [x, y] = own[i] ?? [0, 0];
  const neighbours = [own[i - 1], own[i + 1]].filter((point) => point !== undefined);
  const isValley = neighbours.length > 0 && neighbours.every(([, beside]) => beside < y);
  const isFree = others.every(([at, other]) => Math.abs(at - x) > 1 || other < y || other > y + 34);
  return isValley && isFree && y + 30 < HEIGHT - 18;
}

function apart(y: number, from: number): number {
  if (Math.abs(y - from) >= 16) return y;
  return y >= from ? from + 16 : from - 16;
}

function spoken(rounds: OwnStanding['rounds']): string {
  const own = rounds.map(({ number, mean }) => `round ${number}: ${mean}`).join(', ');
  const others = rounds.flatMap(({ classMean }) => (classMean === null ? [] : [String(classMean)])).join(', ');
  return `Your mean points by round: ${own}.${others ? ` The class: ${others}.` : ''}`;
}
