import type { ReactNode } from 'react';
import { useEffect, useRef } from 'react';
import { Link, NavLink, useLocation } from 'react-router-dom';
import { paths } from '../lib/paths.ts';
import { classNames } from './class-names.ts';
import { Mark } from './mark.tsx';
import { ThemeToggle } from './theme-toggle.tsx';
import { Toasts } from './toasts.tsx';

export interface NavItem {
  readonly to: string;
  readonly label: string;
  /** How many wait there; 0 is not shown. */
  readonly count?: number;
  /** Other addresses that belong to this word. */
  readonly also?: readonly string[];
}

export interface ShellProps {
  readonly nav?: readonly NavItem[];
  /** Who is signed in and where, at the right of the bar. */
  readonly who?: { readonly name: string; readonly place?: string };
  readonly foot?: ReactNode;
  readonly children: ReactNode;
}

function isAt(item: NavItem, pathname: string): boolean {
  if (item.to === pathname) return true;
  const roots = [...(item.to === '/' ? [] : [item.to]), ...(item.also ?? [])];
  return roots.some((root) => pathname === root || pathname.startsWith(`${root}/`));
}

const NAV_CLASSES = ['nav-one', 'nav-one', 'nav-few', 'nav-few', 'nav-few'] as const;

/** On a phone the row of words runs off the side; the one that is current is brought into sight. */
function useCurrentInSight(pathname: string) {
  const nav = useRef<HTMLElement>(null);
  useEffect(() => {
    const row = nav.current;
    const current = row?.querySelector<HTMLElement>('[aria-current]');
    if (!row || !current) return;
    const right = current.offsetLeft + current.offsetWidth + 24;
    row.scrollLeft = right > row.clientWidth ? right - row.clientWidth : 0;
  }, [pathname]);
  return nav;
}

function Nav({ items }: { items: readonly NavItem[] }) {
  const { pathname } = useLocation();
  const nav = useCurrentInSight(pathname);
  return (
    <nav ref={nav} aria-label="Main" className={classNames('strokes', NAV_CLASSES[items.length] ?? 'nav-many')}>
      {items.map((item) => (
        <Link key={item.to} to={item.to} className="stroke" aria-current={isAt(item, pathname) ? 'page' : undefined}>
          {item.label}
          {item.count ? ' ' : null}
          {item.count ? <span className="count">{item.count}</span> : null}
        </Link>
      ))}
    </nav>
  );
}

/** Moves the focus to the new page's content, so that a screen reader starts there. */
function useFocusOnArrival() {
  const main = useRef<HTMLElement>(null);
  const { pathname } = useLocation();
  const last = useRef(pathname);
  useEffect(() => {
    if (last.current === pathname) return;
    last.current = pathname;
    main.current?.focus({ preventScroll: true });
  }, [pathname]);
  return main;
}

/** What stands around every page: skip link, bar, page, foot. Pages say by `<Page wide>` or `<Page work>` how it stands. */
export function Shell({ nav = [], who, foot, children }: ShellProps) {
  const main = useFocusOnArrival();
  return (
    <div className="shell">
      <a className="skip" href="#main">
        Skip to the page
      </a>
      <header className="top">
        <Link to={paths.today()} className="mark">
          <Mark />
          Slipstone
        </Link>
        {nav.length > 0 ? <Nav items={nav} /> : null}
        {who ? (
          <p className="who">
            <NavLink to={paths.account()} className="who-link">
              <b>{who.name}</b>
              {who.place ? <span className="who-place"> · {who.place}</span> : null}
            </NavLink>
          </p>
        ) : null}
      </header>
      <main id="main" ref={main} tabIndex={-1}>
        {children}
      </main>
      <footer className="foot">
        {foot ? <p>{foot}</p> : null}
        <p className="foot-acts no-print">
          <Link to={paths.help()}>Help</Link>
        </p>
        <ThemeToggle />
      </footer>
      <Toasts />
    </div>
  );
}
