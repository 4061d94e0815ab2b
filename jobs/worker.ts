import { randomUUID } from 'node:crypto';
import { existsSync } from 'node:fs';
import { hostname } from 'node:os';
import { join } from 'node:path';
import type { Logger } from 'pino';
import { openDatabase } from '../db/client';
import { openListener } from '../db/listener';
import { beat } from '../db/repositories/beats';
import { Activity } from './activity';
import { ConfigurationError, type WorkerConfig } from './config';
import { ENGINE_VERSION } from './engine/index';
import { block, finish } from './handlers/block';
import type { Context } from './handlers/context';
import { estimate } from './handlers/estimate';
import { importEstimate } from './handlers/importEstimate';
import { mail, mailRule } from './handlers/mail';
import { pair } from './handlers/pair';
import { plan } from './handlers/plan';
import { Networks } from './networks';
import { openPool } from './pool/pool';
import { TableShelf } from './pool/tableShelf';
import { openConsumer, type Handlers } from './queue/consumer';
import { openProducer } from './queue/producer';
import { Reconciler } from './reconciler';
import { Relay } from './relay';

export interface RunningWorker {
  /** Hands its work over and releases everything; within ten seconds. */
  close(): Promise<void>;
}

function threadScript(config: WorkerConfig): string {
  const script = config.threadScript ?? join(import.meta.dirname, 'thread.js');
  if (existsSync(script)) return script;
  throw new ConfigurationError(`HEDDLE_THREAD: there is no file ${script}. Build first.`);
}

const handlersOf = (context: Context): Handlers => ({
  plan: (payload) => plan(payload, context),
  block: (payload) => block(payload, context),
  finish: (payload) => finish(payload, context),
  pair: (payload) => pair(payload, context),
  estimate: (payload) => estimate(payload, context),
  importEstimate: (payload) => importEstimate(payload, context),
  mail: (payload) => mail(payload, context),
  beat: () => beat(context.db, ENGINE_VERSION),
});

/** Milliseconds in which the same trouble is logged once: a lost Redis fails many times a second. */
const QUIET = 10_000;

function troubleLog(log: Logger): (error: Error) => void {
  const logged = new Map<string, number>();
  return (error) => {
    const now = Date.now();
    if (now - (logged.get(error.message) ?? -Infinity) < QUIET) return;
    if (logged.size > 100) logged.clear();
    logged.set(error.message, now);
    log.warn({ err: error }, 'trouble that the worker outlives');
  };
}

/** Opens everything a worker needs and begins to take jobs. */
export function startWorker(config: WorkerConfig, log: Logger): RunningWorker {
  const onError = troubleLog(log);
  const script = threadScript(config);
  const database = openDatabase({
    url: config.databaseUrl,
    name: 'heddle-worker',
    connections: config.threads + 8,
    onError,
  });
  const { db } = database;
  const listener = openListener(config.databaseUrl, onError);
  const connection = { redisUrl: config.redisUrl, prefix: config.queuePrefix, onError };
  const producer = openProducer(connection);
  const activity = new Activity(db, listener, onError);
  const shelf = new TableShelf();
  const threads = { script, heapMegabytes: config.heapMegabytes, onError, shelf };
  const context: Context = {
    config,
    db,
    log,
    activity,
    networks: new Networks(db),
    pool: openPool({ ...threads, threads: config.threads }),
    pairPool: openPool({ ...threads, threads: 1 }),
    mailRule: mailRule(config.mail),
    workerName: `${hostname()} ${process.pid} ${randomUUID().slice(0, 8)}`,
  };
  const handlers = handlersOf(context);
  const relay = new Relay(db, producer, listener, onError);
  const reconciler = new Reconciler(db, producer, context.mailRule, onError);
  const consumers = [
    openConsumer('runs', 2, handlers, connection),
    // One more than there are threads: the next block is at hand while a result is stored.
    openConsumer('blocks', config.threads + 1, handlers, connection),
    openConsumer('pairs', 2, handlers, connection),
    openConsumer('notes', 4, handlers, connection),
  ];

  let closing: Promise<void> | null = null;
  const close = async () => {
    activity.handOver();
    await Promise.all([relay.close(), reconciler.close(), ...consumers.map((one) => one.close())]);
    await Promise.all([producer.close(), context.pool.close(), context.pairPool.close()]);
    await listener.close();
    await database.close();
  };
  return { close: () => (closing ??= close()) };
}
