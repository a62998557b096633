import type { ComponentType } from 'react';
import type { RouteObject } from 'react-router-dom';
import { createBrowserRouter } from 'react-router-dom';
import { RequireViewer } from './pages/frame.tsx';
import { BrokenPage, NotFound } from './pages/not-found.tsx';
import { Waiting } from './ui/states.tsx';

interface PageRoute {
  readonly path: string;
  readonly load: () => Promise<{ readonly Component: ComponentType }>;
}

/** Whether this is a place to try things out: while developing, or where the server marks the document so. */
const isTrial = import.meta.env.DEV || document.documentElement.dataset['demo'] !== undefined;

/** Pages for people who have signed in; they stand in the shell. One line a page, in the order of paths.ts. */
const INSIDE: readonly PageRoute[] = [
  { path: '/', load: () => import('./pages/today.tsx') },
  { path: '/account', load: () => import('./pages/account.tsx') },
  { path: '/classes', load: () => import('./pages/classes.tsx') },
  { path: '/classes/:classId', load: () => import('./pages/class.tsx') },
  { path: '/tasks', load: () => import('./pages/tasks.tsx') },
  { path: '/tasks/:taskId', load: () => import('./pages/task.tsx') },
  { path: '/rounds/new', load: () => import('./pages/round-new.tsx') },
  { path: '/rounds/:roundId', load: () => import('./pages/round.tsx') },
  { path: '/rounds/:roundId/write', load: () => import('./pages/write.tsx') },
  { path: '/reviews/:reviewId', load: () => import('./pages/review.tsx') },
  { path: '/derivations/:derivationId', load: () => import('./pages/derivation.tsx') },
  { path: '/disputes', load: () => import('./pages/disputes.tsx') },
  { path: '/standings', load: () => import('./pages/standings.tsx') },
  { path: '/admin', load: () => import('./pages/admin.tsx') },
  { path: '/help', load: () => import('./pages/help.tsx') },
];

/** Pages for everyone; each draws its own surroundings. */
const OUTSIDE: readonly PageRoute[] = [
  { path: '/signin', load: () => import('./pages/signin.tsx') },
  { path: '/signup', load: () => import('./pages/signup.tsx') },
  { path: '/join/:token', load: () => import('./pages/join.tsx') },
  { path: '/reset', load: () => import('./pages/reset.tsx') },
  { path: '/reset/:token', load: () => import('./pages/reset.tsx') },
  { path: '/account/email/:token', load: () => import('./pages/confirm-email.tsx') },
];

/** Pages shown only while developing and in the demo. */
const TRIAL: readonly PageRoute[] = [
  { path: '/parts', load: () => import('./pages/parts.tsx') },
  { path: '/mailbox', load: () => import('./pages/mailbox.tsx') },
];

function toRoute({ path, load }: PageRoute): RouteObject {
  return { path, lazy: load };
}

/** Every address of the client, each with its page loaded when first needed. */
export const router = createBrowserRouter([
  {
    errorElement: <BrokenPage />,
    hydrateFallbackElement: <Waiting className="wide" />,
    children: [
      ...OUTSIDE.map(toRoute),
      ...(isTrial ? TRIAL.map(toRoute) : []),
      { element: <RequireViewer />, children: [...INSIDE.map(toRoute), { path: '*', element: <NotFound /> }] },
    ],
  },
]);
