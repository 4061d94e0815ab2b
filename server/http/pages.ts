import { existsSync } from 'node:fs';
import { join, resolve } from 'node:path';
import express, { Router } from 'express';
import { ConfigurationError } from '../config';
import { notFound } from './parse';

const YEAR = '365d';
const INDEX = 'index.html';

/**
 * Serves the browser application. Files under assets/ carry a hash in their name and never change;
 * index.html is asked for anew each time; every other address that wants a page gets index.html.
 * @throws ConfigurationError if the folder holds no index.html
 */
export function pages(folder: string): Router {
  const root = resolve(folder);
  if (!existsSync(join(root, INDEX))) {
    throw new ConfigurationError(
      `HEDDLE_SPA_DIR is "${folder}": there is no ${INDEX} in it; build the pages first.`,
    );
  }
  const router = Router();
  const assets = { index: false, immutable: true, maxAge: YEAR, redirect: false };
  router.use('/assets', express.static(join(root, 'assets'), assets));
  router.use('/assets', (_request, _response, next) => next(notFound('files')));
  router.use(express.static(root, { index: false, maxAge: 0, redirect: false }));
  router.get(/^(?!\/api(\/|$)).*/, (request, response, next) => {
    if (request.accepts(['html', 'json']) !== 'html') return next();
    response.setHeader('Cache-Control', 'no-cache');
    response.sendFile(INDEX, { root, cacheControl: false });
  });
  return router;
}
