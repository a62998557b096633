import { useQuery } from '@tanstack/react-query';
import { Navigate, Outlet, ScrollRestoration, useLocation } from 'react-router-dom';
import { disputesQuery } from '../features/disputes/disputes.queries.ts';
import type { Viewer } from '../features/people/viewer.queries.ts';
import { viewerQuery } from '../features/people/viewer.queries.ts';
import { paths } from '../lib/paths.ts';
import { Page } from '../ui/page.tsx';
import type { NavItem } from '../ui/shell.tsx';
import { Shell } from '../ui/shell.tsx';
import { ErrorState, Waiting } from '../ui/states.tsx';
import { ZoneProvider } from '../ui/time.tsx';

/** The words in the bar, by what the person may do. `waiting` disputes are counted beside their word. */
export function navFor(viewer: Viewer, waiting?: number): readonly NavItem[] {
  const { role } = viewer.user;
  const standings = { to: paths.standings(), label: 'Standings' };
  const disputes = { to: paths.disputes(), label: 'Disputes', ...(waiting ? { count: waiting } : {}) };
  const work = ['/derivations', '/reviews', '/rounds'];
  if (role === 'admin') return [{ to: paths.admin(), label: 'School' }];
  if (role === 'student')
    return [{ to: paths.today(), label: 'Today', also: work }, ...(isAssistant(viewer) ? [disputes] : []), standings];
  return [
    { to: paths.today(), label: 'Rounds', also: work },
    { to: paths.classes(), label: 'Classes' },
    { to: paths.tasks(), label: 'Tasks' },
    disputes,
    standings,
  ];
}

function isAssistant({ classes }: Viewer): boolean {
  return classes.some((each) => each.role === 'assistant');
}

function placeOf({ classes, school }: Viewer): string {
  return classes.length === 1 && classes[0] ? classes[0].name : school.name;
}

function footOf({ classes, school }: Viewer): string {
  const zone = classes[0]?.timeZone;
  const city = zone?.split('/').at(-1)?.replaceAll('_', ' ');
  return city ? `${school.name} · times are ${city} time` : school.name;
}

/** Around every page for people who have signed in; others are sent to sign in, and come back. */
export function RequireViewer() {
  const viewer = useQuery(viewerQuery);
  const { pathname, search } = useLocation();
  const rules = viewer.data ? viewer.data.user.role === 'teacher' || isAssistant(viewer.data) : false;
  const disputes = useQuery({ ...disputesQuery, enabled: rules });
  if (viewer.data === null)
    return <Navigate to={paths.signIn(pathname === '/' ? undefined : pathname + search)} replace />;
  if (!viewer.data) {
    return (
      <Shell>
        <Page>
          <div className="head">
            {viewer.isError ? <ErrorState error={viewer.error} onRetry={() => void viewer.refetch()} /> : <Waiting />}
          </div>
        </Page>
      </Shell>
    );
  }
  if (viewer.data.user.role === 'admin' && pathname === paths.today()) return <Navigate to={paths.admin()} replace />;
  return (
    <Shell
      nav={navFor(viewer.data, disputes.data?.length)}
      who={{ name: viewer.data.user.name, place: placeOf(viewer.data) }}
      foot={footOf(viewer.data)}
    >
      <ZoneProvider zone={viewer.data.classes[0]?.timeZone ?? 'UTC'}>
        <Outlet />
      </ZoneProvider>
      <ScrollRestoration />
    </Shell>
  );
}
