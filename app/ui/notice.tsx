import type { ReactNode } from 'react';
import { classNames } from './class-names.ts';

export interface NoticeProps {
  /** info: a fact. plum: in dispute or undecided. grave: something is at stake. */
  readonly kind?: 'info' | 'plum' | 'grave';
  /** The first words, which say it all. */
  readonly title: ReactNode;
  readonly children?: ReactNode;
  readonly acts?: ReactNode;
  /** Read out at once where it appears while one is at work. */
  readonly isLive?: boolean;
}

/** A ruled sentence that the reader should not miss. */
export function Notice({ kind = 'info', title, children, acts, isLive }: NoticeProps) {
  return (
    <div className={classNames('notice', kind !== 'info' && kind)} role={isLive ? 'alert' : undefined}>
      <b>{title}</b> {children}
      {acts ? <div className="acts mt-2">{acts}</div> : null}
    </div>
  );
}
