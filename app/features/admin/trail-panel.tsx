import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { formatInstant } from '../../lib/dates.ts';
import { Button } from '../../ui/button.tsx';
import { EmptyState, ErrorState, Waiting } from '../../ui/states.tsx';
import { TextField } from '../../ui/text-field.tsx';
import { Time } from '../../ui/time.tsx';
import { trailQuery } from './admin.queries.ts';

const UUID = /^[\da-f]{8}(-[\da-f]{4}){3}-[\da-f]{12}$/;
const ISO = /^\d{4}-\d\d-\d\dT\d\d:\d\d/;

/** A value as one would say it; '' for one that tells a reader nothing, such as an id. */
function said(value: unknown, zone: string): string {
  if (value === null || value === undefined || value === '') return '';
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (typeof value === 'string') {
    if (UUID.test(value)) return '';
    return ISO.test(value) ? formatInstant(value, zone, 'date-time') : value;
  }
  if (typeof value !== 'object') return String(value);
  if (Array.isArray(value)) return value.every((each) => typeof each !== 'object') ? value.join(', ') : '';
  return Object.entries(value)
    .map(([name, each]) => ({ name: nameWords(name), words: said(each, zone) }))
    .filter(({ words }) => words)
    .map(({ name, words }) => `${name} ${words}`)
    .join(', ');
}

/** `writingEndsAt` as `writing ends`. */
function nameWords(name: string): string {
  return name
    .replace(/([A-Z])/g, ' $1')
    .toLowerCase()
    .replace(/ at$/, '');
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** What an act changed, name by name: `stage from writing to reviewing`. */
function changes(entry: { before: unknown; after: unknown; reason: string | null }, zone: string): string {
  const before = isRecord(entry.before) ? entry.before : { '': entry.before };
  const after = isRecord(entry.after) ? entry.after : { '': entry.after };
  return [...new Set([...Object.keys(before), ...Object.keys(after)])]
    .map((name) => {
      const [was, is] = [said(before[name], zone), said(after[name], zone)];
      if (was === is || is === entry.reason) return '';
      const change = was && is ? `from ${was} to ${is}` : is || `no longer ${was}`;
      return `${nameWords(name)} ${change}`.trim();
    })
    .filter(Boolean)
    .join('; ');
}

function lead(words: string): string {
  return words ? `, ${words}` : '';
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
          <li
            key={entry.id}
            className="tab:grid tab:grid-cols-[15rem_minmax(0,1fr)] items-baseline gap-6 border-b border-rule py-2.5"
          >
            <p className="small muted">
              <Time iso={entry.at} style="date-time" zone={zone} />
            </p>
            <div>
              <p className="small">
                <b>{entry.actor ?? 'Slipstone itself'}</b>: {entry.action.replace(/[.-]/g, ' ')}
                <span className="muted break-words">{lead(changes(entry, zone))}</span>
              </p>
              {entry.reason ? <p>“{entry.reason}”</p> : null}
            </div>
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
