import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Button } from '../../ui/button.tsx';
import { EmptyState, ErrorState, Waiting } from '../../ui/states.tsx';
import { TextField } from '../../ui/text-field.tsx';
import { Time } from '../../ui/time.tsx';
import { trailQuery } from './admin.queries.ts';

function said(value: unknown): string {
  if (value === null || value === undefined) return '';
  if (typeof value !== 'object') return String(value);
  return Object.entries(value)
    .map(([name, each]) => `${name} ${typeof each === 'object' ? JSON.stringify(each) : String(each)}`)
    .join(', ');
}

/** Who did what, when, with what before and after, and why. */
export function TrailPanel({ zone }: { readonly zone: string }) {
  const [search, setSearch] = useState('');
  const [pages, setPages] = useState<readonly (string | null)[]>([null]);
  const trail = useQuery(trailQuery(search, pages.at(-1) ?? null));
  if (trail.isError) return <ErrorState error={trail.error} onRetry={() => void trail.refetch()} />;
  if (!trail.data) return <Waiting />;
  const last = trail.data.entries.at(-1);
  return (
    <div className="grid gap-6">
      <div className="max-w-[26rem]">
        <TextField
          label="Find by person, act or reason"
          type="search"
          value={search}
          onChange={(event) => {
            setSearch(event.target.value);
            setPages([null]);
          }}
        />
      </div>
      {trail.data.entries.length === 0 ? <EmptyState title="No entries" /> : null}
      <ol>
        {trail.data.entries.map((entry) => (
          <li key={entry.id} className="border-b border-rule py-3">
            <p>
              <span className="small muted">
                <Time iso={entry.at} style="date-time" zone={zone} />
              </span>{' '}
              <b>{entry.actor ?? 'Slipstone itself'}</b> {entry.action.replace(/[.-]/g, ' ')}
            </p>
            {entry.reason ? <p className="small">“{entry.reason}”</p> : null}
            {said(entry.before) || said(entry.after) ? (
              <p className="fine muted break-words">
                {said(entry.before) ? `before: ${said(entry.before)}. ` : ''}
                {said(entry.after) ? `after: ${said(entry.after)}` : ''}
              </p>
            ) : null}
          </li>
        ))}
      </ol>
      <div className="acts">
        {pages.length > 1 ? <Button onClick={() => setPages(pages.slice(0, -1))}>Newer</Button> : null}
        {trail.data.more && last ? <Button onClick={() => setPages([...pages, last.at])}>Older</Button> : null}
      </div>
    </div>
  );
}
