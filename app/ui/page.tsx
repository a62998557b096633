import type { ReactNode } from 'react';
import { classNames } from './class-names.ts';

export interface PageProps {
  readonly children: ReactNode;
  /** A teacher's page: the full 1360 px, without gutter and margin. */
  readonly wide?: boolean;
  /** Work in hand: on a phone the navigation gives way to one link back. */
  readonly work?: boolean;
  readonly className?: string;
}

/** The page grid: gutter, edge, text, gap, margin. Children stand in the text column unless they say otherwise. */
export function Page({ children, wide, work, className }: PageProps) {
  return <div className={classNames(wide ? 'wide' : 'page', work && 'work', className)}>{children}</div>;
}

export interface HeadProps {
  /** When and where, in italics above. */
  readonly where?: ReactNode;
  /** The statement; one a page. */
  readonly h1: ReactNode;
  /** The window's title, where h1 is not plain text. */
  readonly title?: string;
  /** One sentence under it. */
  readonly lead?: ReactNode;
  /** Buttons at the right on wide pages. */
  readonly acts?: ReactNode;
  readonly both?: boolean;
}

/** The head of a page, which also names the window. */
export function Head({ where, h1, title, lead, acts, both }: HeadProps) {
  const name = title ?? (typeof h1 === 'string' ? h1.replace(/\.$/, '') : null);
  const words = (
    <div>
      {where ? <p className="where">{where}</p> : null}
      <h1>{h1}</h1>
      {lead ? <p className="lead">{lead}</p> : null}
    </div>
  );
  return (
    <div className={classNames('head', both && 'both')}>
      <title>{name ? `${name} · Slipstone` : 'Slipstone'}</title>
      {acts ? (
        <div className="head-acts">
          {words}
          <div className="acts">{acts}</div>
        </div>
      ) : (
        words
      )}
    </div>
  );
}

interface AreaProps {
  readonly children: ReactNode;
  readonly className?: string;
}

/** Text, gap and margin together. */
export function Both({ children, className }: AreaProps) {
  return <section className={classNames('both', className)}>{children}</section>;
}

/** In the margin; on a phone, under what came before. */
export function Side({ children, className }: AreaProps) {
  return <aside className={classNames('side', className)}>{children}</aside>;
}
