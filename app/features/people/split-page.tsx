import { lazy, Suspense, type ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { paths } from '../../lib/paths.ts';
import { Mark } from '../../ui/mark.tsx';
import './split.css';

const SplitFigure = lazy(() => import('./split-figure.tsx'));

export interface SplitPageProps {
  readonly h1: string;
  readonly lead?: ReactNode;
  readonly children: ReactNode;
}

/** Around every page for people who have not signed in: the form on paper, a derivation on slate. */
export function SplitPage({ h1, lead, children }: SplitPageProps) {
  return (
    <div className="split">
      <title>{`${h1.replace(/\.$/, '')} · Slipstone`}</title>
      <header className="split-top">
        <Link to={paths.signIn()} className="mark">
          <Mark />
          Slipstone
        </Link>
      </header>
      <main className="split-form" id="main">
        <h1>{h1}</h1>
        {lead ? <p className="lead muted mt-1.5">{lead}</p> : null}
        {children}
      </main>
      <aside className="split-figure slate" aria-label="What it is about">
        <Suspense fallback={null}>
          <SplitFigure />
        </Suspense>
      </aside>
      <footer className="split-foot fine muted">Authors and reviewers never learn each other’s names.</footer>
    </div>
  );
}
