import { useState } from 'react';
import { Button } from './button.tsx';
import { ConfirmDialog, Dialog } from './dialog.tsx';
import { Notice } from './notice.tsx';
import { BigFigure, Num } from './num.tsx';
import { EmptyState, ErrorState, Waiting } from './states.tsx';
import { Table } from './table.tsx';
import { Tabs } from './tabs.tsx';
import { Tally } from './tally.tsx';
import { Time, TimeLeft } from './time.tsx';
import { TimeEdge } from './time-edge.tsx';
import { showToast } from './toast-store.ts';
import { ApiProblem } from '../lib/api.ts';

const PEOPLE = [
  { name: 'Greta Moss', stage: 'writing', points: 112, state: undefined },
  { name: 'Hanno Pell', stage: 'handed in', points: 98, state: undefined },
  { name: 'Isla Quaye', stage: 'handed in (selected)', points: -14, state: 'selected' },
  { name: 'Vera Osei', stage: 'left the class', points: null, state: 'left' },
] as const;

/** Tabs, tables and figures. */
export function TableGallery() {
  const [soon] = useState(() => new Date(Date.now() + 11_400_000).toISOString());
  return (
    <section className="parts-s">
      <h2>Tabs, tables, figures</h2>
      <Tabs
        label="Example views"
        tabs={[
          {
            id: 'lines',
            label: 'Lines',
            panel: (
              <Table
                caption="People of the class"
                rows={PEOPLE}
                rowKey={(row) => row.name}
                rowState={(row) => row.state}
                columns={[
                  { id: 'name', head: 'Student', cell: (row) => row.name },
                  { id: 'stage', head: 'Stage', cell: (row) => row.stage },
                  {
                    id: 'slips',
                    head: 'First faults',
                    cell: (row) => <Tally long={Math.abs(row.points ?? 0) % 9} short={6} label="strokes" />,
                  },
                  {
                    id: 'points',
                    head: 'Points',
                    isFigure: true,
                    cell: (row) => (row.points === null ? '–' : <Num>{row.points}</Num>),
                  },
                ]}
              />
            ),
          },
          {
            id: 'findings',
            label: 'Findings',
            count: 2,
            panel: <EmptyState>Two findings would stand here.</EmptyState>,
          },
          { id: 'history', label: 'History', panel: <EmptyState /> },
        ]}
      />
      <div className="mt-8">
        <TimeEdge
          label="Stages"
          now="2026-10-13T15:50:00Z"
          nowWords="now 17:50"
          stretches={[
            {
              id: 'w',
              name: 'writing',
              from: '2026-10-12T08:00:00Z',
              to: '2026-10-13T19:00:00Z',
              words: 'Mon 10:00 to today 21:00',
            },
            {
              id: 'r',
              name: 'reviewing',
              from: '2026-10-13T19:00:00Z',
              to: '2026-10-15T10:00:00Z',
              words: 'to Thu 12:00',
            },
            {
              id: 'a',
              name: 'answering',
              from: '2026-10-15T10:00:00Z',
              to: '2026-10-16T10:00:00Z',
              words: 'to Fri 12:00',
            },
          ]}
          end={{ name: 'settled', words: 'Fri 18:00' }}
        />
      </div>
      <div className="mt-6">
        <BigFigure>7 of 10</BigFigure>
        <p className="small">
          Writing ends <Time iso={soon} zone="Europe/Berlin" />, <TimeLeft iso={soon} />.
        </p>
      </div>
    </section>
  );
}

/** Notices, toasts, dialogs, and what stands where there is nothing. */
export function StatementGallery() {
  const [open, setOpen] = useState<'plain' | 'grave' | null>(null);
  const offline = new ApiProblem({
    type: 'offline',
    title: 'Could not be loaded',
    status: 0,
    detail: 'The school’s server did not answer. Nothing you typed is lost.',
  });
  return (
    <section className="parts-s">
      <h2>Notices, toasts, dialogs</h2>
      <div className="stack mb-6">
        <Notice title="Writing ends in ten minutes.">What is typed by then is handed in.</Notice>
        <Notice kind="plum" title="In dispute.">
          Points may change when your teacher has ruled.
        </Notice>
        <Notice kind="grave" title="No connection.">
          You can go on writing; every line is kept on this device and sent when the line is back.
        </Notice>
      </div>
      <div className="parts-row">
        <Button onClick={() => showToast('Finding handed in.', { label: 'Take it back', onPress: () => undefined })}>
          Show a toast
        </Button>
        <Button onClick={() => setOpen('plain')}>Open a dialog</Button>
        <Button kind="grave" onClick={() => setOpen('grave')}>
          Open a grave one
        </Button>
      </div>
      <Dialog isOpen={open === 'plain'} onClose={() => setOpen(null)} title="Hand in your derivation?">
        <p className="small">
          You can change it until <time>21:00</time>. After that two classmates review it.
        </p>
        <div className="acts">
          <Button kind="primary" onClick={() => setOpen(null)}>
            Hand in
          </Button>
          <Button kind="quiet" small onClick={() => setOpen(null)}>
            Not yet
          </Button>
        </div>
      </Dialog>
      <ConfirmDialog
        isOpen={open === 'grave'}
        onClose={() => setOpen(null)}
        onConfirm={() => setOpen(null)}
        grave
        title="Remove Wim Achter from 10C?"
        confirm="Remove"
        cancel="Keep him"
        effects={['His derivations and findings stay in the record.', 'His standing is no longer shown.']}
      />
      <h2 className="mt-11 mb-3.5">Nothing, an error, waiting</h2>
      <div className="parts-cols">
        <EmptyState>No disputes. When someone contests, the case stands here, most people first.</EmptyState>
        <ErrorState error={offline} onRetry={() => undefined} />
        <Waiting>Reading the derivation…</Waiting>
      </div>
    </section>
  );
}
