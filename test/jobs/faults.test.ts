import { once } from 'node:events';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { findRun } from '../../db/repositories/runs';
import { runBlocks } from '../../db/schema/index';
import { eq } from 'drizzle-orm';
import type { Network } from '../../jobs/engine/types';
import { networkTaking } from '../support/heavyNetwork';
import { FLUSHABLE_REDIS, Workshop, type Subject } from '../support/workshop';
import { storedHash } from '../support/wholeMatrix';

describe('a worker', () => {
  let workshop: Workshop;
  let network: Network;
  let undisturbed: string;

  beforeAll(async () => {
    workshop = await Workshop.open(FLUSHABLE_REDIS);
    network = networkTaking(4);
    const subject = await workshop.bring(network);
    const worker = workshop.startWorker({ HEDDLE_THREADS: '2' });
    const runId = await workshop.submit(subject);
    await workshop.reached(subject.scope, runId, ({ state }) => state === 'done', 60);
    undisturbed = await storedHash(workshop.db, subject.scope, runId);
    await worker.close();
  });
  afterEach(() => workshop.endWorkers());
  afterAll(() => workshop.close());

  const done = ({ scope }: Subject, runId: string) =>
    workshop.reached(scope, runId, ({ state }) => state === 'done', 50);

  test('killed mid-run, five times, is followed by one that ends with the same bytes', async () => {
    const subject = await workshop.bring(network);
    const runId = await workshop.submit(subject);
    let resumedAfter = 0;
    for (let kill = 0; kill < 5; kill++) {
      const started = await workshop.progress(subject.scope, runId);
      const from = performance.now();
      const child = workshop.spawnWorker();
      const seen = await workshop.reached(
        subject.scope,
        runId,
        ({ state, blocksDone }) => state === 'done' || blocksDone > started.blocksDone,
        40,
      );
      if (kill > 0) resumedAfter = Math.max(resumedAfter, performance.now() - from);
      expect(seen.state).toBe('running');
      child.kill('SIGKILL');
      await once(child, 'exit');
    }
    workshop.spawnWorker();
    await done(subject, runId);
    expect(await storedHash(workshop.db, subject.scope, runId)).toBe(undisturbed);
    expect(resumedAfter).toBeLessThan(16_000);
  }, 110_000);

  test('told to end hands its blocks to another within ten seconds', async () => {
    const first = workshop.spawnWorker();
    const subject = await workshop.bring(network);
    const runId = await workshop.submit(subject);
    await workshop.reached(subject.scope, runId, ({ blocksDone }) => blocksDone > 0);
    workshop.spawnWorker();
    const from = performance.now();
    first.kill('SIGTERM');
    await once(first, 'exit');
    expect(performance.now() - from).toBeLessThan(10_000);
    expect(first.exitCode).toBe(0);
    await done(subject, runId);
    expect(await storedHash(workshop.db, subject.scope, runId)).toBe(undisturbed);
    const run = await findRun(workshop.db, subject.scope, runId);
    expect(run?.state).toBe('done');
  });

  test('shares a run with another, and every block is stored once', async () => {
    workshop.startWorker();
    workshop.startWorker();
    const subject = await workshop.bring(network);
    const runId = await workshop.submit(subject);
    await done(subject, runId);
    expect(await storedHash(workshop.db, subject.scope, runId)).toBe(undisturbed);
    const blocks = await workshop.db.select().from(runBlocks).where(eq(runBlocks.runId, runId));
    expect(new Set(blocks.map(({ landed }) => landed)).size).toBe(blocks.length);
  });

  test('finishes a run although the queue is emptied under it', async () => {
    workshop.startWorker();
    const subject = await workshop.bring(network);
    const runId = await workshop.submit(subject);
    await workshop.reached(subject.scope, runId, ({ blocksDone }) => blocksDone > 0);
    await workshop.redis.flushdb();
    await done(subject, runId);
    expect(await storedHash(workshop.db, subject.scope, runId)).toBe(undisturbed);
  });
});
