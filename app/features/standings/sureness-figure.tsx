import type { OwnStanding } from '../../../shared/schemas/standings.ts';
import { SURE_WORD_WORDS } from '../../lib/finding-words.ts';
import { Side } from '../../ui/page.tsx';

const LONG = 120;
/** How far off counts as well tuned. */
const TUNED = 0.12;
/** Fewer findings than this say nothing about tuning. */
const ENOUGH = 6;

/** Sureness against honesty: how often one was right, beside the share that the words stand for. */
export function SurenessFigure({ sureness }: { readonly sureness: OwnStanding['sureness'] }) {
  if (sureness.length === 0) return null;
  return (
    <Side className="cal">
      <h2>When you say…</h2>
      <dl>
        {sureness.map(({ sure, right, of, expected }) => (
          <div key={sure}>
            <dt>{SURE_WORD_WORDS[sure].toLowerCase()}</dt>
            <dd>
              <svg viewBox={`0 0 ${LONG} 16`} aria-hidden="true">
                <path className="base" d={`M0 8H${LONG}`} />
                <path className="share" d={`M0 8H${(LONG * right) / of}`} />
                <path className="honest" d={`M${LONG * expected} 0V16`} />
              </svg>
              <span>
                right {right} of {of}
              </span>
            </dd>
          </div>
        ))}
      </dl>
      <p className="fine muted">The upright stroke is where honest sureness would be. {tuning(sureness)}</p>
    </Side>
  );
}

function tuning(sureness: OwnStanding['sureness']): string {
  const count = sureness.reduce((sum, each) => sum + each.of, 0);
  if (count < ENOUGH) return 'A few more findings, and it says something about you.';
  const right = sureness.reduce((sum, each) => sum + each.right, 0);
  const expected = sureness.reduce((sum, each) => sum + each.expected * each.of, 0);
  const off = (right - expected) / count;
  if (Math.abs(off) <= TUNED) return 'You are well tuned.';
  return off < 0 ? 'You are surer than you are right.' : 'You could be surer than you say.';
}
