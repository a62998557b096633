import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { DisputeItem } from '../../../shared/schemas/dispute.ts';
import { sayDuration } from '../../lib/dates.ts';
import { paths } from '../../lib/paths.ts';
import { Kbd } from '../../ui/kbd.tsx';
import { SmallEdge } from '../../ui/small-edge.tsx';
import { KIND_WORDS } from './dispute-words.ts';

export interface QueueProps {
  readonly items: readonly DisputeItem[];
  readonly openId: string | null;
  /** Whether the whole queue is shown on a phone. */
  readonly isUnfolded: boolean;
  readonly onUnfold: () => void;
}

/** What waits, most people first; the figure of people leads each entry. */
export function Queue({ items, openId, isUnfolded, onUnfold }: QueueProps) {
  const [now] = useState(() => Date.now());
  const people = items.reduce((sum, item) => sum + item.people, 0);
  return (
    <nav className="queue" aria-label="Disputes, most people first" data-unfolded={isUnfolded || undefined}>
      <h2>Disputes</h2>
      <p className="small muted">
        {people} {people === 1 ? 'person waits' : 'people wait'}. Most people first.
      </p>
      <ol>
        {items.map((item) => (
          <li key={item.disputeId} className={item.disputeId === openId ? 'sel' : undefined}>
            <Link
              to={paths.disputes(item.disputeId)}
              aria-current={item.disputeId === openId ? 'true' : undefined}
              replace
            >
              <b className="num">
                {item.people}
                <span className="sr-only"> people:</span>
              </b>
              <span>
                <span className="qt">{item.taskTitle}</span>
                <span className="qd">
                  step {item.step} · {item.asked ? 'author asked' : KIND_WORDS[item.kind]}
                </span>
                <SmallEdge states={item.states} step={16} />
              </span>
              <i>{ageWords(item.openedAt, now)}</i>
            </Link>
          </li>
        ))}
      </ol>
      {items.length > 1 && !isUnfolded ? (
        <p className="qmore small">
          <button type="button" className="lk s" onClick={onUnfold}>
            {items.length - 1} more {items.length === 2 ? 'dispute' : 'disputes'}
          </button>
        </p>
      ) : null}
      <p className="small muted qk">
        <Kbd>↓</Kbd> <Kbd>↑</Kbd> next, back
      </p>
    </nav>
  );
}

function ageWords(openedAt: string, now: number): string {
  const ms = now - Date.parse(openedAt);
  return ms < 60_000 ? 'now' : sayDuration(ms).split(' ').slice(0, 2).join(' ');
}
