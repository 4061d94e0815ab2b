/** `npm test`: installs what is missing, then every check and test; the last line counts them. */
import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { root, stateDir } from './paths.mjs';
import { asCommand, holdLock, PlainError, requireNode } from './plain.mjs';
import { startPostgres } from './postgres.mjs';
import { ensureBuilt, ensurePackages } from './prepare.mjs';
import { endGroup, freePort } from './process.mjs';
import { ensurePrograms } from './programs.mjs';
import { startRedis } from './redis.mjs';

/** A throw-away cluster and Redis of the tests' own, so that a running instance is not disturbed. */
const testDir = join(stateDir, 'test');
const started = [];
let stopping = null;
const stop = () => (stopping ??= endAll());

async function endAll() {
  for (const end of started.reverse()) await end();
}

/** Runs a program with its output on screen; stopping ends it too. @returns its status */
async function run(name, args, environment) {
  if (stopping) return 1;
  // A process group of its own: npm and npx start further processes and do not take them along.
  const child = spawn(name, args, {
    cwd: root,
    detached: true,
    stdio: 'inherit',
    env: { ...process.env, ...environment },
  });
  started.push(() => endGroup(child.pid, 30_000));
  const [status] = await once(child, 'exit');
  return status ?? 1;
}

async function checks(environment) {
  const failed = [];
  for (const name of ['types', 'lint', 'formatted']) {
    if ((await run('npm', ['run', '--silent', name], environment)) !== 0) failed.push(name);
  }
  for (const name of failed) console.error(`npm run ${name} failed.`);
  return { passed: 3 - failed.length, failed: failed.length };
}

/** @returns counts from a JSON report; a run that failed without a failed test counts as one failure */
function counted(file, status, read) {
  const counts = existsSync(file)
    ? read(JSON.parse(readFileSync(file, 'utf8')))
    : { passed: 0, failed: 0 };
  return status !== 0 && counts.failed === 0 ? { ...counts, failed: 1 } : counts;
}

async function vitest(environment) {
  const report = join(testDir, 'vitest.json');
  rmSync(report, { force: true });
  const args = ['vitest', 'run', '--reporter=default', '--reporter=json'];
  const status = await run('npx', [...args, `--outputFile.json=${report}`], environment);
  return counted(report, status, ({ numPassedTests, numFailedTests, testResults }) => {
    // A file that could not be loaded has no tests to fail, but it did fail.
    const unloaded = testResults.filter(
      ({ status: end, assertionResults }) => end === 'failed' && assertionResults.length === 0,
    );
    return { passed: numPassedTests, failed: numFailedTests + unloaded.length };
  });
}

async function playwright(environment) {
  const report = join(testDir, 'playwright.json');
  rmSync(report, { force: true });
  const status = await run('npx', ['playwright', 'test', '--reporter=list,json'], {
    ...environment,
    PLAYWRIGHT_JSON_OUTPUT_FILE: report,
  });
  return counted(report, status, ({ stats, errors }) => ({
    passed: stats.expected,
    failed: stats.unexpected + stats.flaky + errors.length,
  }));
}

async function test() {
  ensurePrograms({ forTests: true });
  ensurePackages();
  const postgres = await startPostgres(testDir, { durable: false });
  started.push(() => rmSync(postgres.folder, { recursive: true, force: true }), postgres.stop);
  const redis = await startRedis(testDir);
  started.push(redis.stop);
  await ensureBuilt({ spa: true });
  const environment = {
    HEDDLE_TEST_DATABASE_URL: postgres.url,
    HEDDLE_TEST_REDIS_URL: redis.url,
    HEDDLE_E2E_PORT: String(await freePort(join(testDir, 'port'))),
  };
  const results = [];
  for (const part of [checks, vitest, playwright]) results.push(await part(environment));
  if (stopping) return;
  await stop();
  const sum = (key) => results.reduce((total, counts) => total + counts[key], 0);
  console.log(`\n${sum('passed')} passed, ${sum('failed')} failed`);
  process.exitCode = sum('failed') === 0 && sum('passed') > 0 ? 0 : 1;
}

await asCommand(async () => {
  requireNode();
  mkdirSync(testDir, { recursive: true });
  if (!(await holdLock(join(stateDir, 'test.lock'))))
    throw new PlainError('The tests of this clone already run. Wait for them, or stop them.');
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
    process.on(signal, () => void stop().then(() => process.exit(1)));
  try {
    await test();
  } finally {
    await stop();
  }
});
