import { randomUUID } from 'node:crypto';
import { Queue } from 'bullmq';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { secondsSinceBeat } from '../../db/repositories/beats';
import { blockJobId, planJobId } from '../../jobs/queue/jobs';
import { openProducer } from '../../jobs/queue/producer';
import { constantProbability } from '../support/graphs';
import { Workshop, until } from '../support/workshop';

describe('the queue', () => {
  let workshop: Workshop;
  beforeAll(async () => {
    workshop = await Workshop.open();
  });
  afterAll(() => workshop.close());

  test('holds ids only: no payload is larger than 1 KB, whatever the run', async () => {
    const { REDIS_URL: redisUrl = '' } = workshop.environment();
    const producer = openProducer({ redisUrl, prefix: workshop.prefix, onError: () => undefined });
    const queue = new Queue('blocks', { connection: { url: redisUrl }, prefix: workshop.prefix });
    try {
      const [dispatch, runId] = [randomUUID(), randomUUID()];
      const payload = { v: 1 as const, runId, attempt: 1_000 };
      await producer.addFlow(
        { name: 'finish', id: `${dispatch}-finish`, payload },
        Array.from({ length: 50 }, (_, k) => ({
          name: 'block',
          id: blockJobId(dispatch, k),
          payload: { ...payload, block: k + 999_999_000 },
        })),
      );
      const jobs = await queue.getJobs();
      expect(jobs).toHaveLength(50);
      for (const job of jobs) {
        expect(Buffer.byteLength(JSON.stringify(job.asJSON()))).toBeLessThan(1_024);
      }
    } finally {
      await queue.obliterate({ force: true });
      await queue.close();
      await producer.close();
    }
  });

  test('adds a repeated dispatch once', async () => {
    const { REDIS_URL: redisUrl = '' } = workshop.environment();
    const producer = openProducer({ redisUrl, prefix: workshop.prefix, onError: () => undefined });
    const queue = new Queue('runs', { connection: { url: redisUrl }, prefix: workshop.prefix });
    try {
      const id = planJobId(randomUUID());
      const payload = { v: 1 as const, runId: randomUUID(), attempt: 1 };
      for (let k = 0; k < 3; k++) await producer.add({ name: 'plan', id, payload });
      expect((await queue.getJobs(['waiting'])).filter((job) => job.id === id)).toHaveLength(1);
      expect(await producer.stateOf('runs', id)).toBe('waiting');
      expect(await producer.stateOf('runs', randomUUID())).toBe('unknown');
    } finally {
      await queue.obliterate({ force: true });
      await queue.close();
      await producer.close();
    }
  });

  test('proves itself by a beat that was consumed, and keeps a submission while Redis is away', async () => {
    expect(await secondsSinceBeat(workshop.db)).toBeNull();
    const subject = await workshop.bring(constantProbability(8, 0.5, 1));
    const away = workshop.startWorker({ REDIS_URL: 'redis://127.0.0.1:1/0' });
    const runId = await workshop.submit(subject);
    const { rows } = await workshop.database.pool.query<{ kind: string }>(
      'select kind from outbox',
    );
    expect(rows.map(({ kind }) => kind)).toContain('plan');
    await away.close();
    workshop.startWorker();
    await workshop.reached(subject.scope, runId, ({ state }) => state === 'done');
    const age = await until(
      () => secondsSinceBeat(workshop.db),
      (seconds) => seconds !== null,
    );
    expect(age).toBeLessThan(20);
  });
});
