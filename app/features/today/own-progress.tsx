import type { OwnProgress as Progress } from '../../../shared/schemas/today.ts';
import { countWord, plural } from './today-words.ts';

const LAST = 5;

interface Sum {
  readonly right: number;
  readonly total: number;
}

function sumOf(rounds: readonly Sum[]): Sum {
  return rounds.reduce((sum, { right, total }) => ({ right: sum.right + right, total: sum.total + total }), {
    right: 0,
    total: 0,
  });
}

function sayBefore(count: number): string {
  return count === 1 ? 'In the round before' : `In the ${countWord(count).toLowerCase()} before`;
}

/** How one's own findings fared over the last settled rounds. */
export function OwnProgress({ progress }: { readonly progress: Progress }) {
  const last = progress.rounds.slice(-LAST);
  const before = progress.rounds.slice(-2 * LAST, -LAST);
  const now = sumOf(last);
  const then = sumOf(before);
  const { nearlyCertain } = progress;
  return (
    <aside className="side own-eye" aria-labelledby="own-eye">
      <h3 id="own-eye">Your eye, so far</h3>
      <p className="fine muted">Only you and your teacher see this.</p>
      <p className="figure">
        <span className="num">{now.right}</span> of <span className="num">{now.total}</span>
      </p>
      <p className="small">
        {now.total === 1 ? 'finding' : 'findings'} right in the last{' '}
        {last.length === 1 ? 'round' : `${countWord(last.length).toLowerCase()} rounds`}.
        {then.total > 0 ? ` ${sayBefore(before.length)}: ${then.right} of ${then.total}.` : null}
      </p>
      <Spark rounds={last} />
      {nearlyCertain.total > 0 ? (
        <p className="small">
          When you were nearly certain, you were right {nearlyCertain.right} of {plural(nearlyCertain.total, 'time')}.
        </p>
      ) : null}
    </aside>
  );
}

const STRIDE = 52;

/** A long stroke for each right finding, a short one for each other, round by round. */
function Spark({ rounds }: { readonly rounds: Progress['rounds'] }) {
  const width = Math.max(1, rounds.length) * STRIDE;
  const label = rounds.map(({ number, right, total }) => `round ${number}: ${right} of ${total}`).join(', ');
  return (
    <svg className="spark" viewBox={`0 0 ${Math.max(width, 5 * STRIDE)} 74`} role="img" aria-label={`Right: ${label}`}>
      <path className="ground" d={`M0 60.5H${width}`} />
      {rounds.map(({ number, right, total }, i) => {
        const middle = i * STRIDE + STRIDE / 2;
        const from = middle - (Math.min(total, 6) - 1) * 5;
        return (
          <g key={`${number} ${i}`}>
            {Array.from({ length: Math.min(total, 6) }, (_, k) => (
              <path
                key={k}
                className={k < right ? 'right' : 'other'}
                d={`M${from + k * 10} 60V${k < right ? 32 : 53}`}
              />
            ))}
            <text x={middle} y="73">
              round {number}
            </text>
          </g>
        );
      })}
    </svg>
  );
}
