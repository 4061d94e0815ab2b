import { randomUUID } from 'node:crypto';
import { once } from 'node:events';
import { mkdtemp, rm } from 'node:fs/promises';
import { createServer } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pino } from 'pino';
import { openDatabase, type Database } from '../../db/client';
import { openListener } from '../../db/listener';
import { secondsSinceBeat } from '../../db/repositories/beats';
import { createApp } from '../../server/app';
import { makeSessions } from '../../server/auth/sessions';
import { makeThrottle, THROTTLE_LIMITS, type ThrottleLimits } from '../../server/auth/throttle';
import { readConfig } from '../../server/config';
import { UploadFolder } from '../../server/datasets/upload';
import { DEMO_ACCOUNTS } from '../../server/demo/accounts';
import { CONNECTION_LIMITS } from '../../server/http/connections';
import { makeReader, type ReaderOptions } from '../../server/reading/reader';
import { makeRunRoutes } from '../../server/runs/routes';
import { Client } from './client';
import { freshDatabase, type TestDatabase } from './database';
import { buildReadingScript } from './readingScript';

export interface TestApp {
  readonly origin: string;
  /** Where uploads lie while they are read; nobody else's. */
  readonly uploadFolder: string;
  readonly db: TestDatabase['db'];
  /** Somebody without a session. */
  visitor(): Client;
  /** A client with a session of this person. */
  clientOf(userId: string): Promise<Client>;
  close(): Promise<void>;
}

export interface AppOptions {
  readonly environment?: Readonly<Record<string, string>>;
  readonly limits?: Partial<ThrottleLimits>;
  /** Attempts count in this Redis, under keys of their own; in memory without one. */
  readonly redisUrl?: string;
  /** The address by which the application reaches the database, e.g. one that can be cut off. */
  readonly reach?: (databaseUrl: string) => string;
  /** Limits of reading other than the usual ones. */
  readonly reading?: Pick<ReaderOptions, 'heap' | 'resident' | 'time'>;
}

/** Starts the real application on a loopback port over a database of its own. */
export async function startApp(options: AppOptions = {}): Promise<TestApp> {
  const fresh = await freshDatabase();
  const url = options.reach?.(fresh.url) ?? fresh.url;
  const database: Database = options.reach === undefined ? fresh : openDatabase({ url });
  const { script, remove } = await buildReadingScript();
  const uploadFolder = await mkdtemp(join(tmpdir(), 'heddle-test-'));
  const config = readConfig({
    NODE_ENV: 'test',
    DATABASE_URL: url,
    HEDDLE_UPLOAD_DIR: uploadFolder,
    LOG_LEVEL: 'silent',
    ...options.environment,
  });
  const log = pino({ level: config.logLevel });
  const closing = new AbortController();
  const listener = openListener(url, () => undefined);
  const limits = { ...THROTTLE_LIMITS, ...options.limits };
  const throttle = makeThrottle(options.redisUrl ?? null, log, limits, `test-${randomUUID()}`);
  const reader = makeReader({ script, log, ...options.reading });
  const app = createApp(
    {
      config,
      database,
      log,
      throttle,
      uploads: new UploadFolder(config.uploadFolder),
      reader,
      demoAccounts: config.demo ? [...DEMO_ACCOUNTS] : null,
      secondsSinceJob: () => secondsSinceBeat(database.db),
      closing: closing.signal,
    },
    makeRunRoutes(listener),
  );
  const server = createServer(CONNECTION_LIMITS, app).listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = server.address();
  if (typeof address !== 'object' || address === null) throw new Error('No port.');
  const origin = `http://127.0.0.1:${address.port}`;
  const sessions = makeSessions(fresh.db, config.secure);
  return {
    origin,
    uploadFolder,
    db: fresh.db,
    visitor: () => new Client(origin),
    clientOf: async (userId) => new Client(origin, await sessions.start(userId)),
    close: async () => {
      closing.abort();
      server.closeAllConnections();
      server.close();
      await once(server, 'close');
      await Promise.all([listener.close(), reader.close(), throttle.close()]);
      if (database !== fresh) await database.close();
      await fresh.drop();
      remove();
      await rm(uploadFolder, { recursive: true, force: true });
    },
  };
}
