import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { ROUTES } from '../../server/contract/access';
import { decodeMatrixBlock } from '../../server/contract/matrixBytes';
import { progressEvent, type ProgressEvent } from '../../server/contract/progress';
import {
  pairDetail,
  recordedBarcode,
  run as runSchema,
  startedRun,
  type Run,
} from '../../server/contract/runs';
import { stopRun } from '../../db/repositories/runs';
import { constantProbability, withEntries } from '../support/graphs';
import { networkTaking } from '../support/heavyNetwork';
import { serve, type RunServer } from '../support/runServer';
import { directMatrix, storedMatrix } from '../support/wholeMatrix';
import { Workshop, until, type Subject } from '../support/workshop';

interface Event {
  readonly id: number;
  readonly data: ProgressEvent;
}

describe('the routes of runs', () => {
  let workshop: Workshop;
  let server: RunServer;
  let subject: Subject;
  let runs: string;
  let cookie: string;
  const network = withEntries(constantProbability(30, 0.4, 3), 'shuffled', 3);

  beforeAll(async () => {
    workshop = await Workshop.open();
    server = await serve(workshop);
    subject = await workshop.bring(network);
    runs = `${server.origin}/api/workspaces/${subject.scope.workspaceId}/runs`;
    cookie = (await server.join(subject.scope.workspaceId, 'analyst')).cookie;
    workshop.startWorker();
  });
  afterAll(async () => {
    await server.close();
    await workshop.close();
  });

  const get = (path: string, headers: Record<string, string> = {}) =>
    fetch(`${runs}${path}`, { headers: { cookie, ...headers } });
  const post = (path: string, body?: object, headers: Record<string, string> = {}) =>
    fetch(`${runs}${path}`, {
      method: 'POST',
      headers: {
        cookie,
        origin: server.origin,
        ...(body && { 'content-type': 'application/json' }),
        ...headers,
      },
      body: body && JSON.stringify(body),
    });
  /** A run of its own: an equal one of the same revision would be answered instead. */
  const start = async (wanted: object = {}): Promise<Run> => {
    const { revisionId } = await workshop.bring(network, subject.scope);
    const answer = await post('', { revisionId, ...wanted });
    expect(answer.status).toBe(201);
    return startedRun.parse(await answer.json());
  };
  const finished = async (runId: string): Promise<Run> =>
    until(
      async () => runSchema.parse(await (await get(`/${runId}`)).json()),
      ({ state }) => state === 'done',
    );

  /** Reads a progress stream to its end, or until `enough` says so. */
  async function events(
    runId: string,
    headers: Record<string, string> = {},
    enough: (seen: readonly Event[]) => boolean = () => false,
  ): Promise<Event[]> {
    const answer = await get(`/${runId}/events`, headers);
    expect(answer.headers.get('content-type')).toContain('text/event-stream');
    const seen: Event[] = [];
    let text = '';
    const decoder = new TextDecoder();
    const reader = answer.body?.getReader();
    for (;;) {
      const piece = await reader?.read();
      if (!piece?.value) break;
      text += decoder.decode(piece.value, { stream: true });
      for (let end = text.indexOf('\n\n'); end >= 0; end = text.indexOf('\n\n')) {
        const found = /^event: progress\nid: (\d+)\ndata: (.+)$/.exec(text.slice(0, end));
        text = text.slice(end + 2);
        if (found) {
          const data = progressEvent.parse(JSON.parse(found[2] ?? ''));
          seen.push({ id: Number(found[1]), data });
        }
      }
      if (enough(seen)) {
        await reader?.cancel();
        break;
      }
    }
    return seen;
  }

  test('a run is started, watched to its end, and its blocks are the engine’s matrix', async () => {
    const { id } = await start();
    const seen = await events(id);
    expect(seen.at(-1)?.data.state).toBe('done');
    const run = await finished(id);
    expect(seen.flatMap(({ data }) => data.blocks)).toEqual(run.blocksDone);
    const expected = directMatrix(network, 3);
    expect(await storedMatrix(workshop.db, subject.scope, id, 30)).toEqual(expected);
    for (const block of run.blocksDone) {
      const answer = await get(`/${id}/blocks/${block}`);
      const decoded = decodeMatrixBlock(await answer.arrayBuffer());
      const first = decoded.rows[0] ?? 0;
      expect(decoded.nodeCount).toBe(30);
      expect(decoded.distances[0]).toBe(expected.get(first)?.distances[0]);
      const etag = answer.headers.get('etag') ?? '';
      expect((await get(`/${id}/blocks/${block}`, { 'if-none-match': etag })).status).toBe(304);
    }
    const bars = recordedBarcode.parse(await (await get(`/${id}/barcode`)).json());
    expect(bars.bars).toHaveLength(4);
    const pair = pairDetail.parse(await (await get(`/${id}/pairs/7/2`)).json());
    expect([pair.a, pair.b].sort((a, b) => a - b)).toEqual([2, 7]);
    expect((await get(`/${id}/pairs/2/2`)).status).toBe(404);
    expect((await get(`/${id}/blocks/9999`)).status).toBe(404);
  });

  test('a stream that is taken up again misses no block, and takes garbage for a first visit', async () => {
    const { id } = await start();
    const first = await events(id, {}, (seen) => (seen.at(-1)?.id ?? 0) > 0);
    const last = first.at(-1)?.id ?? 0;
    const rest = await events(id, { 'last-event-id': String(last) });
    const { blocksDone } = await finished(id);
    expect([...first, ...rest].flatMap(({ data }) => data.blocks)).toEqual(blocksDone);
    for (const garbage of ['', '-1', '1e3', '99999999', '🎣', '0x10']) {
      const header = encodeURIComponent(garbage);
      const again = await events(id, { 'last-event-id': header });
      expect(again.flatMap(({ data }) => data.blocks)).toEqual(blocksDone);
    }
  });

  test('pairs.csv lists every pair in arrival order with raw entries; barcodes.csv every bar', async () => {
    const { id } = await start();
    await finished(id);
    const answer = await get(`/${id}/pairs.csv`);
    expect(answer.headers.get('content-disposition')).toMatch(/^attachment; filename=".+\.csv"$/);
    const [header, ...lines] = (await answer.text()).trimEnd().split('\n');
    expect(header).toBe('node_a,node_b,entry_a,entry_b,bound,d0,d1,d2,d3,g0,g1,g2,g3,similarity');
    expect(lines).toHaveLength(435);
    const order = Array.from(network.values.keys()).sort(
      (a, b) => (network.values[a] ?? 0) - (network.values[b] ?? 0),
    );
    const expected = directMatrix(network, 3);
    let line = 0;
    for (let p = 0; p < 30; p++) {
      for (let q = p + 1; q < 30; q++) {
        const cells = (lines[line++] ?? '').split(',');
        const d = [0, 1, 2, 3].map((k) => expected.get(p)?.distances[k * (29 - p) + q - p - 1]);
        expect(cells.slice(0, 5)).toEqual([
          `n${order[p]}`,
          `n${order[q]}`,
          `${p}`,
          `${q}`,
          `${q - p}`,
        ]);
        expect(cells.slice(5, 9).map(Number)).toEqual(d);
        expect(Number(cells[13])).toBe(1 - Math.max(d[1] ?? 0, d[2] ?? 0, d[3] ?? 0) / (q - p));
      }
    }
    const bars = await (await get(`/${id}/barcodes.csv`)).text();
    expect(bars.split('\n')[0]).toBe('dimension,birth,death');
    expect(bars).toMatch(/^0,0,$/m);
  });

  test('what is not computed is left blank, and a matrix that is not done is refused', async () => {
    const answer = await post('', {
      revisionId: subject.revisionId,
      dimensions: [1],
      scale: 'rank',
    });
    const { id } = startedRun.parse(await answer.json());
    await finished(id);
    const line = (await (await get(`/${id}/pairs.csv`)).text()).split('\n')[1]?.split(',') ?? [];
    expect([line[7], line[8], line[11], line[12]]).toEqual(['', '', '', '']);
    const slow = await workshop.bring(networkTaking(6));
    const other = await server.join(slow.scope.workspaceId, 'owner');
    const base = `${server.origin}/api/workspaces/${slow.scope.workspaceId}/runs`;
    const runId = await workshop.submit(slow);
    const early = await fetch(`${base}/${runId}/pairs.csv`, { headers: { cookie: other.cookie } });
    expect([early.status, await early.json()]).toMatchObject([409, { code: 'runs.not_done' }]);
    await stopRun(workshop.db, slow.scope, runId);
  });

  test('fifty equal submissions at once under one key get one run and fifty equal answers', async () => {
    const key = { 'idempotency-key': randomUUID() };
    const { revisionId } = await workshop.bring(network, subject.scope);
    const answers = await Promise.all(
      Array.from({ length: 50 }, () => post('', { revisionId }, key)),
    );
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([201]));
    const bodies = await Promise.all(
      answers.map(async (answer) => startedRun.parse(await answer.json())),
    );
    expect(new Set(bodies.map(({ id, number }) => `${id} ${number}`)).size).toBe(1);
    const other = await post('', { revisionId, dimensions: [0] }, key);
    expect([other.status, await other.json()]).toMatchObject([409, { code: 'runs.key_reused' }]);
  });

  test('a stopped run is stopped within a second, and its stream ends', async () => {
    const slow = await workshop.bring(networkTaking(6));
    const { cookie: theirs } = await server.join(slow.scope.workspaceId, 'analyst');
    const base = `${server.origin}/api/workspaces/${slow.scope.workspaceId}/runs`;
    const runId = await workshop.submit(slow);
    const stream = fetch(`${base}/${runId}/events`, { headers: { cookie: theirs } });
    await workshop.reached(slow.scope, runId, ({ state }) => state === 'running');
    const from = performance.now();
    const stop = await fetch(`${base}/${runId}/stop`, {
      method: 'POST',
      headers: { cookie: theirs, origin: server.origin },
    });
    expect(runSchema.parse(await stop.json()).state).toBe('stopped');
    expect(performance.now() - from).toBeLessThan(1_000);
    expect(await (await stream).text()).toContain('"state":"stopped"');
    expect((await get(`/${runId}`)).status).toBe(404);
  });

  test('recorders and reviewers read but neither start nor stop; strangers find nothing', async () => {
    const { id } = await start();
    for (const role of ['recorder', 'reviewer'] as const) {
      const theirs = { cookie: (await server.join(subject.scope.workspaceId, role)).cookie };
      const answer = await post('', { revisionId: subject.revisionId }, theirs);
      expect([answer.status, await answer.json()]).toMatchObject([
        403,
        { code: 'access.wrong_role' },
      ]);
      expect((await post(`/${id}/stop`, undefined, theirs)).status).toBe(403);
      expect((await get(`/${id}`, theirs)).status).toBe(200);
    }
    const elsewhere = await workshop.bring(constantProbability(5, 0.5, 1));
    const stranger = await server.join(elsewhere.scope.workspaceId, 'owner');
    const own = `${server.origin}/api/workspaces/${elsewhere.scope.workspaceId}`;
    const paths = Object.entries(ROUTES)
      .filter(
        ([name, { path }]) =>
          path.includes('/runs/:runId') && /^(run|stopRun|extendRun|focusRun)/.test(name),
      )
      .map(([, { path, method }]) => ({ path, method }));
    expect(paths.length).toBeGreaterThanOrEqual(10);
    for (const { path, method } of paths) {
      const below = path.slice(path.indexOf('/runs'));
      const filled = below
        .replace(':runId', id)
        .replace(':block', '0')
        .replace(':a', '0')
        .replace(':b', '1');
      const answer = await fetch(`${own}${filled}`, {
        method,
        headers: {
          cookie: stranger.cookie,
          origin: server.origin,
          ...(method === 'put' && { 'content-type': 'application/json' }),
        },
        ...(method === 'put' && { body: JSON.stringify({ kind: 'node', row: 0 }) }),
      });
      expect([path, answer.status]).toEqual([path, 404]);
    }
    const foreign = await post('', { revisionId: elsewhere.revisionId });
    expect([foreign.status, await foreign.json()]).toMatchObject([
      404,
      { code: 'revisions.not_found' },
    ]);
  });

  test('an open stream closes within five seconds of its reader’s removal', async () => {
    const slow = await workshop.bring(networkTaking(6));
    const theirs = await server.join(slow.scope.workspaceId, 'reviewer');
    const base = `${server.origin}/api/workspaces/${slow.scope.workspaceId}/runs`;
    await workshop.endWorkers();
    const runId = await workshop.submit(slow);
    const stream = await fetch(`${base}/${runId}/events`, { headers: { cookie: theirs.cookie } });
    await workshop.database.pool.query('delete from memberships where user_id = $1', [
      theirs.userId,
    ]);
    const from = performance.now();
    await stream.text();
    expect(performance.now() - from).toBeLessThan(5_000);
  });
});
