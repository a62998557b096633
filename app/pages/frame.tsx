import { useQuery } from '@tanstack/react-query';
import { Navigate, Outlet, ScrollRestoration, useLocation } from 'react-router-dom';
import type { Viewer } from '../features/people/viewer.queries.ts';
import { viewerQuery } from '../features/people/viewer.queries.ts';
import { paths } from '../lib/paths.ts';
import { Page } from '../ui/page.tsx';
import type { NavItem } from '../ui/shell.tsx';
import { Shell } from '../ui/shell.tsx';
import { ErrorState, Waiting } from '../ui/states.tsx';
import { ZoneProvider } from '../ui/time.tsx';

/** The words in the bar, by what the person may do. */
export function navFor(viewer: Viewer): readonly NavItem[] {
  const isTeacher = viewer.user.role !== 'student';
  const isAssistant = viewer.classes.some((each) => each.role === 'assistant');
  const standings = { to: paths.standings(), label: 'Standings' };
  const disputes = { to: paths.disputes(), label: 'Disputes' };
  const work = ['/derivations', '/reviews', '/rounds'];
  if (!isTeacher)
    return [{ to: paths.today(), label: 'Today', also: work }, ...(isAssistant ? [disputes] : []), standings];
  return [
    { to: paths.today(), label: 'Rounds', also: work },
    { to: paths.classes(), label: 'Classes' },
    { to: paths.tasks(), label: 'Tasks' },
    disputes,
    { to: paths.insights(), label: 'Insights' },
    standings,
    ...(viewer.user.role === 'admin' ? [{ to: paths.admin(), label: 'School' }] : []),
  ];
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
  return (
    <Shell
      nav={navFor(viewer.data)}
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
