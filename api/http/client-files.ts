import { existsSync } from 'node:fs';
import type { Server } from 'node:http';
import path from 'node:path';
import express, { type Express } from 'express';
import { notFound } from './problem-error.ts';

/** The built client: hashed assets for good, the page itself never from a cache, any other path the page. */
export function serveBuiltClient(app: Express, folder: string): void {
  const page = path.join(folder, 'index.html');
  if (!existsSync(page)) throw new Error(`The client has not been built: ${page} is missing (npm run build makes it)`);
  app.use(
    '/assets',
    express.static(path.join(folder, 'assets'), { immutable: true, maxAge: '1y', index: false }),
    (_req, _res, next) => next(notFound()),
  );
  app.use(express.static(folder, { index: false, maxAge: '1h' }));
  app.get('/{*path}', (_req, res) => {
    res.set('cache-control', 'no-cache').sendFile(page);
  });
}

/** The client from its sources, reloading as they change; same origin as the API, so cookies work as in production. */
export async function serveClientSources(app: Express, server: Server): Promise<() => Promise<void>> {
  const { createServer } = await import('vite');
  const vite = await createServer({ appType: 'spa', server: { middlewareMode: true, hmr: { server } } });
  app.use(vite.middlewares);
  return () => vite.close();
}
