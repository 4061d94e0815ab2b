/** What both commands do first: npm packages as locked, and the bundles. */
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { root } from './paths.mjs';
import { PlainError } from './plain.mjs';

/** Installs the npm packages of package-lock.json, without their scripts, unless they are here. */
export function ensurePackages() {
  const stamp = join(root, 'node_modules', '.heddle-lock');
  const hash = createHash('sha256')
    .update(readFileSync(join(root, 'package-lock.json')))
    .digest('hex');
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === hash) return;
  console.log('Installing npm packages …');
  const { status } = spawnSync(
    'npm',
    ['ci', '--ignore-scripts', '--no-audit', '--no-fund', '--loglevel=error'],
    {
      cwd: root,
      stdio: ['ignore', 'ignore', 'inherit'],
      env: { ...process.env, NODE_ENV: 'development' },
    },
  );
  if (status !== 0)
    throw new PlainError('The npm packages could not be installed; the lines above say why.');
  writeFileSync(stamp, hash);
}

/** Builds what has changed. */
export async function ensureBuilt({ spa }) {
  const { buildProcesses, buildSpa } = await import('./build.mjs');
  await buildProcesses();
  if (!spa) return;
  console.log('Building the browser part, if it has changed …');
  await buildSpa();
}
