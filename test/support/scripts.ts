import { randomUUID } from 'node:crypto';
import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { build } from 'esbuild';

const root = join(import.meta.dirname, '..', '..');

export interface Scripts {
  readonly worker: string;
  readonly thread: string;
}

/** Bundles the worker and its threads' script as they are now, into a folder of their own. */
export async function buildScripts(): Promise<Scripts> {
  const folder = join(root, 'node_modules', '.cache', `heddle-test-${randomUUID()}`);
  mkdirSync(folder, { recursive: true });
  await build({
    absWorkingDir: root,
    entryPoints: { worker: 'jobs/main.ts', thread: 'jobs/pool/thread.ts' },
    outdir: folder,
    outExtension: { '.js': '.mjs' },
    bundle: true,
    packages: 'external',
    platform: 'node',
    format: 'esm',
    target: 'node20',
    logLevel: 'error',
    alias: { '#contract': join(root, 'server', 'contract') },
  });
  return { worker: join(folder, 'worker.mjs'), thread: join(folder, 'thread.mjs') };
}
