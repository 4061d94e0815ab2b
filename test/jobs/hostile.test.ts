import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { Network } from '../../jobs/engine/types';
import { constantProbability, networkOf, risingProbability } from '../support/graphs';
import { storedHash } from '../support/wholeMatrix';
import { Workshop } from '../support/workshop';

/** 20 sets of three nodes; nodes of different sets are all joined. */
function twentyTriples(): Network {
  const joined: [number, number][] = [];
  for (let b = 0; b < 60; b++)
    for (let a = 0; a < b; a++) if (a % 20 !== b % 20) joined.push([a, b]);
  return networkOf(60, joined);
}

describe('a hostile network', () => {
  let workshop: Workshop;
  beforeAll(async () => {
    workshop = await Workshop.open();
    workshop.startWorker({ HEDDLE_THREADS: '2' });
  });
  afterAll(() => workshop.close());

  const ended = async (network: Network, wanted: Parameters<Workshop['submit']>[1] = {}) => {
    const subject = await workshop.bring(network);
    const runId = await workshop.submit(subject, wanted);
    const end = await workshop.reached(
      subject.scope,
      runId,
      ({ state }) => state !== 'queued' && state !== 'running',
      60,
    );
    return { end, hash: await storedHash(workshop.db, subject.scope, runId) };
  };

  test('fails alone with the number, and its neighbours store what they store without it', async () => {
    const neighbour = constantProbability(40, 0.35, 11);
    const alone = await ended(neighbour);
    const [bomb, beside, triples] = await Promise.all([
      ended(constantProbability(500, 1, 1)),
      ended(neighbour),
      ended(twentyTriples(), { dimensions: [1] }),
    ]);
    expect(bomb.end).toMatchObject({ state: 'failed', failureCode: 'engine.limit_simplices' });
    expect(bomb.end.failureMessage).toContain('40000000');
    expect(beside.end.state).toBe('done');
    expect(beside.hash).toBe(alone.hash);
    expect(triples.end).toMatchObject({ state: 'done', pairsDone: 1770 });
  }, 90_000);

  test('of 500 nodes all joined is computed where its cliques are few', async () => {
    const part = { kind: 'within' as const, positions: 2 };
    const { end } = await ended(constantProbability(500, 1, 1), { dimensions: [0], part });
    expect(end).toMatchObject({ state: 'done', pairsDone: 2 * 500 - 3 });
  }, 90_000);

  test('of 5,000 isolated nodes is computed within a part of its pairs', async () => {
    const part = { kind: 'within' as const, positions: 3 };
    const { end } = await ended(networkOf(5_000, []), { part });
    expect(end).toMatchObject({ state: 'done', pairsDone: 3 * 5_000 - 6 });
  }, 90_000);

  test('takes longer than allowed: it is ended with the number, before and while it computes', async () => {
    const strict = await Workshop.open();
    try {
      // 3.6 s of one thread.
      strict.startWorker({ HEDDLE_MAX_HOURS: '0.001' });
      const heavy = await strict.bring(risingProbability(90, 2));
      const light = await strict.bring(constantProbability(12, 0.4, 3));
      const tooLong = await strict.submit(heavy);
      const fine = await strict.submit(light);
      await strict.reached(light.scope, fine, ({ state }) => state === 'done');
      const end = await strict.reached(heavy.scope, tooLong, ({ state }) => state === 'failed');
      expect(end.failureCode).toBe('engine.limit_seconds');
      expect(end.failureMessage).toMatch(/3\.6 s are allowed.*within.*overlap.*threshold/);

      // What stored blocks took counts: with the time spent already, the next block ends the run.
      const spent = await strict.bring(constantProbability(12, 0.4, 3));
      await strict.endWorkers();
      const runId = await strict.submit(spent);
      await strict.database.pool.query('update runs set seconds_spent = 4 where id = $1', [runId]);
      strict.startWorker({ HEDDLE_MAX_HOURS: '0.001' });
      const over = await strict.reached(spent.scope, runId, ({ state }) => state === 'failed');
      expect(over.failureMessage).toMatch(/took more than the 3\.6 s/);
    } finally {
      await strict.close();
    }
  }, 60_000);
});
