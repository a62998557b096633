import { useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { viewerQuery } from '../features/people/viewer.queries.ts';
import { Sheet } from '../features/sheet/sheet.tsx';
import { sheetQuery } from '../features/sheet/sheet.queries.ts';
import { ApiProblem } from '../lib/api.ts';
import { Page } from '../ui/page.tsx';
import { ErrorState, Waiting } from '../ui/states.tsx';
import { NotFound } from './not-found.tsx';

/** The author's own sheet in a round. */
export function Component() {
  const { roundId = '' } = useParams();
  const viewer = useQuery(viewerQuery);
  const sheet = useQuery(sheetQuery(roundId));
  if (sheet.error instanceof ApiProblem && sheet.error.type === 'not-found') return <NotFound />;
  if (sheet.data && viewer.data) {
    // A sheet taken back is written on anew.
    const state = sheet.data.handedIn ? 'handed-in' : 'open';
    return <Sheet key={`${sheet.data.derivationId} ${state}`} sheet={sheet.data} userId={viewer.data.user.id} />;
  }
  return (
    <Page work>
      <div className="head">
        {sheet.isError ? (
          <ErrorState error={sheet.error} onRetry={() => void sheet.refetch()} />
        ) : (
          <Waiting lines={5}>Your sheet…</Waiting>
        )}
      </div>
    </Page>
  );
}
