/**
 * The house for the browser tests: a fresh database on the test PostgreSQL, the built server and one
 * worker, until a signal ends it; then the database is dropped.
 *
 *   PORT                         port of the server on loopback
 *   HEDDLE_TEST_DATABASE_URL     an address whose role may create databases
 *   HEDDLE_TEST_REDIS_URL        a Redis whose keys under one prefix of this process may be written
 */
import { spawn } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { join } from 'node:path';
import { Redis } from 'ioredis';
import pg from 'pg';

const root = join(import.meta.dirname, '..');
const admin = demanded('HEDDLE_TEST_DATABASE_URL');
const redis = demanded('HEDDLE_TEST_REDIS_URL');
const port = demanded('PORT');
const database = `heddle_e2e_${randomBytes(6).toString('hex')}`;

function demanded(name) {
  const value = process.env[name];
  if (value) return value;
  console.error(`${name} is not set; npm test sets it.`);
  process.exit(1);
}

async function administer(sql) {
  const client = new pg.Client({ connectionString: admin });
  await client.connect();
  try {
    await client.query(sql);
  } finally {
    await client.end();
  }
}

/** Removes what the worker left in Redis under its own prefix. */
async function forgetQueue() {
  const client = new Redis(redis);
  for await (const keys of client.scanStream({ match: `${database}:*`, count: 500 })) {
    if (keys.length > 0) await client.del(keys);
  }
  client.disconnect();
}

const url = new URL(admin);
url.pathname = `/${database}`;
const environment = {
  ...process.env,
  NODE_ENV: 'test',
  HOST: '127.0.0.1',
  PORT: port,
  DATABASE_URL: url.href,
  PUBLIC_URL: `http://127.0.0.1:${port}`,
  HEDDLE_QUEUE_PREFIX: database,
  HEDDLE_SPA_DIR: join(root, 'dist/spa'),
  HEDDLE_READING_SCRIPT: join(root, 'dist/reading.js'),
  HEDDLE_THREADS: '1',
  LOG_LEVEL: process.env.LOG_LEVEL ?? 'warn',
};

const children = [];
function start(file, more = {}) {
  const child = spawn(process.execPath, [join(root, 'dist', file)], {
    cwd: root,
    env: { ...environment, ...more },
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  children.push(child);
  return child;
}

const ended = (child) => new Promise((resolve) => child.once('exit', resolve));

let closing;
/** Ends what was started, then drops the database. */
function close(code) {
  closing ??= (async () => {
    const running = children.filter(
      (child) => child.exitCode === null && child.signalCode === null,
    );
    const all = Promise.all(running.map(ended));
    for (const child of running) child.kill('SIGTERM');
    await all;
    await forgetQueue();
    await administer(`drop database if exists ${database} with (force)`);
    process.exit(code);
  })();
  return closing;
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => void close(0));

await administer(`create database ${database}`);
const migrated = await ended(start('migrate.js'));
if (migrated !== 0) {
  console.error('The schema could not be made; the lines above say why.');
  await close(1);
}
// The server gets no Redis: it counts sign-in attempts in its own memory then, so that one round of
// tests does not use up the attempts of the next.
for (const [file, more] of [
  ['server.js', {}],
  ['worker.js', { REDIS_URL: redis }],
]) {
  start(file, more).once('exit', (code) => {
    if (closing === undefined) {
      console.error(`${file} ended by itself with status ${code}.`);
      void close(1);
    }
  });
}
