import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { redispatchPairs } from '../../db/repositories/pairDetails';
import { outbox, pairDetails } from '../../db/schema/index';
import { arrivalOrder, prepare, similarity, swapDetail } from '../../jobs/engine/index';
import { readPair } from '../../server/runs/pairs';
import { constantProbability, withEntries } from '../support/graphs';
import { Workshop, until } from '../support/workshop';

const LIMITS = { simplices: 1e8, bytes: 4 * 2 ** 30 };
const NEVER = { shouldStop: () => false, onProgress: () => undefined };

/** Simplices of so many positions each, as lists of node rows. */
function inRows(simplices: Int32Array | null, width: number, order: Uint32Array) {
  if (simplices === null) return null;
  return Array.from({ length: simplices.length / width }, (_, i) =>
    Array.from(simplices.subarray(i * width, (i + 1) * width), (p) => order[p]),
  );
}

describe('a swap in full', () => {
  let workshop: Workshop;
  beforeAll(async () => {
    workshop = await Workshop.open();
  });
  afterAll(() => workshop.close());

  const signal = new AbortController().signal;

  test('is the engine’s, told by node rows, whichever of the two is named first', async () => {
    workshop.startWorker();
    const network = withEntries(constantProbability(30, 0.4, 21), 'shuffled', 21);
    const subject = await workshop.bring(network);
    const runId = await workshop.submit(subject);
    const read = (a: number, b: number) =>
      readPair(workshop.db, workshop.listener, subject.scope, { runId, a, b }, signal);
    const order = arrivalOrder(network.values);
    const prepared = prepare(network, 3, LIMITS, NEVER);
    for (const [p, q] of [
      [0, 29],
      [3, 11],
    ] as const) {
      const [a, b] = [order[p] ?? 0, order[q] ?? 0];
      const expected = swapDetail(prepared, p, q);
      const answer = await read(b, a);
      expect(answer).toMatchObject({ a, b, bound: expected.bound });
      expect(answer.dimensions.map(({ distance }) => distance)).toEqual(expected.distances);
      expect(answer.similarity).toBe(similarity(expected.distances, expected.bound, [1, 2, 3]));
      expect(answer.dimensions.map(({ swapped }) => swapped.length)).toEqual(
        expected.swapped.map(({ births }) => births.length),
      );
      answer.dimensions.forEach(({ cycles }, k) => {
        expect(cycles.swapped).toEqual(
          expected.cycles[k]!.swapped.map(({ bar, simplices }) => ({
            bar,
            simplices: inRows(simplices, k + 1, order),
          })),
        );
      });
      expect(await read(a, b)).toEqual(answer);
    }
    await expect(read(4, 4)).rejects.toMatchObject({ code: 'pairs.not_found' });
    await expect(read(0, 30)).rejects.toMatchObject({ code: 'pairs.not_found' });
  });

  test('asked for by many at once is worked out once and answers all', async () => {
    const subject = await workshop.bring(constantProbability(20, 0.4, 5));
    const runId = await workshop.submit(subject);
    const answers = await Promise.all(
      Array.from({ length: 12 }, () =>
        readPair(workshop.db, workshop.listener, subject.scope, { runId, a: 2, b: 9 }, signal),
      ),
    );
    expect(new Set(answers.map((answer) => JSON.stringify(answer))).size).toBe(1);
    const rows = await workshop.db.select().from(pairDetails);
    expect(rows.filter((row) => row.runId === runId)).toMatchObject([{ p: 2, q: 9, tries: 1 }]);
  });

  test('whose job was lost is asked for again', async () => {
    await workshop.endWorkers();
    const subject = await workshop.bring(constantProbability(12, 0.4, 5));
    const runId = await workshop.submit(subject);
    const leaving = new AbortController();
    const asked = readPair(
      workshop.db,
      workshop.listener,
      subject.scope,
      { runId, a: 0, b: 1 },
      leaving.signal,
    );
    await until(
      () => workshop.db.select().from(outbox),
      (rows) => rows.some(({ kind }) => kind === 'pair'),
    );
    leaving.abort();
    await expect(asked).rejects.toMatchObject({ code: 'pairs.not_answered_yet' });
    await workshop.database.pool.query(`delete from outbox where kind = 'pair'`);
    await redispatchPairs(workshop.db, 0);
    workshop.startWorker();
    const answer = await readPair(
      workshop.db,
      workshop.listener,
      subject.scope,
      { runId, a: 0, b: 1 },
      signal,
    );
    expect(answer).toMatchObject({ a: 0, b: 1 });
  });
});
