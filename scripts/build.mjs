/**
 * Bundles the Node.js processes into dist/ with esbuild and, unless `--no-spa` is given, builds the
 * browser part into dist/spa when one of its sources changed (their hash is kept in dist/spa.hash).
 *
 *   node scripts/build.mjs [--no-spa | --spa-only] [--force]
 */
import { createHash } from 'node:crypto';
import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { pathToFileURL } from 'node:url';
import { root } from './paths.mjs';

/** Output name in dist/ → entry file. An entry that does not exist is left out, and said. */
const ENTRIES = {
  server: 'server/main.ts',
  reading: 'server/reading/child.ts',
  worker: 'jobs/main.ts',
  thread: 'jobs/pool/thread.ts',
  matrix: 'jobs/matrix.ts',
  bench: 'jobs/benchmark/main.ts',
  benchMemory: 'jobs/benchmark/memory/child.ts',
  firstForm: 'jobs/benchmark/firstForm/thread.ts',
  seed: 'server/seed.ts',
  migrate: 'db/migrate.ts',
};

const SPA_SOURCES = [
  'src',
  'server/contract',
  'public',
  'index.html',
  'quasar.config.ts',
  'package-lock.json',
  'tsconfig.json',
];

/** Bundles every entry that exists. @returns the names that were left out. */
export async function buildProcesses() {
  const { build } = await import('esbuild');
  const present = Object.entries(ENTRIES).filter(([, file]) => existsSync(join(root, file)));
  await build({
    absWorkingDir: root,
    entryPoints: Object.fromEntries(present.map(([name, file]) => [name, file])),
    outdir: 'dist',
    bundle: true,
    packages: 'external',
    platform: 'node',
    format: 'esm',
    target: 'node20',
    sourcemap: true,
    logLevel: 'warning',
    plugins: [contractInside],
  });
  return Object.keys(ENTRIES).filter((name) => !present.some(([have]) => have === name));
}

/** `#contract/x` is a file of this repository: with `packages: external` esbuild would leave it out. */
const contractInside = {
  name: 'contract-inside',
  setup(build) {
    build.onResolve({ filter: /^#contract\// }, ({ path }) => ({
      path: join(root, 'server/contract', `${path.slice('#contract/'.length)}.ts`),
    }));
  },
};

/** Builds dist/spa unless its sources are those of the last build. @returns whether it was built. */
export async function buildSpa({ force = false } = {}) {
  if (!existsSync(join(root, 'quasar.config.ts'))) return false;
  const stamp = join(root, 'dist/spa.hash');
  const hash = hashOf(SPA_SOURCES);
  const fresh = existsSync(stamp) && readFileSync(stamp, 'utf8') === hash;
  if (!force && fresh && existsSync(join(root, 'dist/spa/index.html'))) return false;
  rmSync(stamp, { force: true });
  await run(process.execPath, [
    join(root, 'node_modules/@quasar/app-vite/bin/quasar.js'),
    'build',
    '-m',
    'spa',
  ]);
  mkdirSync(join(root, 'dist'), { recursive: true });
  writeFileSync(stamp, hash);
  return true;
}

/** SHA-256 over names and contents of all files below the given paths. */
function hashOf(paths) {
  const hash = createHash('sha256');
  for (const path of paths.flatMap((path) => filesBelow(join(root, path))).sort()) {
    hash.update(relative(root, path)).update('\0').update(readFileSync(path)).update('\0');
  }
  return hash.digest('hex');
}

function filesBelow(path) {
  if (!existsSync(path)) return [];
  try {
    return readdirSync(path, { withFileTypes: true }).flatMap((entry) =>
      entry.isDirectory() ? filesBelow(join(path, entry.name)) : [join(path, entry.name)],
    );
  } catch (error) {
    if (error.code === 'ENOTDIR') return [path];
    throw error;
  }
}

function run(program, args) {
  return new Promise((resolve, reject) => {
    const output = [];
    const child = spawn(program, args, { cwd: root, stdio: ['ignore', 'pipe', 'pipe'] });
    child.stdout.on('data', (bytes) => output.push(bytes));
    child.stderr.on('data', (bytes) => output.push(bytes));
    child.on('error', reject);
    child.on('exit', (code) => {
      if (code === 0) return resolve();
      process.stderr.write(Buffer.concat(output));
      reject(new Error('Building the browser part failed; the lines above say where.'));
    });
  });
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  const args = new Set(process.argv.slice(2));
  try {
    if (!args.has('--spa-only')) {
      const missing = await buildProcesses();
      console.log(
        missing.length === 0
          ? 'Built the processes.'
          : `Built the processes; no entry file for: ${missing.join(', ')}.`,
      );
    }
    if (!args.has('--no-spa')) {
      const built = await buildSpa({ force: args.has('--force') });
      console.log(built ? 'Built the browser part.' : 'The browser part is up to date.');
    }
  } catch (error) {
    console.error(error instanceof Error ? error.message : error);
    process.exitCode = 1;
  }
}
