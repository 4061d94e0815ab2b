import { randomUUID } from 'node:crypto';
import { mkdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { build } from 'esbuild';

const root = join(import.meta.dirname, '..', '..');

/** Bundles the reading process's script as it is now, as the build does. */
export async function buildReadingScript(): Promise<{ script: string; remove: () => void }> {
  const folder = join(root, 'node_modules', '.cache', `heddle-test-${randomUUID()}`);
  mkdirSync(folder, { recursive: true });
  const script = join(folder, 'reading.mjs');
  await build({
    absWorkingDir: root,
    entryPoints: ['server/reading/child.ts'],
    outfile: script,
    bundle: true,
    packages: 'external',
    platform: 'node',
    format: 'esm',
    target: 'node20',
    logLevel: 'error',
    alias: { '#contract': join(root, 'server', 'contract') },
  });
  return { script, remove: () => rmSync(folder, { recursive: true, force: true }) };
}
