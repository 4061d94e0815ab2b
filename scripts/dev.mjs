/** `npm run dev`: the same instance as `npm start`, with reload on every change. */
import { spawn } from 'node:child_process';
import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { root, stateDir } from './paths.mjs';
import { asCommand, holdLock, PlainError, requireNode, runBuilt } from './plain.mjs';
import { startPostgres } from './postgres.mjs';
import { ensureBuilt, ensurePackages } from './prepare.mjs';
import { endProcess, freePort } from './process.mjs';
import { ensurePrograms } from './programs.mjs';
import { startRedis } from './redis.mjs';

const started = [];
let stopping = null;
const stop = () => (stopping ??= endAll());

async function endAll() {
  for (const end of started.reverse()) await end();
}

function keep(program, args, environment) {
  const child = spawn(program, args, {
    cwd: root,
    stdio: 'inherit',
    env: { ...process.env, ...environment },
  });
  started.push(() => endProcess(child.pid, 'SIGTERM', 15_000));
}

await asCommand(async () => {
  requireNode();
  mkdirSync(stateDir, { recursive: true });
  // The same lock as npm start: both work on the same database.
  if (!(await holdLock(join(stateDir, 'start.lock')))) {
    throw new PlainError('npm start or npm run dev already runs in this clone. Stop it first.');
  }
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
    process.on(signal, () => void stop().then(() => process.exit(0)));
  ensurePrograms({ forTests: false });
  ensurePackages();
  const postgres = await startPostgres(stateDir, { durable: true });
  started.push(postgres.stop);
  const redis = await startRedis(stateDir);
  started.push(redis.stop);
  await ensureBuilt({ spa: false });
  const port = await freePort(join(stateDir, 'dev.port'), 8788);
  const environment = {
    NODE_ENV: 'development',
    DATABASE_URL: postgres.url,
    REDIS_URL: redis.url,
    PORT: String(port),
    HEDDLE_DEMO: '1',
    HEDDLE_DEV_API: `http://127.0.0.1:${port}`,
    HEDDLE_READING_SCRIPT: join(root, 'dist/reading.js'),
    HEDDLE_THREAD: join(root, 'dist/thread.js'),
    HEDDLE_MAIL_DIR: join(stateDir, 'mail'),
  };
  runBuilt('migrate', environment);
  console.log(runBuilt('seed', environment));
  const tsx = join(root, 'node_modules/.bin/tsx');
  // The scripts of the threads are bundles: they are built again beside the watching processes.
  keep(
    process.execPath,
    [
      '--watch-path=jobs',
      '--watch-path=formats',
      '--watch-path=server/datasets',
      'scripts/build.mjs',
      '--no-spa',
    ],
    environment,
  );
  keep(tsx, ['watch', '--clear-screen=false', 'server/main.ts'], environment);
  keep(tsx, ['watch', '--clear-screen=false', 'jobs/main.ts'], environment);
  keep(
    process.execPath,
    [join(root, 'node_modules/@quasar/app-vite/bin/quasar.js'), 'dev', '-m', 'spa'],
    environment,
  );
});
