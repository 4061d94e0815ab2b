import express, { type Express } from 'express';
import { findRole } from '../db/repositories/memberships';
import { makeSessions } from './auth/sessions';
import type { Dependencies } from './dependencies';
import { securityHeaders, compressed } from './http/security';
import { requireSameOrigin } from './http/origin';
import { requestLog } from './http/log';
import { notFound } from './http/parse';
import { pages } from './http/pages';
import { answerProblem } from './http/problem';
import { buildRouter } from './http/router';
import { makeRoutes, type RunRoutes } from './routes';

/** The whole HTTP application: API first, then the browser application's files. */
export function createApp(
  dependencies: Dependencies,
  runRoutes: (dependencies: Dependencies) => RunRoutes,
): Express {
  const { config, database, log, closing } = dependencies;
  const sessions = makeSessions(database.db, config.secure);
  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', config.trustedProxies);
  app.set('etag', false);
  app.use(requestLog(log));
  app.use(securityHeaders(config.secure));
  app.use(compressed());
  app.use(requireSameOrigin(config.publicOrigin));
  app.use(
    buildRouter(
      makeRoutes(dependencies, sessions, runRoutes(dependencies)),
      {
        actorOf: (request) => sessions.actorOf(request.get('cookie')),
        roleOf: (userId, workspaceId) => findRole(database.db, userId, workspaceId),
      },
      closing,
    ),
  );
  if (config.spaFolder !== null) app.use(pages(config.spaFolder));
  app.use((_request, _response, next) => next(notFound('addresses')));
  app.use(answerProblem);
  return app;
}
