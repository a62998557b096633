import { existsSync, readFileSync } from 'node:fs';
import type { Server } from 'node:http';
import path from 'node:path';
import express, { type Express } from 'express';
import { notFound } from './problem-error.ts';

/** The built client: hashed assets for good, the page itself never from a cache, any other path the page. */
export function serveBuiltClient(app: Express, folder: string, demo: boolean): void {
  const page = path.join(folder, 'index.html');
  if (!existsSync(page)) throw new Error(`The client has not been built: ${page} is missing (npm run build makes it)`);
  const html = markDemo(readFileSync(page, 'utf8'), demo);
  app.use(
    '/assets',
    express.static(path.join(folder, 'assets'), { immutable: true, maxAge: '1y', index: false }),
    (_req, _res, next) => next(notFound()),
  );
  app.use(express.static(folder, { index: false, maxAge: '1h' }));
  app.get('/{*path}', (_req, res) => {
    res.set('cache-control', 'no-cache').type('html').send(html);
  });
}

/** The client from its sources, reloading as they change; same origin as the API, so cookies work as in production. */
export async function serveClientSources(app: Express, server: Server, demo: boolean): Promise<() => Promise<void>> {
  const { createServer } = await import('vite');
  const vite = await createServer({
    appType: 'spa',
    server: { middlewareMode: true, hmr: { server } },
    plugins: [{ name: 'mark-demo', transformIndexHtml: (html) => markDemo(html, demo) }],
  });
  app.use(vite.middlewares);
  return () => vite.close();
}

/** The client offers the demo's people and pages where the document is marked so; no script is needed for it. */
function markDemo(html: string, demo: boolean): string {
  return demo ? html.replace('<html ', '<html data-demo ') : html;
}
