import { existsSync } from 'node:fs';
import { join } from 'node:path';
import express, { Router } from 'express';

const YEAR = '365d';

/**
 * Serves the browser application. Files under assets/ carry a hash in their name and never change;
 * index.html is asked for anew each time; every other address that wants a page gets index.html.
 * @throws Error if the folder holds no index.html
 */
export function pages(folder: string): Router {
  const index = join(folder, 'index.html');
  if (!existsSync(index)) {
    throw new Error(`HEDDLE_SPA_DIR is "${folder}": there is no index.html in it; build it first.`);
  }
  const router = Router();
  router.use(
    '/assets',
    express.static(join(folder, 'assets'), {
      index: false,
      immutable: true,
      maxAge: YEAR,
      fallthrough: false,
      redirect: false,
    }),
  );
  router.use(express.static(folder, { index: false, maxAge: 0, redirect: false }));
  router.get(/^(?!\/api(\/|$)).*/, (request, response, next) => {
    if (request.accepts(['html', 'json']) !== 'html') return next();
    response.setHeader('Cache-Control', 'no-cache');
    response.sendFile(index, { cacheControl: false });
  });
  return router;
}
