/**
 * `npm run bench`: this engine against loops over outside programs and its own first form, in one run
 * on one machine; with `--product`, the whole product on a database and a Redis of its own.
 */
import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { root, stateDir } from './paths.mjs';
import { asCommand, holdLock, PlainError, requireNode, runBuilt } from './plain.mjs';
import { startPostgres } from './postgres.mjs';
import { ensureBuilt, ensurePackages } from './prepare.mjs';
import { endProcess, freePort } from './process.mjs';
import { ensurePrograms } from './programs.mjs';
import { startRedis } from './redis.mjs';

const benchDir = join(stateDir, 'bench');
const args = process.argv.slice(2);
const product =
  args.includes('--product') || args.some((one) => /^(--sections=)?.*product/.test(one));
const started = [];
let stopping = null;
const stop = () => (stopping ??= endAll());

async function endAll() {
  for (const end of started.reverse()) await end();
}

/** A database that writes through as in use, and a Redis; both are thrown away afterwards. */
async function services() {
  mkdirSync(benchDir, { recursive: true });
  if (!(await holdLock(join(benchDir, 'lock'))))
    throw new PlainError('The product of this clone is being measured already.');
  const postgres = await startPostgres(benchDir, { durable: true });
  started.push(() => rmSync(postgres.folder, { recursive: true, force: true }), postgres.stop);
  const redis = await startRedis(benchDir);
  started.push(() => rmSync(join(benchDir, 'redis'), { recursive: true, force: true }), redis.stop);
  const environment = {
    DATABASE_URL: postgres.url,
    REDIS_URL: redis.url,
    PORT: String(await freePort(join(benchDir, 'port'))),
  };
  runBuilt('migrate', environment);
  return environment;
}

await asCommand(async () => {
  requireNode();
  ensurePrograms({ forTests: true });
  ensurePackages();
  await ensureBuilt({ spa: product });
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
    process.on(signal, () => void stop().then(() => process.exit(1)));
  try {
    const environment = product ? await services() : {};
    const child = spawn(process.execPath, [join(root, 'dist/bench.js'), ...args], {
      cwd: root,
      stdio: 'inherit',
      env: { ...process.env, ...environment },
    });
    started.push(() => endProcess(child.pid, 'SIGTERM', 60_000));
    const [code] = await once(child, 'exit');
    process.exitCode = code ?? 1;
  } finally {
    await stop();
  }
});
