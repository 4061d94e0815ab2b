import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { openPool, type Pool } from '../../jobs/pool/pool';
import { networkOf } from '../support/graphs';

/** A thread that misbehaves as the number of nodes asks. */
const SCRIPT = `
export default function work({ subject, control }) {
  const { nodeCount } = subject.network;
  if (nodeCount === 1) { const kept = []; for (;;) kept.push(new Array(1e5).fill(kept.length)); }
  if (nodeCount === 2) process.exit(3);
  if (nodeCount === 3) for (;;) { /* Deaf to the flag. */ }
  if (nodeCount === 4) { while (Atomics.load(control, 0) === 0); return { kind: 'stopped' }; }
  return { kind: 'finished', result: nodeCount };
}`;

describe('the thread pool', () => {
  let folder: string;
  let pool: Pool;
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), 'heddle-pool-'));
    const script = join(folder, 'thread.mjs');
    writeFileSync(script, SCRIPT);
    pool = openPool({ script, threads: 2, heapMegabytes: 48, onError: () => undefined });
  });
  afterAll(async () => {
    await pool.close();
    rmSync(folder, { recursive: true });
  });

  const run = (nodeCount: number, signal = new AbortController().signal) =>
    pool.run<'plan'>(
      {
        kind: 'plan',
        secondsPerBlock: 1,
        part: { kind: 'whole' },
        stored: null,
        subject: {
          key: String(nodeCount),
          network: networkOf(nodeCount, []),
          maxDimension: 1,
          limits: { simplices: 1, bytes: 1 },
        },
      },
      signal,
    );

  test('loses only the task of a thread out of memory or dead, and replaces the thread', async () => {
    const [starved, dead, neighbour] = await Promise.all([run(1), run(2), run(7)]);
    expect(starved).toMatchObject({ kind: 'crashed', outOfMemory: true });
    expect(dead).toMatchObject({ kind: 'crashed', outOfMemory: false });
    expect(neighbour).toEqual({ kind: 'finished', result: 7 });
    for (let k = 10; k < 14; k++) expect(await run(k)).toEqual({ kind: 'finished', result: k });
  });

  test('frees a thread within two seconds of an abort, whether the task obeys or not', async () => {
    for (const nodeCount of [3, 4]) {
      const ending = new AbortController();
      const tasks = [run(nodeCount, ending.signal), run(nodeCount, ending.signal)];
      // A third task waits for a thread: when it ends, one is free again.
      const waiting = run(9);
      setTimeout(() => ending.abort(), 100);
      const from = performance.now();
      expect(await Promise.all(tasks)).toEqual([{ kind: 'stopped' }, { kind: 'stopped' }]);
      expect(await waiting).toEqual({ kind: 'finished', result: 9 });
      expect(performance.now() - from).toBeLessThan(2_100);
    }
  });

  test('does not begin a task whose run is over', async () => {
    expect(await run(5, AbortSignal.abort())).toEqual({ kind: 'stopped' });
  });
});
