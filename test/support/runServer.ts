import { once } from 'node:events';
import { createServer } from 'node:http';
import pino from 'pino';
import { secondsSinceBeat } from '../../db/repositories/beats';
import { memberships, users } from '../../db/schema/index';
import { createApp } from '../../server/app';
import { makeSessions } from '../../server/auth/sessions';
import { makeThrottle } from '../../server/auth/throttle';
import { readConfig } from '../../server/config';
import { UploadFolder } from '../../server/datasets/upload';
import { makeRunRoutes } from '../../server/runs/routes';
import type { Role } from '../../server/contract/enums';
import type { Workshop } from './workshop';

/** The whole HTTP application over the database of a workshop, on a loopback port. */
export interface RunServer {
  readonly origin: string;
  /** A new person with this role, and the Cookie header of their session. */
  join(workspaceId: string, role: Role): Promise<{ userId: string; cookie: string }>;
  close(): Promise<void>;
}

export async function serve(workshop: Workshop): Promise<RunServer> {
  const closing = new AbortController();
  const config = readConfig({ ...workshop.environment(), NODE_ENV: 'test', LOG_LEVEL: 'silent' });
  const unused = () => Promise.reject(new Error('Not part of these tests.'));
  const log = pino({ level: config.logLevel });
  const throttle = makeThrottle(null, log);
  const app = createApp(
    {
      config,
      database: workshop.database,
      log,
      throttle,
      uploads: new UploadFolder(config.uploadFolder),
      reader: {
        read: unused,
        readDraft: unused,
        readDraftNetwork: unused,
        readProblems: unused,
        grow: unused,
        close: () => Promise.resolve(),
      },
      demoAccounts: null,
      secondsSinceJob: () => secondsSinceBeat(workshop.db),
      closing: closing.signal,
    },
    makeRunRoutes(workshop.listener),
  );
  const server = createServer(app).listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = server.address();
  if (typeof address !== 'object' || address === null) throw new Error('No port.');
  const sessions = makeSessions(workshop.db, false);
  let people = 0;
  return {
    origin: `http://127.0.0.1:${address.port}`,
    async join(workspaceId, role) {
      const email = `${role}${people++}@example.org`;
      const [user] = await workshop.db
        .insert(users)
        .values({ name: role, email, emailKey: email, passwordHash: '-' })
        .returning();
      if (!user) throw new Error('Nobody was inserted.');
      await workshop.db.insert(memberships).values({ workspaceId, userId: user.id, role });
      const cookie = (await sessions.start(user.id)).split(';')[0] ?? '';
      return { userId: user.id, cookie };
    },
    async close() {
      closing.abort();
      server.closeAllConnections();
      server.close();
      await once(server, 'close');
      await throttle.close();
    },
  };
}
