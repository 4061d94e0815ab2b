/** `npm start`: from a clone to a running Heddle. */
import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { House } from './house.mjs';
import { stateDir, root } from './paths.mjs';
import { asCommand, holdLock, requireNode, runBuilt } from './plain.mjs';
import { startPostgres } from './postgres.mjs';
import { ensureBuilt, ensurePackages } from './prepare.mjs';
import { freePort, until } from './process.mjs';
import { ensurePrograms } from './programs.mjs';
import { startRedis } from './redis.mjs';

const PREFERRED_PORT = 8787;
const addressFile = join(stateDir, 'address');
/** What must be ended, the last started first. */
const started = [];
let stopping = null;

async function stop() {
  stopping ??= (async () => {
    for (const part of started.reverse()) await part();
    rmSync(addressFile, { force: true });
  })();
  await stopping;
}

async function services() {
  const { DATABASE_URL, REDIS_URL } = process.env;
  const postgres = DATABASE_URL ? null : await startPostgres(stateDir, { durable: true });
  if (postgres) started.push(postgres.stop);
  const redis = REDIS_URL ? null : await startRedis(stateDir);
  if (redis) started.push(redis.stop);
  return { databaseUrl: DATABASE_URL ?? postgres.url, redisUrl: REDIS_URL ?? redis.url };
}

async function instance({ databaseUrl, redisUrl }) {
  const port = process.env.PORT
    ? Number(process.env.PORT)
    : await freePort(join(stateDir, 'port'), PREFERRED_PORT);
  const address = `http://127.0.0.1:${port}`;
  const demo =
    !process.env.DATABASE_URL &&
    process.env.NODE_ENV !== 'production' &&
    process.env.HEDDLE_DEMO !== '0';
  const environment = {
    DATABASE_URL: databaseUrl,
    REDIS_URL: redisUrl,
    PORT: String(port),
    PUBLIC_URL: process.env.PUBLIC_URL ?? address,
    HEDDLE_DEMO: demo ? '1' : '0',
    HEDDLE_SPA_DIR: join(root, 'dist/spa'),
    HEDDLE_READING_SCRIPT: join(root, 'dist/reading.js'),
    HEDDLE_MAIL_DIR: process.env.HEDDLE_MAIL_DIR ?? join(stateDir, 'mail'),
  };
  return { address, demo, environment };
}

async function reachable(url) {
  try {
    return (await fetch(url, { signal: AbortSignal.timeout(2_000) })).ok;
  } catch {
    return false;
  }
}

async function start() {
  if (!process.env.DATABASE_URL || !process.env.REDIS_URL) ensurePrograms({ forTests: false });
  ensurePackages();
  const { address, demo, environment } = await instance(await services());
  await ensureBuilt({ spa: true });
  const house = new House(stateDir, environment);
  await house.endLeftovers();
  runBuilt('migrate', environment);
  const accounts = demo ? runBuilt('seed', environment) : '';
  if (stopping) return;
  started.push(() => house.close());
  house.keep('server', 'server');
  const workers = Number(process.env.HEDDLE_WORKERS ?? 1);
  for (let k = 1; k <= workers; k++) house.keep(`worker-${k}`, 'worker');
  await until('the server answers', 60_000, () => stopping || reachable(`${address}/health`));
  await until('a worker takes jobs', 60_000, () => stopping || reachable(`${address}/ready`));
  if (stopping) return;
  writeFileSync(addressFile, address);
  console.log(`\nHeddle runs at ${address}\n`);
  if (accounts) console.log(`${accounts}\n`);
  console.log('Ctrl-C stops it; the data stay.');
}

/** The other start may still be on its way: its address appears when it is ready. */
async function sayAddress() {
  await until('the other start of this clone is ready', 900_000, () => existsSync(addressFile));
  console.log(`Heddle already runs at ${readFileSync(addressFile, 'utf8')}`);
}

await asCommand(async () => {
  requireNode();
  mkdirSync(stateDir, { recursive: true });
  if (!(await holdLock(join(stateDir, 'start.lock')))) return sayAddress();
  rmSync(addressFile, { force: true });
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
    process.on(signal, () => {
      if (!stopping) console.log('\nStopping …');
      void stop().then(() => process.exit(0));
    });
  }
  try {
    await start();
  } catch (error) {
    await stop();
    throw error;
  }
});
