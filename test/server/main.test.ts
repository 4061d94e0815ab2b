import { spawn, type ChildProcess } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { once } from 'node:events';
import { mkdirSync, readdirSync, rmSync } from 'node:fs';
import { request } from 'node:http';
import { join } from 'node:path';
import { build } from 'esbuild';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { makeSessions } from '../../server/auth/sessions';
import { freshDatabase, type TestDatabase } from '../support/database';
import { makeDataset, makeQueuedRun, makeWorkspace } from '../support/factories';

const root = join(import.meta.dirname, '..', '..');
const folder = join(root, 'node_modules', '.cache', `heddle-test-${randomUUID()}`);
const uploads = join(folder, 'uploads');
let database: TestDatabase;
beforeAll(async () => {
  mkdirSync(uploads, { recursive: true });
  database = await freshDatabase();
  await build({
    absWorkingDir: root,
    entryPoints: { server: 'server/main.ts' },
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
});
afterAll(async () => {
  await database.drop();
  rmSync(folder, { recursive: true, force: true });
});

/** Starts the built server. @returns its process and what it has written so far */
function start(environment: Record<string, string>): { child: ChildProcess; output: () => string } {
  const child = spawn(process.execPath, [join(folder, 'server.mjs')], {
    env: { PORT: '0', HEDDLE_UPLOAD_DIR: uploads, ...environment },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  for (const stream of [child.stdout, child.stderr]) {
    stream?.on('data', (chunk: Buffer) => (output += chunk.toString()));
  }
  return { child, output: () => output };
}

async function originOf(output: () => string): Promise<string> {
  await expect.poll(output, { timeout: 20_000 }).toContain('server listens');
  return `http://127.0.0.1:${/"port":(\d+)/.exec(output())?.[1]}`;
}

describe('the server process', () => {
  test('says in one plain sentence what is wrong with its settings, and ends', async () => {
    const { child, output } = start({ DATABASE_URL: '' });
    const [code] = (await once(child, 'exit')) as [number];
    expect(code).toBe(1);
    expect(output()).toMatch(/^The server cannot start: DATABASE_URL .+\.\n$/);
  });

  test('ends within 10 s of SIGTERM, open stream and half an upload or not', async () => {
    const made = await makeWorkspace(database.db);
    const { revisionId } = await makeDataset(database.db, made.scope);
    const runId = await makeQueuedRun(database.db, made.scope, revisionId);
    const [cookie = ''] = (await makeSessions(database.db, false).start(made.owner.id)).split(';');
    const { child, output } = start({ DATABASE_URL: database.url });
    const origin = await originOf(output);
    const workspace = `${origin}/api/workspaces/${made.id}`;

    const events = await fetch(`${workspace}/runs/${runId}/events`, { headers: { cookie } });
    const stream = events.text();
    const upload = request(`${workspace}/datasets`, {
      method: 'POST',
      headers: { cookie, origin, 'content-type': 'multipart/form-data; boundary=b' },
    });
    const cut = once(upload, 'error');
    upload.write(
      '--b\r\nContent-Disposition: form-data; name="nodes"; filename="n"\r\n\r\nid,entry',
    );
    await expect.poll(() => readdirSync(uploads).length, { timeout: 5000 }).toBe(1);

    const asked = Date.now();
    child.kill('SIGTERM');
    // The stream is ended, not broken off.
    expect(await stream).toContain('event: progress');
    const [code] = (await once(child, 'exit')) as [number | null];
    expect(Date.now() - asked).toBeLessThan(10_000);
    expect(code).toBe(0);
    await cut;
    expect(readdirSync(uploads)).toEqual([]);
  });
});
