import { and, eq } from 'drizzle-orm';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import type { RunPart } from '../../server/contract/enums';
import { decodeMatrixBlock } from '../../server/contract/matrixBytes';
import { problemSchema } from '../../server/contract/problems';
import {
  run as runSchema,
  startedRun,
  type Run,
  type StartedRun,
} from '../../server/contract/runs';
import { beats, revisionNodes, runBlocks, runs } from '../../db/schema/index';
import type { Network } from '../../jobs/engine/types';
import { partMask } from '../../src/graphs/runPart';
import { pairIndex } from '../../src/graphs/swapMatrix';
import { constantProbability, seeded, withEntries } from '../support/graphs';
import { serve, type RunServer } from '../support/runServer';
import { storedHash } from '../support/wholeMatrix';
import { Workshop, until, type Subject } from '../support/workshop';

const NODES = 26;

const PARTS: readonly (readonly [string, RunPart])[] = [
  ['within 4 positions', { kind: 'within', positions: 4 }],
  ['only overlapping intervals', { kind: 'overlapping' }],
  [
    'chosen windows, nodes and pairs',
    { kind: 'chosen', windows: [[3, 9]], nodes: [0, 14], pairs: [[5, 20]] },
  ],
];

describe('a run of a part of the pairs', () => {
  let workshop: Workshop;
  let server: RunServer;
  let whole: string[];
  const network = withEntries(constantProbability(NODES, 0.45, 8), 'tied', 8);

  beforeAll(async () => {
    workshop = await Workshop.open();
    server = await serve(workshop);
    workshop.startWorker();
    const { subject, start, csv } = await visit(network);
    const { id } = await start({});
    await workshop.reached(subject.scope, id, ({ state }) => state === 'done');
    whole = await csv(id);
  });
  afterEach(async () => {
    await workshop.endWorkers();
    workshop.startWorker();
  });
  afterAll(async () => {
    await server.close();
    await workshop.close();
  });

  /** The network with drawn detection windows, in a workspace of its own, and its analyst's requests. */
  async function visit(visited: Network) {
    const subject = await workshop.bring(visited);
    const source = seeded(4);
    for (const [row, entry] of visited.values.entries()) {
      // Every third node has no window: its interval is its entry.
      if (row % 3 === 0) continue;
      const window = {
        earliest: entry - source.integer(0, 3),
        latest: entry + source.integer(0, 3),
      };
      await workshop.db
        .update(revisionNodes)
        .set(window)
        .where(and(eq(revisionNodes.revisionId, subject.revisionId), eq(revisionNodes.row, row)));
    }
    const { cookie } = await server.join(subject.scope.workspaceId, 'analyst');
    const base = `${server.origin}/api/workspaces/${subject.scope.workspaceId}/runs`;
    const ask = (path: string, method = 'GET', body?: object) =>
      fetch(`${base}${path}`, {
        method,
        headers: {
          cookie,
          origin: server.origin,
          ...(body && { 'content-type': 'application/json' }),
        },
        body: body && JSON.stringify(body),
      });
    const start = async (wanted: object): Promise<StartedRun> =>
      startedRun.parse(
        await (await ask('', 'POST', { revisionId: subject.revisionId, ...wanted })).json(),
      );
    const csv = async (id: string): Promise<string[]> =>
      (await (await ask(`/${id}/pairs.csv`)).text()).trimEnd().split('\n');
    const read = async (id: string): Promise<Run> =>
      runSchema.parse(await (await ask(`/${id}`)).json());
    return { subject, ask, start, csv, read };
  }

  const finished = ({ scope }: Subject, id: string) =>
    workshop.reached(scope, id, ({ state }) => state === 'done');

  /** Lines of the whole pairs.csv that a part holds, by the browser's own mask. */
  async function linesOf(part: RunPart, subject: Subject): Promise<string[]> {
    const rows = await workshop.db
      .select()
      .from(revisionNodes)
      .where(eq(revisionNodes.revisionId, subject.revisionId))
      .orderBy(revisionNodes.entry, revisionNodes.row);
    const mask = partMask(part, rows);
    return whole.filter((_, line) => line === 0 || mask[line - 1] === 1);
  }

  test.each(PARTS)('%s has the lines of the whole pairs.csv and no others', async (_, part) => {
    const { subject, start, csv, read } = await visit(network);
    const { id } = await start({ part });
    await finished(subject, id);
    const lines = await linesOf(part, subject);
    expect(lines.length).toBeGreaterThan(5);
    expect(lines.length).toBeLessThan(whole.length);
    expect(await csv(id)).toEqual(lines);
    expect(await read(id)).toMatchObject({
      part,
      pairsTotal: lines.length - 1,
      pairsDone: lines.length - 1,
    });
  });

  test('sends blocks whose partners name the pairs that are in them', async () => {
    const { subject, ask, start, read } = await visit(network);
    const { id } = await start({ part: { kind: 'within', positions: 4 } });
    await finished(subject, id);
    const seen = new Set<number>();
    for (const block of (await read(id)).blocksDone) {
      const bytes = await (await ask(`/${id}/blocks/${block}`)).arrayBuffer();
      const { rows, choice, pairCount, distances } = decodeMatrixBlock(bytes);
      expect(distances).toHaveLength(4 * pairCount);
      for (const [i, p] of rows.entries()) {
        const partners = choice
          ? choice.partners.subarray(choice.starts[i], choice.starts[i + 1])
          : Uint32Array.from({ length: NODES - 1 - p }, (__, k) => p + 1 + k);
        for (const q of partners) {
          expect(q - p).toBeLessThanOrEqual(4);
          seen.add(pairIndex(NODES, p, q));
        }
      }
    }
    expect(seen.size).toBe(4 * NODES - 10);
  });

  test.each(PARTS)(
    '%s is extended to the whole: stored blocks stay, and the file is that of a whole run',
    async (_, part) => {
      const { subject, ask, start, csv, read } = await visit(network);
      const { id } = await start({ part });
      await finished(subject, id);
      const blocksOf = () =>
        workshop.db
          .select()
          .from(runBlocks)
          .where(eq(runBlocks.runId, id))
          .orderBy(runBlocks.block);
      const before = await blocksOf();
      const answer = await ask(`/${id}/extend`, 'POST');
      expect(answer.status).toBe(200);
      expect(runSchema.parse(await answer.json())).toMatchObject({
        part: { kind: 'whole' },
        extendedFrom: part,
        pairsDone: before.reduce((sum, { pairs }) => sum + pairs, 0),
      });
      await finished(subject, id);
      const after = await blocksOf();
      expect(after.slice(0, before.length)).toEqual(before);
      expect(after.length).toBeGreaterThan(before.length);
      expect(after.reduce((sum, { pairs }) => sum + pairs, 0)).toBe((NODES * (NODES - 1)) / 2);
      expect(await csv(id)).toEqual(whole);
      expect(await read(id)).toMatchObject({ state: 'done', pairsDone: 325, pairsTotal: 325 });
      const again = await ask(`/${id}/extend`, 'POST');
      expect([again.status, problemSchema.parse(await again.json()).code]).toEqual([
        409,
        'runs.nothing_to_extend',
      ]);
    },
  );

  test('keeps its pairs.csv while an extension is under way or stopped, which can be taken up again', async () => {
    const part: RunPart = { kind: 'within', positions: 4 };
    const { subject, ask, start, csv } = await visit(network);
    const { id } = await start({ part });
    await finished(subject, id);
    const lines = await csv(id);
    await workshop.endWorkers();
    expect((await ask(`/${id}/extend`, 'POST')).status).toBe(200);
    expect(await csv(id)).toEqual(lines);
    expect((await ask(`/${id}/stop`, 'POST')).status).toBe(200);
    expect(await csv(id)).toEqual(lines);
    expect((await ask(`/${id}/extend`, 'POST')).status).toBe(200);
    workshop.startWorker();
    await finished(subject, id);
    expect(await csv(id)).toEqual(whole);
  });

  test.each([
    ['a window past the last arrival', { kind: 'chosen', windows: [[0, NODES]] }],
    ['a node that is not there', { kind: 'chosen', nodes: [NODES] }],
    ['a window that ends before it begins', { kind: 'chosen', windows: [[5, 2]] }],
    ['a pair of one node', { kind: 'chosen', pairs: [[2, 2]] }],
    ['no pair at all', { kind: 'chosen' }],
    ['within no position', { kind: 'within', positions: 0 }],
    ['an unknown part', { kind: 'half' }],
  ])('is refused under the field: %s', async (_, part) => {
    const { subject, ask } = await visit(network);
    const answer = await ask('', 'POST', { revisionId: subject.revisionId, part });
    const problem = problemSchema.parse(await answer.json());
    expect([answer.status, problem.code]).toEqual([422, 'request.invalid']);
    expect(problem.issues?.[0]?.field).toMatch(/^part/);
  });

  test('takes a focus from any member while it goes: a node, a pair or a window that is there', async () => {
    await workshop.endWorkers();
    const { subject, start } = await visit(network);
    const { id } = await start({});
    const { cookie } = await server.join(subject.scope.workspaceId, 'reviewer');
    const put = (body: object) =>
      fetch(`${server.origin}/api/workspaces/${subject.scope.workspaceId}/runs/${id}/focus`, {
        method: 'PUT',
        headers: { cookie, origin: server.origin, 'content-type': 'application/json' },
        body: JSON.stringify(body),
      });
    const stored = async () =>
      (await workshop.db.select().from(runs).where(eq(runs.id, id)))[0]?.focus;
    const { values } = network;
    const positions = Array.from(values.keys()).sort(
      (a, b) => (values[a] ?? 0) - (values[b] ?? 0) || a - b,
    );
    expect((await put({ kind: 'node', row: 7 })).status).toBe(204);
    expect(await stored()).toEqual({ kind: 'node', p: positions.indexOf(7) });
    expect((await put({ kind: 'pair', a: 7, b: 2 })).status).toBe(204);
    const [p, q] = [positions.indexOf(7), positions.indexOf(2)].sort((a, b) => a - b);
    expect(await stored()).toEqual({ kind: 'pair', p, q });
    expect((await put({ kind: 'window', from: 20, to: 900 })).status).toBe(204);
    expect(await stored()).toEqual({ kind: 'window', from: 20, to: NODES - 1 });
    for (const missing of [
      { kind: 'node', row: NODES },
      { kind: 'pair', a: 3, b: 3 },
      { kind: 'window', from: 9, to: 4 },
    ]) {
      expect([missing, (await put(missing)).status]).toEqual([missing, 404]);
    }
    expect((await put({ kind: 'all' })).status).toBe(422);
  });

  describe('asked for again', () => {
    test('is answered with the stored run, under way or done, whatever order a part is written in', async () => {
      await workshop.endWorkers();
      const { subject, ask, start } = await visit(network);
      const wanted = {
        part: { kind: 'chosen', windows: [[3, 9]], nodes: [14, 0], pairs: [[20, 5]] },
        dimensions: [2, 1],
      };
      const first = await start(wanted);
      expect(first.found).toBe(false);
      const waiting = await ask('', 'POST', { revisionId: subject.revisionId, ...wanted });
      expect([waiting.status, startedRun.parse(await waiting.json())]).toMatchObject([
        200,
        { id: first.id, found: true },
      ]);
      workshop.startWorker();
      await finished(subject, first.id);
      const other = {
        part: { kind: 'chosen', windows: [[3, 9]], nodes: [0, 14, 14], pairs: [[5, 20]] },
        dimensions: [1, 2],
      };
      const hash = await storedHash(workshop.db, subject.scope, first.id);
      const again = await start(other);
      expect([again.id, again.found, again.state]).toEqual([first.id, true, 'done']);
      expect(await storedHash(workshop.db, subject.scope, first.id)).toBe(hash);
      const rows = await workshop.db
        .select()
        .from(runs)
        .where(eq(runs.revisionId, subject.revisionId));
      expect(rows).toHaveLength(1);
    });

    test('is computed where anything differs, or where the earlier run failed or was stopped', async () => {
      await workshop.endWorkers();
      const { ask, start } = await visit(network);
      const ids = new Set<string>();
      for (const wanted of [
        {},
        { scale: 'rank' },
        { dimensions: [1] },
        { dimensions: [0, 1, 2, 3] },
        { part: { kind: 'within', positions: 3 } },
        { part: { kind: 'within', positions: 4 } },
        { part: { kind: 'overlapping' } },
      ]) {
        const { id, found } = await start(wanted);
        expect([wanted, found]).toEqual([wanted, false]);
        ids.add(id);
      }
      expect(ids.size).toBe(7);
      const first = await start({});
      expect(first.found).toBe(true);
      await ask(`/${first.id}/stop`, 'POST');
      const second = await start({});
      expect(second.found).toBe(false);
      await workshop.db.update(runs).set({ state: 'failed' }).where(eq(runs.id, second.id));
      expect((await start({})).found).toBe(false);
    });

    test('is computed anew once the workers have another version of the engine', async () => {
      const { subject, start } = await visit(network);
      const { id } = await start({});
      await finished(subject, id);
      await until(
        () => workshop.db.select().from(beats),
        ([beat]) => (beat?.engineVersion ?? null) !== null,
      );
      expect((await start({})).found).toBe(true);
      await workshop.db.update(runs).set({ engineVersion: '0.0.1' }).where(eq(runs.id, id));
      expect((await start({})).found).toBe(false);
    });

    test('as the part it was before it was extended is answered with the whole run', async () => {
      const part = { kind: 'within', positions: 4 };
      const { subject, ask, start } = await visit(network);
      const { id } = await start({ part });
      await finished(subject, id);
      await ask(`/${id}/extend`, 'POST');
      await finished(subject, id);
      expect(await start({ part })).toMatchObject({ id, found: true });
      expect(await start({})).toMatchObject({ id, found: true });
    });
  });
});
