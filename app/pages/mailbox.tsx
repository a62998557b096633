import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { api } from '../lib/api.ts';
import { Head, Page } from '../ui/page.tsx';
import { EmptyState, ErrorState, Waiting } from '../ui/states.tsx';
import { Mark } from '../ui/mark.tsx';
import { Time } from '../ui/time.tsx';
import { paths } from '../lib/paths.ts';
import { Link } from 'react-router-dom';

interface CaughtLetter {
  readonly id: string;
  readonly receivedAt: string;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/** Demo only: what was mailed, because no letter of the demo leaves this machine. */
export function Component() {
  const [openId, setOpenId] = useState<string | null>(null);
  const mailbox = useQuery({
    queryKey: ['mailbox'],
    queryFn: ({ signal }) => api.get<{ readonly letters: readonly CaughtLetter[] }>('/api/mailbox', { signal }),
    refetchInterval: 5_000,
  });
  const letters = mailbox.data?.letters ?? [];
  const open = letters.find((letter) => letter.id === openId) ?? null;
  return (
    <Page wide>
      <header className="py-6">
        <Link to={paths.today()} className="mark">
          <Mark />
          Slipstone
        </Link>
      </header>
      <main id="main">
        <Head
          h1="Letters of the demo"
          lead="No letter leaves this machine; each one that would have been mailed is caught here."
        />
        {mailbox.isPending ? <Waiting /> : null}
        {mailbox.isError ? <ErrorState error={mailbox.error} onRetry={() => void mailbox.refetch()} /> : null}
        {mailbox.data && letters.length === 0 ? (
          <EmptyState title="No letters yet">Invite somebody, or ask for a new password.</EmptyState>
        ) : null}
        <div className="grid gap-10 desk:grid-cols-[minmax(0,22rem)_minmax(0,1fr)]">
          <ul aria-label="Letters">
            {letters.map((letter) => (
              <li key={letter.id} className="border-b border-rule">
                <button
                  type="button"
                  className={`block w-full cursor-pointer px-3 py-3 text-left ${letter.id === openId ? 'border-l-[3px] border-edge bg-wash' : 'border-l-[3px] border-transparent'}`}
                  aria-pressed={letter.id === openId}
                  onClick={() => setOpenId(letter.id)}
                >
                  <b className="block">{letter.subject}</b>
                  <span className="small muted block break-all">{letter.to}</span>
                  <span className="fine muted">
                    <Time
                      iso={letter.receivedAt}
                      style="date-time"
                      zone={Intl.DateTimeFormat().resolvedOptions().timeZone}
                    />
                  </span>
                </button>
              </li>
            ))}
          </ul>
          {open ? (
            <article aria-label={open.subject} className="desk:sticky desk:top-4 desk:self-start">
              <iframe
                title={open.subject}
                srcDoc={open.html}
                sandbox="allow-popups allow-top-navigation-by-user-activation"
                className="h-[34rem] w-full border border-rule bg-white"
              />
              <details className="small mt-4">
                <summary>The same letter as plain text</summary>
                <pre className="mt-2 whitespace-pre-wrap break-words">{open.text}</pre>
              </details>
            </article>
          ) : null}
        </div>
      </main>
    </Page>
  );
}
