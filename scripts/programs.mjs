/** Which programs of the system are needed, which are missing, and how they come here. */
import { spawnSync } from 'node:child_process';
import { chmodSync, existsSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { PlainError } from './plain.mjs';

const POSTGRES_HOME = '/usr/lib/postgresql';

/** Folder with initdb and postgres: the newest of Debian's packages, or the one on PATH; null if none. */
export function postgresPrograms() {
  const versions = existsSync(POSTGRES_HOME) ? readdirSync(POSTGRES_HOME) : [];
  return (
    versions
      .sort((a, b) => Number(b) - Number(a))
      .map((version) => join(POSTGRES_HOME, version, 'bin'))
      .concat((process.env.PATH ?? '').split(':'))
      .find((folder) =>
        ['initdb', 'postgres', 'psql'].every((name) => existsSync(join(folder, name))),
      ) ?? null
  );
}

function onPath(program) {
  return (process.env.PATH ?? '').split(':').some((folder) => existsSync(join(folder, program)));
}

function pythonHas(module) {
  return (
    spawnSync('/usr/bin/python3', ['-c', `import ${module}`], { stdio: 'ignore' }).status === 0
  );
}

/** Debian package → whether what it brings is here. */
const SERVING = {
  postgresql: () => postgresPrograms() !== null,
  'redis-server': () => onPath('redis-server'),
};
const TESTING = {
  ...SERVING,
  chromium: () => existsSync('/usr/bin/chromium'),
  ripser: () => onPath('ripser'),
  'python3-gudhi': () => pythonHas('gudhi'),
  'python3-networkx': () => pythonHas('networkx'),
};

/**
 * Installs what is missing, as root; otherwise throws one plain sentence with the command that an
 * administrator must run. Services that the packages bring are not started.
 */
export function ensurePrograms({ forTests }) {
  const missing = missingPackages(forTests);
  if (missing.length === 0) return;
  const command = `apt-get update && apt-get install -y --no-install-recommends ${missing.join(' ')}`;
  if (process.getuid() !== 0) {
    throw new PlainError(
      `Missing on this machine: ${missing.join(', ')}. An administrator must run: ${command}`,
    );
  }
  console.log(`Installing ${missing.join(', ')} …`);
  withoutStartingServices(() => {
    apt(['update', '-qq']);
    apt(['install', '-y', '-qq', '--no-install-recommends', ...missing]);
  });
  const still = missingPackages(forTests);
  if (still.length > 0) {
    throw new PlainError(
      `Installed, but still not found: ${still.join(', ')}. See what “${command}” prints.`,
    );
  }
}

function missingPackages(forTests) {
  return Object.entries(forTests ? TESTING : SERVING)
    .filter(([, present]) => !present())
    .map(([name]) => name);
}

function apt(args) {
  const environment = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const { status, stdout, stderr, error } = spawnSync('apt-get', args, {
    env: environment,
    encoding: 'utf8',
  });
  if (status === 0) return;
  process.stderr.write(`${stdout ?? ''}${stderr ?? ''}`);
  throw new PlainError(
    error
      ? 'This is not a Debian system: apt-get is missing.'
      : `“apt-get ${args.join(' ')}” failed; the lines above say why.`,
  );
}

/** Debian asks /usr/sbin/policy-rc.d whether a package may start its service; 101 says no. */
function withoutStartingServices(work) {
  const policy = '/usr/sbin/policy-rc.d';
  if (existsSync(policy)) return work();
  writeFileSync(policy, '#!/bin/sh\nexit 101\n');
  chmodSync(policy, 0o755);
  try {
    return work();
  } finally {
    rmSync(policy, { force: true });
  }
}
