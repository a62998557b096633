import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { configure, render, type RenderResult } from '@testing-library/react';
import type { ComponentType } from 'react';
import { createMemoryRouter, RouterProvider, useLocation } from 'react-router-dom';
import { ZoneProvider } from '../../app/ui/time.tsx';

// A page brings its parts when they are first needed; on a busy machine that takes longer than the usual second.
configure({ asyncUtilTimeout: 8_000 });

function Elsewhere() {
  const { pathname, search } = useLocation();
  return <p>at {pathname + search}</p>;
}

/** A page at its address, with stores of its own; any other address shows where one has come to. */
export function renderPage(Page: ComponentType, path: string, at: string = path): RenderResult {
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  const router = createMemoryRouter(
    [
      { path, element: <Page /> },
      { path: '*', element: <Elsewhere /> },
    ],
    { initialEntries: [at] },
  );
  return render(
    <QueryClientProvider client={client}>
      <ZoneProvider zone="Europe/Vienna">
        <RouterProvider router={router} />
      </ZoneProvider>
    </QueryClientProvider>,
  );
}
