import { createServer, type Server } from 'node:http';
import pino, { type Logger } from 'pino';
import { openDatabase, type Database } from '../db/client';
import { openListener } from '../db/listener';
import { secondsSinceBeat } from '../db/repositories/beats';
import { deleteExpiredImports } from '../db/repositories/imports';
import { createApp } from './app';
import { makeSessions } from './auth/sessions';
import { makeThrottle } from './auth/throttle';
import { ConfigurationError, readConfig, type ServerConfig } from './config';
import { UploadFolder } from './datasets/upload';
import { DEMO_ACCOUNTS } from './demo/accounts';
import { CONNECTION_LIMITS } from './http/connections';
import { makeReader } from './reading/reader';
import { makeRunRoutes } from './runs/routes';

/** Milliseconds in which a server that was told to end must be gone. */
const LAST_CALL = 9_000;
/** Milliseconds that answers under way are waited for. */
const PATIENCE = 5_000;
/** Milliseconds between removals of sessions that have ended. */
const SWEEP_EVERY = 60 * 60_000;

function listen(
  config: ServerConfig,
  log: Logger,
  database: Database,
  closing: AbortController,
): () => Promise<void> {
  const listener = openListener(config.databaseUrl, (error) =>
    log.warn({ err: error }, 'listening connection lost'),
  );
  const throttle = makeThrottle(config.redisUrl, log);
  const reader = makeReader({ script: config.readingScript, log });
  const uploads = new UploadFolder(config.uploadFolder);
  const app = createApp(
    {
      config,
      database,
      log,
      throttle,
      uploads,
      reader,
      demoAccounts: config.demo ? [...DEMO_ACCOUNTS] : null,
      secondsSinceJob: () => secondsSinceBeat(database.db),
      closing: closing.signal,
    },
    makeRunRoutes(listener),
  );
  const sessions = makeSessions(database.db, config.secure);
  const removeLeftDrafts = () => {
    deleteExpiredImports(database.db).catch((error: unknown) =>
      log.warn({ err: error }, 'drafts that were left were not removed'),
    );
  };
  const sweep = setInterval(() => {
    removeLeftDrafts();
    sessions
      .sweep()
      .catch((error: unknown) => log.warn({ err: error }, 'ended sessions were not removed'));
  }, SWEEP_EVERY);
  uploads
    .removeAbandoned()
    .catch((error: unknown) => log.warn({ err: error }, 'abandoned uploads were not removed'));
  const server = createServer(CONNECTION_LIMITS, app);
  server.once('error', (error) => {
    log.fatal({ err: error }, `cannot listen on ${config.host}:${config.port}`);
    process.exit(1);
  });
  server.listen(config.port, config.host, () =>
    log.info({ address: server.address() }, 'server listens'),
  );
  return async () => {
    closing.abort();
    clearInterval(sweep);
    await closed(server);
    await uploads.settled();
    await Promise.all([listener.close(), reader.close(), throttle.close()]);
    await database.close();
  };
}

/**
 * Takes no more connections and waits for the answers that are under way; an upload that is still
 * coming in after `PATIENCE` is cut off, and its files go with it.
 */
async function closed(server: Server): Promise<void> {
  const cut = setTimeout(() => server.closeAllConnections(), PATIENCE);
  await new Promise((resolve) => {
    server.close(resolve);
    server.closeIdleConnections();
  });
  clearTimeout(cut);
}

function start(): void {
  const config = readConfig();
  const log = pino({ name: 'server', level: config.logLevel });
  const database = openDatabase({
    url: config.databaseUrl,
    name: 'heddle-server',
    onError: (error) => log.warn({ err: error }, 'database connection lost'),
  });
  const close = listen(config, log, database, new AbortController());
  const end = (signal: NodeJS.Signals) => {
    log.info({ signal }, 'server ends');
    setTimeout(() => process.exit(0), LAST_CALL).unref();
    close().then(
      () => process.exit(0),
      (error: unknown) => {
        log.error({ err: error }, 'ending failed');
        process.exit(1);
      },
    );
  };
  process.once('SIGTERM', end);
  process.once('SIGINT', end);
  process.on('unhandledRejection', (error) => log.error({ err: error }, 'unhandled rejection'));
}

try {
  start();
} catch (error) {
  const plain = error instanceof ConfigurationError;
  process.stderr.write(`The server cannot start: ${plain ? error.message : String(error)}\n`);
  process.exit(1);
}
