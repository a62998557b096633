import { isRouteErrorResponse, useRouteError } from 'react-router-dom';
import { ApiProblem } from '../lib/api.ts';
import { paths } from '../lib/paths.ts';
import { LinkButton } from '../ui/button.tsx';
import { Head, Page } from '../ui/page.tsx';
import { Shell } from '../ui/shell.tsx';
import { ErrorState } from '../ui/states.tsx';

/** The body of a page that is not there, or not the reader's. */
export function NotFound() {
  return (
    <Page>
      <Head
        where="not found"
        h1="There is nothing at this address."
        lead="It may have moved, or it may not be open to you."
      />
      <p>
        <LinkButton to={paths.today()}>Back to the start</LinkButton>
      </p>
    </Page>
  );
}

function isNotFound(error: unknown): boolean {
  if (isRouteErrorResponse(error)) return error.status === 404;
  return error instanceof ApiProblem && error.type === 'not-found';
}

/** Where a page breaks: says so, and loses nothing that was typed. */
export function BrokenPage() {
  const error = useRouteError();
  return (
    <Shell>
      {isNotFound(error) ? (
        <NotFound />
      ) : (
        <Page>
          <Head where="not shown" h1="This page could not be shown." />
          <div>
            <ErrorState
              error={error}
              onRetry={() => window.location.reload()}
              acts={
                <LinkButton to={paths.today()} small>
                  Back to the start
                </LinkButton>
              }
            />
          </div>
        </Page>
      )}
    </Shell>
  );
}
