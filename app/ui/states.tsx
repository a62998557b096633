import type { ReactNode } from 'react';
import { ApiProblem } from '../lib/api.ts';
import { Button } from './button.tsx';
import { classNames } from './class-names.ts';

const WIDTHS = ['90%', '70%', '82%', '64%', '76%'] as const;

/** Something is being fetched: ruled empty lines, which do not move. */
export function Waiting({
  children = 'One moment…',
  lines = 3,
  className,
}: {
  children?: ReactNode;
  lines?: number;
  className?: string;
}) {
  return (
    <output className={classNames('waiting', className)}>
      <span className="aside-words text-ink">{children}</span>
      {Array.from({ length: lines }, (_, index) => (
        <i key={index} style={{ width: WIDTHS[index % WIDTHS.length] }} aria-hidden="true" />
      ))}
    </output>
  );
}

/** Nothing here yet, and what will stand here. */
export function EmptyState({
  title = 'Nothing here yet',
  children,
  acts,
}: {
  title?: ReactNode;
  children?: ReactNode;
  acts?: ReactNode;
}) {
  return (
    <div>
      <p className="aside-words text-ink">{title}</p>
      {children ? <div className="small muted mt-1">{children}</div> : null}
      {acts ? <div className="acts mt-3">{acts}</div> : null}
    </div>
  );
}

/** Words for anything that a request can fail with. */
export function problemWords(error: unknown): { title: string; detail: string } {
  if (error instanceof ApiProblem) {
    return { title: error.title, detail: error.detail ?? '' };
  }
  return { title: 'Something went wrong here', detail: 'The page could not be shown. Nothing you typed is lost.' };
}

/** What failed, in the server's words, and a way to try again. */
export function ErrorState({ error, onRetry, acts }: { error: unknown; onRetry?: () => void; acts?: ReactNode }) {
  const { title, detail } = problemWords(error);
  // Only where somebody at school would have to look into it.
  const requestId = error instanceof ApiProblem && error.status >= 500 ? error.requestId : undefined;
  return (
    <div role="alert">
      <p className="aside-words text-ink">{title}</p>
      {detail ? <p className="small mt-1">{detail}</p> : null}
      {requestId ? <p className="fine muted mt-1">Number of the request: {requestId}</p> : null}
      {onRetry || acts ? (
        <div className="acts mt-2">
          {onRetry ? (
            <Button kind="quiet" small onClick={onRetry}>
              Try again
            </Button>
          ) : null}
          {acts}
        </div>
      ) : null}
    </div>
  );
}
