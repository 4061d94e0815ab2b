import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { decodeBarcode } from '../../db/codecs/barcode';
import { listLanded } from '../../db/repositories/runBlocks';
import { findBarcode, findRun, stopRun } from '../../db/repositories/runs';
import { storeBlock } from '../../db/repositories/runWork';
import { mails } from '../../db/schema/index';
import { ENGINE_VERSION, prepare, recordedBarcode } from '../../jobs/engine/index';
import { denseRanks } from '../../jobs/scales';
import { constantProbability, networkOf } from '../support/graphs';
import { networkTaking } from '../support/heavyNetwork';
import { Workshop } from '../support/workshop';
import { directMatrix, storedHash, storedMatrix } from '../support/wholeMatrix';

const SILENT = { afterSeconds: Infinity, compose: () => ({ subject: '', body: '' }) };
const LIMITS = { simplices: 1e8, bytes: 4 * 2 ** 30 };
const NEVER = { shouldStop: () => false, onProgress: () => undefined };

describe('a run', () => {
  let workshop: Workshop;
  beforeAll(async () => {
    workshop = await Workshop.open();
    workshop.startWorker({ HEDDLE_THREADS: '2' });
  });
  afterAll(() => workshop.close());

  test('stores what the engine gives when it is called directly', async () => {
    const network = constantProbability(40, 0.35, 11);
    const subject = await workshop.bring(network);
    const runId = await workshop.submit(subject);
    const end = await workshop.reached(subject.scope, runId, ({ state }) => state === 'done');
    expect(end.pairsDone).toBe(780);
    expect(end.blocksDone).toBe(end.blockCount);
    const stored = await storedMatrix(workshop.db, subject.scope, runId, 40);
    expect(stored).toEqual(directMatrix(network, 3));
    const bytes = await findBarcode(workshop.db, subject.scope, runId);
    expect(decodeBarcode(bytes ?? new Uint8Array())).toEqual(
      recordedBarcode(prepare(network, 3, LIMITS, NEVER)),
    );
    const run = await findRun(workshop.db, subject.scope, runId);
    expect(run?.engineVersion).toBe(ENGINE_VERSION);
    const landed = await listLanded(workshop.db, subject.scope, runId);
    expect([...landed].sort((a, b) => a - b)).toEqual(landed.map((_, k) => k));
  });

  test('on the rank scale measures in steps that equal entries share', async () => {
    const entries = [10, 10, 300, 20, -4, 20, 7.5, 1e6];
    expect([...denseRanks(Float64Array.from(entries))]).toEqual([3, 3, 5, 4, 1, 4, 2, 6]);
    const { edges } = constantProbability(8, 0.6, 3);
    const network = { nodeCount: 8, edges, values: Float64Array.from(entries) };
    const subject = await workshop.bring(network);
    const runId = await workshop.submit(subject, { scale: 'rank', dimensions: [0, 1] });
    await workshop.reached(subject.scope, runId, ({ state }) => state === 'done');
    const ranked = { nodeCount: 8, edges, values: denseRanks(network.values) };
    expect(await storedMatrix(workshop.db, subject.scope, runId, 8)).toEqual(
      directMatrix(ranked, 1),
    );
  });

  test('of a network without a pair is done with an empty matrix', async () => {
    for (const nodeCount of [0, 1]) {
      const subject = await workshop.bring(networkOf(nodeCount, []));
      const runId = await workshop.submit(subject);
      const end = await workshop.reached(subject.scope, runId, ({ state }) => state === 'done');
      expect(end).toMatchObject({ pairsTotal: 0, pairsDone: 0, blockCount: 0 });
    }
  });

  test('over a limit fails alone, with the number that broke it', async () => {
    const strict = await Workshop.open();
    try {
      strict.startWorker({ HEDDLE_MAX_SIMPLICES: '5000' });
      const dense = await strict.bring(constantProbability(60, 0.9, 5));
      const small = await strict.bring(constantProbability(20, 0.3, 5));
      const refused = await strict.submit(dense);
      const fine = await strict.submit(small);
      await strict.reached(small.scope, fine, ({ state }) => state === 'done');
      const end = await strict.reached(dense.scope, refused, ({ state }) => state === 'failed');
      expect(end.failureCode).toBe('engine.limit_simplices');
      expect(end.failureMessage).toMatch(/5[,.\u00a0 ]?000/);
    } finally {
      await strict.close();
    }
  });

  test('that is stopped stays stopped, and nothing is written after', async () => {
    const subject = await workshop.bring(networkTaking(4));
    const runId = await workshop.submit(subject);
    await workshop.reached(subject.scope, runId, ({ blocksDone }) => blocksDone > 0);
    const before = performance.now();
    expect(await stopRun(workshop.db, subject.scope, runId)).toBe(true);
    const { state, blocksDone } = await workshop.progress(subject.scope, runId);
    expect(performance.now() - before).toBeLessThan(1_000);
    expect(state).toBe('stopped');
    expect(await stopRun(workshop.db, subject.scope, runId)).toBe(false);
    // A later run of the same workers ends: the stopped one holds none of their threads.
    const next = await workshop.bring(constantProbability(20, 0.4, 1));
    const nextId = await workshop.submit(next);
    await workshop.reached(next.scope, nextId, (seen) => seen.state === 'done');
    expect(await workshop.progress(subject.scope, runId)).toMatchObject({
      state: 'stopped',
      blocksDone,
    });
  });

  test('has exactly one end, however stopping and finishing race', async () => {
    const ends = new Map<string, number>();
    const network = constantProbability(12, 0.5, 9);
    for (let round = 0; round < 30; round++) {
      const subject = await workshop.bring(network);
      const runId = await workshop.submit(subject);
      await workshop.reached(subject.scope, runId, ({ state, blockCount }) =>
        round % 3 === 0 ? true : round % 3 === 1 ? state !== 'queued' : blockCount !== null,
      );
      const stopped = await stopRun(workshop.db, subject.scope, runId);
      const end = await workshop.reached(
        subject.scope,
        runId,
        ({ state }) => state !== 'queued' && state !== 'running',
      );
      expect(end.state).toBe(stopped ? 'stopped' : 'done');
      expect(end.state === 'done').toBe(end.blocksDone === end.blockCount);
      ends.set(end.state, (ends.get(end.state) ?? 0) + 1);
    }
    expect([...ends.values()].reduce((sum, count) => sum + count, 0)).toBe(30);
  });

  test('asked for 50 times at once under one key is one run', async () => {
    const subject = await workshop.bring(constantProbability(10, 0.4, 4));
    const ids = await Promise.all(
      Array.from({ length: 50 }, () => workshop.submit(subject, { key: 'once' })),
    );
    expect(new Set(ids).size).toBe(1);
    const { rows } = await workshop.database.pool.query<{ count: string }>(
      'select count(*) from runs where workspace_id = $1',
      [subject.scope.workspaceId],
    );
    expect(Number(rows[0]?.count)).toBe(1);
  });

  test('takes no row from a worker of an earlier attempt', async () => {
    const subject = await workshop.bring(networkTaking(4));
    const runId = await workshop.submit(subject);
    await workshop.reached(subject.scope, runId, ({ blockCount }) => (blockCount ?? 0) > 1);
    await workshop.database.pool.query('update runs set attempt = attempt + 1 where id = $1', [
      runId,
    ]);
    const stale = { runId, attempt: 1 };
    const nothing = { result: new Uint8Array(8), storedBy: 'nobody', seconds: 0 };
    const hash = await storedHash(workshop.db, subject.scope, runId);
    for (let block = 0; block < 3; block++) {
      expect(await storeBlock(workshop.db, stale, { ...nothing, block }, SILENT)).toBe('stale');
    }
    expect(await storedHash(workshop.db, subject.scope, runId)).toBe(hash);
    await stopRun(workshop.db, subject.scope, runId);
  });

  test('that took long is announced to its requester by mail, once', async () => {
    const other = await Workshop.open();
    try {
      other.startWorker({ HEDDLE_MAIL_AFTER: '0' });
      const subject = await other.bring(constantProbability(10, 0.4, 4));
      const runId = await other.submit(subject);
      await other.reached(subject.scope, runId, ({ state }) => state === 'done');
      const written = await other.db.select().from(mails);
      expect(written).toHaveLength(1);
      expect(written[0]?.subject).toContain('Run 1 of “Invented network” is done');
    } finally {
      await other.close();
    }
  });
});
