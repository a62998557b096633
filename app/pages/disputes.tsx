import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { stepWords } from '../../shared/lib/step-words.ts';
import { Desk } from '../features/disputes/desk.tsx';
import { disputesQuery } from '../features/disputes/disputes.queries.ts';
import { paths } from '../lib/paths.ts';
import { LinkButton } from '../ui/button.tsx';
import { Head, Page } from '../ui/page.tsx';
import { ErrorState, Waiting } from '../ui/states.tsx';
import { ZoneProvider } from '../ui/time.tsx';

/** Where teachers and assistants settle what is contested or undecided. */
export function Component() {
  const [search, setSearch] = useSearchParams();
  const disputes = useQuery(disputesQuery);
  const items = disputes.data;
  if (!items) {
    return (
      <Page wide>
        <div className="head">
          {disputes.isError ? (
            <ErrorState error={disputes.error} onRetry={() => void disputes.refetch()} />
          ) : (
            <Waiting />
          )}
        </div>
      </Page>
    );
  }
  const wanted = search.get('case');
  const open = items.find((item) => item.disputeId === wanted) ?? items[0];
  if (!open) {
    return (
      <Page wide>
        <Head
          h1="Nothing is in dispute."
          lead="What students contest, and what the checker leaves undecided, comes to this desk."
        />
        <LinkButton to={paths.today()}>Back to the rounds</LinkButton>
      </Page>
    );
  }
  const onOpen = (disputeId: string | null) => setSearch(disputeId ? { case: disputeId } : {}, { replace: true });
  return (
    <ZoneProvider zone={open.timeZone}>
      <Page wide>
        <title>Disputes · Slipstone</title>
        <Desk items={items} openId={open.disputeId} onOpen={onOpen} wordStep={stepWords} />
      </Page>
    </ZoneProvider>
  );
}
