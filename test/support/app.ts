import { randomUUID } from 'node:crypto';
import { once } from 'node:events';
import { createServer } from 'node:http';
import { pino } from 'pino';
import { openListener } from '../../db/listener';
import { secondsSinceBeat } from '../../db/repositories/beats';
import { createApp } from '../../server/app';
import { makeSessions } from '../../server/auth/sessions';
import { makeThrottle, THROTTLE_LIMITS, type ThrottleLimits } from '../../server/auth/throttle';
import { readConfig } from '../../server/config';
import { makeNetworkReader, type ReaderOptions } from '../../server/datasets/networkReader';
import { DEMO_ACCOUNTS } from '../../server/demo/accounts';
import { CONNECTION_LIMITS } from '../../server/http/connections';
import { makeRunRoutes } from '../../server/runs/routes';
import { Client } from './client';
import { freshDatabase, type TestDatabase } from './database';
import { buildParseThread } from './parseThread';

export interface TestApp {
  readonly origin: string;
  readonly database: TestDatabase;
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
  readonly reader?: Pick<ReaderOptions, 'heap' | 'time'>;
}

/** Starts the real application on a loopback port over a database of its own. */
export async function startApp(options: AppOptions = {}): Promise<TestApp> {
  const database = await freshDatabase();
  const { script, remove } = await buildParseThread();
  const config = readConfig({
    NODE_ENV: 'test',
    DATABASE_URL: database.url,
    LOG_LEVEL: 'silent',
    ...options.environment,
  });
  const log = pino({ level: config.logLevel });
  const closing = new AbortController();
  const listener = openListener(database.url, () => undefined);
  const limits = { ...THROTTLE_LIMITS, ...options.limits };
  const throttle = makeThrottle(options.redisUrl ?? null, log, limits, `test-${randomUUID()}`);
  const reader = makeNetworkReader({ script, log, ...options.reader });
  const app = createApp(
    {
      config,
      database,
      log,
      throttle,
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
  const sessions = makeSessions(database.db, config.secure);
  return {
    origin,
    database,
    db: database.db,
    visitor: () => new Client(origin),
    clientOf: async (userId) => new Client(origin, await sessions.start(userId)),
    close: async () => {
      closing.abort();
      server.closeAllConnections();
      server.close();
      await once(server, 'close');
      await Promise.all([listener.close(), reader.close(), throttle.close()]);
      await database.drop();
      remove();
    },
  };
}
