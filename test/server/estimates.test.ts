import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { redispatchEstimates } from '../../db/repositories/revisionEstimates';
import { outbox, revisionEstimates } from '../../db/schema/index';
import { problemSchema } from '../../server/contract/problems';
import { runEstimate, startedRun } from '../../server/contract/runs';
import { readEstimate } from '../../server/runs/estimates';
import { estimate } from '../../jobs/engine/index';
import type { Network } from '../../jobs/engine/types';
import { constantProbability } from '../support/graphs';
import { serve, type RunServer } from '../support/runServer';
import { Workshop, until, type Subject } from '../support/workshop';

const signal = new AbortController().signal;

/** `parts` sets of `size` nodes; nodes of different sets are all joined. */
function completeMultipartite(parts: number, size: number): Network {
  const nodeCount = parts * size;
  const edges: number[] = [];
  for (let j = 0; j < nodeCount; j++)
    for (let i = 0; i < j; i++) if (i % parts !== j % parts) edges.push(i, j);
  const values = Float64Array.from({ length: nodeCount }, (_, row) => row);
  return { nodeCount, edges: Uint32Array.from(edges), values };
}

/** A network whose whole matrix is estimated at a little more than so many seconds. */
function networkOver(seconds: number): Network {
  for (let nodeCount = 40; ; nodeCount += 1) {
    const network = constantProbability(nodeCount, 0.3, 6);
    if (estimate(network, 3, { simplices: 1e7, bytes: 2 ** 31 }).seconds > seconds) return network;
  }
}

describe('what a run would need, before it is started', () => {
  let workshop: Workshop;
  let server: RunServer;
  beforeAll(async () => {
    workshop = await Workshop.open();
    server = await serve(workshop);
    workshop.startWorker();
  });
  afterAll(async () => {
    await server.close();
    await workshop.close();
  });

  async function visitorOf({ scope, revisionId }: Subject) {
    const { cookie } = await server.join(scope.workspaceId, 'analyst');
    const base = `${server.origin}/api/workspaces/${scope.workspaceId}`;
    const startWith = (wanted: object, key: string = randomUUID()) =>
      fetch(`${base}/runs`, {
        method: 'POST',
        headers: {
          cookie,
          origin: server.origin,
          'content-type': 'application/json',
          'idempotency-key': key,
        },
        body: JSON.stringify({ revisionId, ...wanted }),
      });
    return {
      ask: (query: string, id = revisionId) =>
        fetch(`${base}/revisions/${id}/estimate${query}`, { headers: { cookie } }),
      start: (dimensions: number[], key?: string) => startWith({ dimensions }, key),
      startWith,
    };
  }

  test('is the engine’s own count, for every highest dimension', async () => {
    const network = constantProbability(30, 0.4, 21);
    const { ask, start } = await visitorOf(await workshop.bring(network));
    const { limits, mostSeconds } = workshop.config();
    for (const maxDimension of [0, 1, 2, 3]) {
      const answer = await ask(`?maxDimension=${maxDimension}`);
      const read = runEstimate.parse(await answer.json());
      const expected = estimate(network, maxDimension, limits);
      expect(read).toEqual({
        maxDimension,
        ...expected,
        margin: read.margin,
        startUp: read.startUp,
        allowed: { ...limits, seconds: mostSeconds },
        part: { kind: 'whole' },
        ways: null,
        refusal: null,
      });
      expect(read.cliques).toHaveLength(maxDimension + 2);
    }
    expect((await start([1, 3])).status).toBe(201);
    for (const wrong of ['4', '-1', '1.5', 'x', '']) {
      expect([wrong, (await ask(`?maxDimension=${wrong}`)).status]).toEqual([wrong, 400]);
    }
    expect((await ask('?maxDimension=1', randomUUID())).status).toBe(404);
  });

  test('500 nodes all joined are over the budget within seconds, and refused with the ways out', async () => {
    const { ask, start } = await visitorOf(await workshop.bring(completeMultipartite(500, 1)));
    const from = performance.now();
    const answer = runEstimate.parse(await (await ask('?maxDimension=3')).json());
    expect(performance.now() - from).toBeLessThan(10_000);
    expect(answer.exact).toBe(false);
    expect(answer.cliques[0]).toBeLessThanOrEqual(500);
    expect(answer.refusal).toContain('40,000,000');
    expect(answer.refusal).toMatch(/fewer dimensions.*weaker edges.*higher weight threshold/);
    const refused = await start([1, 2, 3]);
    const problem = problemSchema.parse(await refused.json());
    expect([refused.status, problem.code, problem.detail]).toEqual([
      422,
      'runs.too_large',
      answer.refusal,
    ]);
  });

  test('20 triples joined completely are answered within seconds', async () => {
    const { ask } = await visitorOf(await workshop.bring(completeMultipartite(20, 3)));
    const from = performance.now();
    const { cliques, exact } = runEstimate.parse(await (await ask('?maxDimension=3')).json());
    expect(performance.now() - from).toBeLessThan(10_000);
    // Cliques of s nodes: choose s of the 20 sets and one node of each.
    expect([cliques, exact]).toEqual([[60, 190 * 9, 1140 * 27, 4845 * 81, 15504 * 243], true]);
  });

  test('over the memory allowed is refused, while fewer dimensions that fit are not', async () => {
    await workshop.endWorkers();
    workshop.startWorker({ HEDDLE_MAX_MEGABYTES: '1' });
    const { ask, start } = await visitorOf(await workshop.bring(completeMultipartite(12, 2)));
    const large = runEstimate.parse(await (await ask('?maxDimension=3')).json());
    expect(large.exact).toBe(true);
    expect(large.refusal).toMatch(/MiB of memory; 1 MiB are allowed/);
    const small = runEstimate.parse(await (await ask('?maxDimension=0')).json());
    expect(small.refusal).toBeNull();
    expect((await start([3])).status).toBe(422);
    expect((await start([0])).status).toBe(201);
    // Nobody has asked for this one: the engine’s own guard decides while it runs.
    expect((await start([2])).status).toBe(201);
  });

  test('over the time allowed names the ways that fit, and each of them may be started', async () => {
    await workshop.endWorkers();
    // 0.36 s of one thread.
    workshop.startWorker({ HEDDLE_MAX_HOURS: '0.0001' });
    const network = networkOver(0.36);
    const { ask, start, startWith } = await visitorOf(await workshop.bring(network));
    const whole = runEstimate.parse(await (await ask('?maxDimension=3')).json());
    expect(whole.refusal).toMatch(
      /pairs would take about 0\.\d+ s of one thread; 0\.36 s are allowed/,
    );
    const { ways } = whole;
    expect([ways?.within, ways?.dimension]).toEqual([expect.any(Number), expect.any(Number)]);
    expect((await start([3])).status).toBe(422);
    if (ways?.within) {
      const part = { kind: 'within', positions: ways.within };
      expect(whole.refusal).toContain(`within k positions (up to ${ways.within} fit)`);
      const query = `?maxDimension=3&part=${encodeURIComponent(JSON.stringify(part))}`;
      const fitting = runEstimate.parse(await (await ask(query)).json());
      expect([fitting.refusal, fitting.part]).toEqual([null, part]);
      expect(fitting.pairs).toBeLessThan(whole.pairs);
      expect([fitting.cliques, fitting.bytes]).toEqual([whole.cliques, whole.bytes]);
      expect((await startWith({ dimensions: [3], part })).status).toBe(201);
    }
    if (ways?.dimension != null) {
      const query = `?maxDimension=${ways.dimension}`;
      expect(runEstimate.parse(await (await ask(query)).json()).refusal).toBeNull();
      expect((await start([ways.dimension])).status).toBe(201);
    }
    expect(whole.refusal).toMatch(/higher weight threshold\)\.$/);
    for (const wrong of ['x', '{}', '{"kind":"within","positions":0}', '[1]']) {
      const answer = await ask(`?part=${encodeURIComponent(wrong)}`);
      expect([wrong, answer.status]).toEqual([wrong, 400]);
    }
  });

  test('found over the budget later does not refuse the repeat of a run that was started', async () => {
    await workshop.endWorkers();
    workshop.startWorker({ HEDDLE_MAX_MEGABYTES: '1' });
    const { ask, start } = await visitorOf(await workshop.bring(completeMultipartite(12, 2)));
    const key = randomUUID();
    const first = startedRun.parse(await (await start([3], key)).json());
    const counted = runEstimate.parse(await (await ask('?maxDimension=3')).json());
    expect(counted.refusal).not.toBeNull();
    const repeated = await start([3], key);
    expect(repeated.status).toBe(201);
    expect(startedRun.parse(await repeated.json()).id).toBe(first.id);
    expect((await start([3])).status).toBe(422);
  });

  test('asked for by many at once is counted once; a lost job is asked for again', async () => {
    await workshop.endWorkers();
    const { scope, revisionId } = await workshop.bring(constantProbability(12, 0.4, 5));
    const question = { revisionId, maxDimension: 2, part: { kind: 'whole' as const } };
    const read = (until = signal) =>
      readEstimate(workshop.db, workshop.listener, scope, question, until);
    const leaving = new AbortController();
    const asked = read(leaving.signal);
    await until(
      () => workshop.db.select().from(outbox),
      (rows) => rows.some(({ kind }) => kind === 'estimate'),
    );
    leaving.abort();
    await expect(asked).rejects.toMatchObject({ code: 'estimates.not_answered_yet' });
    await workshop.database.pool.query(`delete from outbox where kind = 'estimate'`);
    await redispatchEstimates(workshop.db, 0);
    workshop.startWorker();
    const answers = await Promise.all(Array.from({ length: 12 }, () => read()));
    expect(new Set(answers.map((answer) => JSON.stringify(answer))).size).toBe(1);
    const rows = await workshop.db.select().from(revisionEstimates);
    expect(rows.filter((row) => row.revisionId === revisionId)).toMatchObject([{ tries: 1 }]);
  });
});
