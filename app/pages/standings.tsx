import { useQuery } from '@tanstack/react-query';
import { Link, useSearchParams } from 'react-router-dom';
import { viewerQuery, type ViewerClass } from '../features/people/viewer.queries.ts';
import { StandingsView } from '../features/standings/standings-view.tsx';
import { standingsQuery } from '../features/standings/standings.queries.ts';
import { paths } from '../lib/paths.ts';
import { Head, Page } from '../ui/page.tsx';
import { ErrorState, Waiting } from '../ui/states.tsx';
import { ZoneProvider } from '../ui/time.tsx';

/** The class's list and the own line; of the class in the address, else of the first one. */
export function Component() {
  const [search] = useSearchParams();
  const viewer = useQuery(viewerQuery);
  const classes = viewer.data?.classes ?? [];
  const wanted = classes.find((each) => each.id === search.get('class')) ?? classes[0];
  if (!wanted) {
    return (
      <Page>
        <Head h1="Standings come with a class." lead="Join a class first; its findings make the list." />
      </Page>
    );
  }
  return <OfClass wanted={wanted} classes={classes} />;
}

function OfClass({ wanted, classes }: { wanted: ViewerClass; classes: readonly ViewerClass[] }) {
  const standings = useQuery(standingsQuery(wanted.id));
  if (!standings.data) {
    return (
      <Page>
        <div className="head">
          {standings.isError ? (
            <ErrorState error={standings.error} onRetry={() => void standings.refetch()} />
          ) : (
            <Waiting />
          )}
        </div>
      </Page>
    );
  }
  return (
    <ZoneProvider zone={wanted.timeZone}>
      <Page>
        <StandingsView standings={standings.data} chooser={<Others wanted={wanted} classes={classes} />} />
      </Page>
    </ZoneProvider>
  );
}

function Others({ wanted, classes }: { wanted: ViewerClass; classes: readonly ViewerClass[] }) {
  const others = classes.filter((each) => each.id !== wanted.id);
  if (others.length === 0) return null;
  return (
    <>
      {others.map((each) => (
        <span key={each.id}>
          {' · '}
          <Link to={paths.standings(each.id)}>{each.name}</Link>
        </span>
      ))}
    </>
  );
}
