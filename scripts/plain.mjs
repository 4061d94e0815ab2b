import { spawn, spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { root } from './paths.mjs';

/** An error whose message is all that the person needs to read. */
export class PlainError extends Error {}

/** Runs a command's main function; what goes wrong ends as one line and status 1. */
export async function asCommand(main) {
  try {
    await main();
  } catch (error) {
    console.error(error instanceof PlainError ? error.message : error);
    process.exitCode = 1;
  }
}

/** @throws PlainError on a Node.js that is too old. */
export function requireNode() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
  if (major > 20 || (major === 20 && minor >= 19)) return;
  throw new PlainError(
    `Heddle needs Node.js 20.19 or later; this is ${process.versions.node}. Install a newer Node.js.`,
  );
}

/**
 * Goes on only while holding the lock `file` (flock(2), gone with the process, so a crash leaves
 * nothing behind): the first call runs this script again under flock and never returns.
 * @returns false if somebody else holds it, true in the process that holds it
 */
export async function holdLock(file) {
  if (process.env.HEDDLE_LOCK_HELD === file) return true;
  const child = spawn(
    'flock',
    [
      '--no-fork',
      '--nonblock',
      '--conflict-exit-code',
      '75',
      file,
      process.execPath,
      ...process.argv.slice(1),
    ],
    { stdio: 'inherit', env: { ...process.env, HEDDLE_LOCK_HELD: file } },
  );
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
    process.on(signal, () => child.kill(signal));
  const status = await new Promise((resolve, reject) => {
    child.once('error', reject);
    child.once('exit', (code) => resolve(code ?? 1));
  });
  if (status === 75) return false;
  process.exit(status);
}

/** Runs a bundled script of dist/ to its end. @throws PlainError if it fails */
export function runBuilt(name, environment) {
  const { status, stdout, stderr } = spawnSync(
    process.execPath,
    [join(root, 'dist', `${name}.js`)],
    {
      cwd: root,
      env: { ...process.env, ...environment },
      encoding: 'utf8',
    },
  );
  if (status !== 0) throw new PlainError(`${stdout}${stderr}`.trim() || `${name} failed.`);
  return stdout.trim();
}
