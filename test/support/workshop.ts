import { spawn, type ChildProcess } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { once } from 'node:events';
import { rmSync } from 'node:fs';
import { dirname } from 'node:path';
import { Redis } from 'ioredis';
import pg from 'pg';
import pino from 'pino';
import { WHOLE, type RunPart, type Scale } from '../../server/contract/enums';
import { encodeUint32 } from '../../db/codecs/typedArrays';
import { openDatabase, type Database } from '../../db/client';
import { openListener, type Listener } from '../../db/listener';
import { migrateDatabase } from '../../db/migrate';
import { createRun, findProgress, type RunProgress } from '../../db/repositories/runs';
import type { Scope } from '../../db/repositories/scope';
import {
  datasets,
  memberships,
  revisionNodes,
  revisions,
  users,
  workspaces,
} from '../../db/schema/index';
import { readConfig, type WorkerConfig } from '../../jobs/config';
import type { Network } from '../../jobs/engine/types';
import { startWorker, type RunningWorker } from '../../jobs/worker';
import { buildScripts, type Scripts } from './scripts';
import * as services from './services';
import { needed } from './services';

const POSTGRES = needed(services.POSTGRES, 'HEDDLE_TEST_DATABASE_URL');
const REDIS = needed(services.REDIS, 'HEDDLE_TEST_REDIS_URL');

/** The Redis database after the tests' own: emptied by a test that no other may run beside. */
export const FLUSHABLE_REDIS = Object.assign(new URL(REDIS), {
  pathname: `/${Number(new URL(REDIS).pathname.slice(1) || 0) + 1}`,
}).href;

/** Polls a state until it holds. @throws Error with what was seen last when the deadline passes */
export async function until<T>(
  look: () => Promise<T>,
  holds: (seen: T) => boolean,
  seconds = 20,
): Promise<T> {
  const end = Date.now() + seconds * 1000;
  for (;;) {
    const seen = await look();
    if (holds(seen)) return seen;
    if (Date.now() > end) throw new Error(`Not within ${seconds} s: ${JSON.stringify(seen)}`);
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
}

export interface Subject {
  readonly scope: Scope;
  readonly revisionId: string;
}

/** A database of its own, keys of its own in Redis, and workers in this process or beside it. */
export class Workshop {
  readonly #workers: RunningWorker[] = [];
  readonly #children: ChildProcess[] = [];
  readonly #others: string[] = [];

  private constructor(
    readonly database: Database,
    readonly listener: Listener,
    readonly redis: Redis,
    /** With its password, if it has one. */
    readonly redisUrl: string,
    readonly prefix: string,
    readonly scripts: Scripts,
    private readonly name: string,
  ) {}

  /** @param redisUrl another Redis database where a test empties it */
  static async open(redisUrl = REDIS): Promise<Workshop> {
    const name = `heddle_jobs_${randomUUID().replaceAll('-', '')}`;
    await onServer(`create database ${name}`);
    const url = Object.assign(new URL(POSTGRES), { pathname: `/${name}` }).href;
    await migrateDatabase(url);
    const redis = new Redis(redisUrl);
    const listener = openListener(url, () => undefined);
    await listener.ready();
    const prefix = `test-${name}`;
    return new Workshop(
      openDatabase({ url }),
      listener,
      redis,
      redisUrl,
      prefix,
      await buildScripts(),
      name,
    );
  }

  /** A further database without any table; dropped with this workshop. @returns its address */
  async emptyDatabase(): Promise<string> {
    const name = `${this.name.slice(0, 40)}_${this.#others.length}`;
    await onServer(`create database ${name}`);
    this.#others.push(name);
    return Object.assign(new URL(POSTGRES), { pathname: `/${name}` }).href;
  }

  async rowsOf(url: string, statement: string): Promise<unknown[]> {
    const client = new pg.Client(url);
    await client.connect();
    try {
      const { rows } = await client.query<Record<string, unknown>>(statement);
      return rows;
    } finally {
      await client.end();
    }
  }

  get db() {
    return this.database.db;
  }

  environment(settings: Readonly<Record<string, string>> = {}): Record<string, string> {
    return {
      DATABASE_URL: this.database.url,
      REDIS_URL: this.redisUrl,
      HEDDLE_QUEUE_PREFIX: this.prefix,
      HEDDLE_THREAD: this.scripts.thread,
      HEDDLE_THREADS: '1',
      HEDDLE_BLOCK_SECONDS: '0.05',
      LOG_LEVEL: process.env['TEST_LOG_LEVEL'] ?? 'silent',
      ...settings,
    };
  }

  config(settings?: Readonly<Record<string, string>>): WorkerConfig {
    return readConfig(this.environment(settings));
  }

  startWorker(settings?: Readonly<Record<string, string>>): RunningWorker {
    const config = this.config(settings);
    const worker = startWorker(config, pino({ level: config.logLevel }));
    this.#workers.push(worker);
    return worker;
  }

  /** The worker as its own process. */
  spawnWorker(settings?: Readonly<Record<string, string>>): ChildProcess {
    const child = spawn(process.execPath, [this.scripts.worker], {
      env: { PATH: process.env['PATH'], ...this.environment(settings) },
      stdio: ['ignore', 'inherit', 'inherit'],
    });
    this.#children.push(child);
    return child;
  }

  /**
   * A dataset of this network in a workspace with an analyst.
   * @param beside an earlier workspace; a new one without it
   */
  async bring(network: Network, beside?: Scope): Promise<Subject> {
    const scope = beside ?? (await this.#workspace());
    const revisionId = await this.#revision(scope.workspaceId, network);
    return { scope, revisionId };
  }

  async #workspace(): Promise<Scope> {
    const [user] = await this.db
      .insert(users)
      .values({
        name: 'Ada',
        email: `${randomUUID()}@example.org`,
        emailKey: randomUUID(),
        passwordHash: '-',
      })
      .returning();
    const [workspace] = await this.db.insert(workspaces).values({ name: 'Fen' }).returning();
    if (!user || !workspace) throw new Error('Nothing was inserted.');
    const workspaceId = workspace.id;
    await this.db.insert(memberships).values({ workspaceId, userId: user.id, role: 'analyst' });
    return { workspaceId, userId: user.id };
  }

  async #revision(workspaceId: string, network: Network): Promise<string> {
    const [dataset] = await this.db
      .insert(datasets)
      .values({ workspaceId, name: 'Invented network', invented: true })
      .returning();
    const [revision] = await this.db
      .insert(revisions)
      .values({
        workspaceId,
        datasetId: dataset?.id ?? '',
        number: 1,
        contentHash: '0'.repeat(64),
        nodeCount: network.nodeCount,
        edgeCount: network.edges.length / 2,
        entryUnit: 'number',
        edges: encodeUint32(network.edges),
        report: {},
      })
      .returning();
    const revisionId = revision?.id ?? '';
    if (network.nodeCount > 0)
      await this.db.insert(revisionNodes).values(
        Array.from(network.values, (entry, row) => ({
          workspaceId,
          revisionId,
          row,
          nodeId: `n${row}`,
          label: `Node ${row}`,
          entryRaw: String(entry),
          entry,
        })),
      );
    return revisionId;
  }

  async submit(
    { scope, revisionId }: Subject,
    wanted: { scale?: Scale; dimensions?: number[]; part?: RunPart; key?: string } = {},
  ): Promise<string> {
    const made = await createRun(this.db, scope, {
      revisionId,
      scale: wanted.scale ?? 'entry',
      dimensions: wanted.dimensions ?? [1, 2, 3],
      part: wanted.part ?? WHOLE,
      idempotencyKey: wanted.key ?? null,
    });
    // A run that equals an earlier one is no run of its own: a test that wants one brings the network again.
    if (made.kind !== 'created' && made.kind !== 'repeated') throw new Error(made.kind);
    return made.runId;
  }

  async progress(scope: Scope, runId: string): Promise<RunProgress> {
    const progress = await findProgress(this.db, scope, runId);
    if (!progress) throw new Error('The run is gone.');
    return progress;
  }

  reached(
    scope: Scope,
    runId: string,
    holds: (progress: RunProgress) => boolean,
    seconds?: number,
  ): Promise<RunProgress> {
    return until(() => this.progress(scope, runId), holds, seconds);
  }

  /** Ends every worker that was started so far. */
  async endWorkers(): Promise<void> {
    for (const child of this.#children.splice(0)) {
      if (child.exitCode === null && child.signalCode === null) {
        child.kill('SIGKILL');
        await once(child, 'exit');
      }
    }
    await Promise.all(this.#workers.splice(0).map((worker) => worker.close()));
  }

  async close(): Promise<void> {
    await this.endWorkers();
    await this.listener.close();
    await this.database.close();
    const keys = await this.redis.keys(`${this.prefix}:*`);
    if (keys.length > 0) await this.redis.del(keys);
    this.redis.disconnect();
    rmSync(dirname(this.scripts.worker), { recursive: true, force: true });
    for (const name of [this.name, ...this.#others]) {
      await onServer(`drop database ${name} with (force)`);
    }
  }
}

async function onServer(statement: string): Promise<void> {
  const client = new pg.Client(POSTGRES);
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}
