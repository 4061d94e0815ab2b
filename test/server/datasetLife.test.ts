import { eq, sql } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { purgeExpiredDatasets } from '../../db/repositories/datasetLife';
import { askPair, claimPair } from '../../db/repositories/pairDetails';
import { beginNextAttempt, heartbeat } from '../../db/repositories/runDispatch';
import { claimRun, failRun, storeBlock, storePlan } from '../../db/repositories/runWork';
import { datasets, groups, runBlocks, runs } from '../../db/schema/index';
import { dataset, datasetList, deletedDatasetList } from '../../server/contract/datasets';
import { startApp, type TestApp } from '../support/app';
import type { Client } from '../support/client';
import {
  makeDataset,
  makeDoneRun,
  makeGroup,
  makeMember,
  makeQueuedRun,
  makeWorkspace,
  type MadeWorkspace,
} from '../support/factories';

let app: TestApp;
let workspace: MadeWorkspace;
let owner: Client;
let path: string;
/** A dataset with a done run that has a group. */
let made: { id: string; revisionId: string; runId: string; groupId: string };
beforeAll(async () => {
  app = await startApp();
});
afterAll(() => app.close());
beforeEach(async () => {
  workspace = await makeWorkspace(app.db);
  owner = await app.clientOf(workspace.owner.id);
  path = `/api/workspaces/${workspace.id}`;
  const { id, revisionId } = await makeDataset(app.db, workspace.scope);
  const runId = await makeDoneRun(app.db, workspace.scope, revisionId);
  made = { id, revisionId, runId, groupId: await makeGroup(app.db, workspace.scope, runId) };
});

const one = () => `${path}/datasets/${made.id}`;
const act = (verb: 'archive' | 'restore', client = owner) =>
  client.ask(`${one()}/${verb}`, { method: 'POST' });
const remove = (client = owner) => client.ask(one(), { method: 'DELETE' });
const listed = async (query = '') =>
  (await owner.get(`${path}/datasets${query}`)).read(datasetList).datasets.map(({ id }) => id);
const deleted = async () =>
  (await owner.get(`${path}/deleted-datasets`)).read(deletedDatasetList).datasets;
const backdate = (interval: string) =>
  app.db
    .update(datasets)
    .set({ deletedAt: sql`now() - ${interval}::interval` })
    .where(eq(datasets.id, made.id));

describe('an archived dataset', () => {
  test('leaves the list, is readable by its address, and comes back to the list', async () => {
    expect((await act('archive')).read(dataset).archivedAt).not.toBeNull();
    expect(await listed()).toEqual([]);
    expect(await listed('?archived=shown')).toEqual([made.id]);
    expect((await owner.get(one())).status).toBe(200);
    expect((await owner.get(`${path}/runs/${made.runId}`)).status).toBe(200);
    expect((await act('restore')).read(dataset).archivedAt).toBeNull();
    expect(await listed()).toEqual([made.id]);
  });

  test('keeps the moment at which it was archived first', async () => {
    const first = (await act('archive')).read(dataset).archivedAt;
    expect((await act('archive')).read(dataset).archivedAt).toBe(first);
  });
});

describe('a deleted dataset', () => {
  const addresses = () => [
    one(),
    `${path}/revisions/${made.revisionId}`,
    `${path}/runs/${made.runId}`,
    `${path}/runs/${made.runId}/blocks/0`,
    `${path}/runs/${made.runId}/barcode`,
    `${path}/runs/${made.runId}/pairs/0/1`,
    `${path}/runs/${made.runId}/pairs.csv`,
    `${path}/runs/${made.runId}/barcodes.csv`,
    `${path}/runs/${made.runId}/groups`,
  ];

  test('is not found at any address, and takes no new run, group, revision or deletion', async () => {
    for (const address of addresses()) {
      expect((await owner.get(address)).status, address).not.toBe(404);
    }
    expect((await remove()).status).toBe(204);
    for (const address of addresses()) {
      expect((await owner.get(address)).status, address).toBe(404);
    }
    expect((await owner.get(`${path}/runs/${made.runId}/events`)).status).toBe(404);
    expect(await listed('?archived=shown')).toEqual([]);
    const { revisionId, runId, groupId } = made;
    expect((await owner.post(`${path}/runs`, { revisionId })).status).toBe(404);
    const wanted = { name: 'Pair', nodeIds: ['a', 'b'], origin: 'hand' };
    expect((await owner.post(`${path}/runs/${runId}/groups`, wanted)).status).toBe(404);
    const group = `${path}/groups/${groupId}`;
    expect((await owner.ask(group, { method: 'DELETE' })).status).toBe(404);
    expect((await act('archive')).status).toBe(404);
    expect((await remove()).status).toBe(404);
  });

  test('is told to the owner with the day until which it can be restored, and comes back whole', async () => {
    const before = (await owner.get(one())).read(dataset);
    await remove();
    const [entry] = await deleted();
    expect(entry).toMatchObject({ id: made.id, name: before.name });
    const days =
      (Date.parse(entry?.restorableUntil ?? '') - Date.parse(entry?.deletedAt ?? '')) / 864e5;
    expect(days).toBeCloseTo(30, 0);
    expect((await act('restore')).read(dataset)).toEqual(before);
    expect(await deleted()).toEqual([]);
    expect((await owner.get(`${path}/runs/${made.runId}/groups`)).status).toBe(200);
  });

  test('comes back archived if it was archived', async () => {
    await act('archive');
    await remove();
    expect((await act('restore')).read(dataset).archivedAt).not.toBeNull();
  });

  test('cannot be restored after 30 days', async () => {
    await remove();
    await backdate('30 days 1 second');
    expect(await deleted()).toEqual([]);
    expect((await act('restore')).status).toBe(404);
  });
});

describe('the unfinished runs of a dataset that is deleted', () => {
  const mail = {
    afterSeconds: 0,
    compose: () => {
      throw new Error('Nobody is told.');
    },
  };

  test('are stopped, and what a worker has in hand is not stored', async () => {
    const { db } = app;
    const working = await makeQueuedRun(db, workspace.scope, made.revisionId);
    const waiting = await makeQueuedRun(db, workspace.scope, made.revisionId);
    const fence = { runId: working, attempt: 1 };
    expect(await claimRun(db, fence)).not.toBeNull();
    await askPair(db, workspace.scope, made.runId, { p: 1, q: 2 });
    await remove();
    const rowsOf = () => db.select().from(runs).where(eq(runs.revisionId, made.revisionId));
    const after = await rowsOf();
    const stateOf = new Map(after.map(({ id, state }) => [id, state]));
    expect([working, waiting, made.runId].map((id) => stateOf.get(id))).toEqual([
      'stopped',
      'stopped',
      'done',
    ]);
    const plan = { engineVersion: '1', estimate: {}, barcode: new Uint8Array(), blocks: [] };
    expect(await storePlan(db, fence, plan, mail)).toBe(false);
    const block = { block: 0, result: new Uint8Array(1), storedBy: 'w', seconds: 1 };
    expect(await storeBlock(db, fence, block, mail)).toBe('stale');
    expect(await failRun(db, fence, { code: 'x', message: 'x' }, mail)).toBe(false);
    expect(await heartbeat(db, [fence])).toEqual([]);
    expect(await beginNextAttempt(db, fence)).toBe(false);
    expect(await claimRun(db, { runId: waiting, attempt: 1 })).toBeNull();
    expect(await claimPair(db, made.runId, { p: 1, q: 2 })).toBeNull();
    expect(await rowsOf()).toEqual(after);
  });

  test('keep what was stored of them, and take no block that was computed before the deletion', async () => {
    const { db } = app;
    const other = await makeDataset(db, workspace.scope, 'Other');
    const fenceOf = async (revisionId: string) => {
      const fence = { runId: await makeQueuedRun(db, workspace.scope, revisionId), attempt: 1 };
      expect(await claimRun(db, fence)).not.toBeNull();
      const planned = { rows: new Uint8Array(8), partners: null, pairs: 1, cost: 1 };
      const blocks = [planned, planned, planned];
      const plan = { engineVersion: '1', estimate: {}, barcode: new Uint8Array(), blocks };
      expect(await storePlan(db, fence, plan, mail)).toBe(true);
      return fence;
    };
    const store = (fence: { runId: string; attempt: number }, block: number) => {
      const result = Uint8Array.of(7, block);
      return storeBlock(db, fence, { block, result, storedBy: 'w', seconds: 1 }, mail);
    };
    const filled = async ({ runId }: { runId: string }) =>
      (await db.select().from(runBlocks).where(eq(runBlocks.runId, runId)))
        .filter(({ result }) => result !== null)
        .map(({ block }) => block)
        .sort();
    const [going, staying] = [await fenceOf(made.revisionId), await fenceOf(other.revisionId)];
    expect([await store(going, 0), await store(staying, 0)]).toEqual(['stored', 'stored']);
    await remove();
    expect([await store(going, 1), await store(staying, 1)]).toEqual(['stale', 'stored']);
    expect([await filled(going), await filled(staying)]).toEqual([[0], [0, 1]]);
    // Nor does restoring let the late one in.
    expect((await act('restore')).status).toBe(200);
    expect(await store(going, 2)).toBe('stale');
    expect(await filled(going)).toEqual([0]);
  });

  test('those of another dataset go on', async () => {
    const other = await makeDataset(app.db, workspace.scope, 'Other');
    const run = await makeQueuedRun(app.db, workspace.scope, other.revisionId);
    await remove();
    const [row] = await app.db.select().from(runs).where(eq(runs.id, run));
    expect(row?.state).toBe('queued');
  });
});

/** Rows of the dataset that are left: itself, runs, blocks, groups. */
const left = () =>
  Promise.all([
    app.db.$count(datasets, eq(datasets.id, made.id)),
    app.db.$count(runs, eq(runs.id, made.runId)),
    app.db.$count(runBlocks, eq(runBlocks.runId, made.runId)),
    app.db.$count(groups, eq(groups.runId, made.runId)),
  ]);

describe('purging', () => {
  test('after 30 days removes the dataset with all that belongs to it, and not a moment before', async () => {
    await purgeExpiredDatasets(app.db);
    expect(await left()).toEqual([1, 1, 1, 1]);
    await remove();
    await backdate('29 days 23 hours 59 minutes');
    await purgeExpiredDatasets(app.db);
    expect(await left()).toEqual([1, 1, 1, 1]);
    await backdate('30 days 1 second');
    expect(await purgeExpiredDatasets(app.db)).toBe(1);
    expect(await left()).toEqual([0, 0, 0, 0]);
  });

  test.each(['kept', 'deleted'])('of a %s dataset at once needs its name', async (kind) => {
    if (kind === 'deleted') await remove();
    const wrong = await owner.post(`${one()}/purge`, { name: 'path of three' });
    expect(wrong.status).toBe(422);
    expect(wrong.problem.issues?.[0]?.field).toBe('name');
    expect(await left()).toEqual([1, 1, 1, 1]);
    expect((await owner.post(`${one()}/purge`, { name: 'Path of three' })).status).toBe(204);
    expect(await left()).toEqual([0, 0, 0, 0]);
  });
});

describe('who may', () => {
  test.each([
    ['owner', 200, 204, 204],
    ['analyst', 200, 204, 403],
    ['recorder', 403, 403, 403],
    ['reviewer', 403, 403, 403],
  ] as const)('%s: archive %i, delete %i, purge %i', async (role, archive, drop, purge) => {
    const client = await app.clientOf((await makeMember(app.db, workspace.scope, role)).id);
    expect((await act('archive', client)).status).toBe(archive);
    expect((await act('restore', client)).status).toBe(archive);
    expect((await client.get(`${path}/deleted-datasets`)).status).toBe(archive);
    expect((await remove(client)).status).toBe(drop);
    expect((await client.post(`${one()}/purge`, { name: 'Path of three' })).status).toBe(purge);
  });

  test('nobody of another workspace, to whom it does not exist', async () => {
    const other = await makeWorkspace(app.db, 'Elsewhere');
    const client = await app.clientOf(other.owner.id);
    expect((await act('archive', client)).status).toBe(404);
    expect((await remove(client)).status).toBe(404);
    const there = `/api/workspaces/${other.id}/datasets/${made.id}`;
    expect((await client.ask(there, { method: 'DELETE' })).status).toBe(404);
    expect((await client.post(`${there}/purge`, { name: 'Path of three' })).status).toBe(404);
    expect(await left()).toEqual([1, 1, 1, 1]);
  });
});
