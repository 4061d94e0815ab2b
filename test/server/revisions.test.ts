import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { dataset, revision } from '../../server/contract/datasets';
import { group, groupList } from '../../server/contract/groups';
import { importWeights } from '../../server/contract/imports';
import { madeRevision, revisionDifference } from '../../server/contract/revisions';
import { run } from '../../server/contract/runs';
import type { ReadNetwork } from '../../server/datasets/readNetwork';
import { startApp, type TestApp } from '../support/app';
import type { Answer, Client } from '../support/client';
import {
  makeDataset,
  makeDoneRun,
  makeMember,
  makeWorkspace,
  PATH_OF_THREE,
  WEIGHTED_PATH,
  type MadeWorkspace,
} from '../support/factories';

let app: TestApp;
let made: MadeWorkspace;
let owner: Client;
let path: string;
beforeAll(async () => {
  app = await startApp();
  made = await makeWorkspace(app.db);
  owner = await app.clientOf(made.owner.id);
  path = `/api/workspaces/${made.id}`;
});
afterAll(() => app.close());

const bring = (network?: ReadNetwork) => makeDataset(app.db, made.scope, 'Invented', network);
const at = (revisionId: string) => `${path}/revisions/${revisionId}`;
const look = async (revisionId: string) => (await owner.get(at(revisionId))).read(revision);
const differenceOf = async (revisionId: string) =>
  (await owner.get(`${at(revisionId)}/difference`)).read(revisionDifference);

function madeBy(answer: Answer) {
  expect(answer.status, answer.text).toBe(201);
  return answer.read(madeRevision);
}

const threshold = (revisionId: string, least: unknown, by = owner) =>
  by.post(`${at(revisionId)}/threshold`, { least });
const correct = (revisionId: string, corrections: unknown, by = owner) =>
  by.post(`${at(revisionId)}/corrections`, { corrections });

/** The path with entries in another unit and, where given, windows. */
const timed = (
  entryUnit: ReadNetwork['entryUnit'],
  times: readonly (readonly [string, number])[],
): ReadNetwork => ({
  ...PATH_OF_THREE,
  entryUnit,
  nodes: PATH_OF_THREE.nodes.map((node, row) => {
    const [entryRaw = '', entry = 0] = times[row] ?? [];
    return { ...node, entryRaw, entry };
  }),
});
const DAYS = timed('days', [
  ['1970-01-02', 1],
  ['1970-01-11', 10],
  ['1970-01-21', 20],
]);

describe('the difference to the revision before', () => {
  test('is none for the first', async () => {
    const { revisionId } = await bring();
    expect(await differenceOf(revisionId)).toEqual({ number: 1, previous: null, difference: null });
  });

  test('tells what a correction and a threshold changed, each to the one before it', async () => {
    const first = (await bring(WEIGHTED_PATH)).revisionId;
    const second = madeBy(await correct(first, [{ row: 2, entry: '2.50', earliest: '2' }]));
    const third = madeBy(await threshold(second.revisionId, 0.5));
    const corrected = await differenceOf(second.revisionId);
    expect(corrected.previous).toEqual({ id: first, number: 1 });
    expect(corrected.difference).toMatchObject({
      counts: { entriesChanged: 1, windowsChanged: 1, edgesRemoved: 0, nodesAdded: 0 },
      entriesChanged: [{ id: 'c', label: 'Node c', before: '3', after: '2.50' }],
      windowsChanged: [{ id: 'c', before: { earliest: null }, after: { earliest: '2' } }],
    });
    const lighter = await differenceOf(third.revisionId);
    expect(lighter.previous).toEqual({ id: second.revisionId, number: 2 });
    expect(lighter.difference).toMatchObject({
      counts: { entriesChanged: 0, edgesRemoved: 1, edgesAdded: 0 },
      edgesRemoved: [{ a: 'a', b: 'b' }],
    });
  });
});

describe('a weight threshold', () => {
  const some: ReadNetwork = {
    ...PATH_OF_THREE,
    edges: Uint32Array.of(0, 1, 0, 2, 1, 2),
    weights: Float64Array.of(0.25, NaN, 0.75),
  };

  test('keeps the edges of at least that weight; an edge without a weight is left out', async () => {
    const { id, revisionId } = await bring(some);
    const next = madeBy(await threshold(revisionId, 0.25));
    expect(next).toMatchObject({ datasetId: id, number: 2 });
    const kept = await look(next.revisionId);
    expect(kept.edges).toEqual([
      [0, 1],
      [1, 2],
    ]);
    expect(kept.report.origin).toEqual({
      kind: 'threshold',
      from: 1,
      least: 0.25,
      below: 0,
      withoutWeight: 1,
    });
    expect((await look(revisionId)).edges).toHaveLength(3);
  });

  test('can be raised again on the revision it made', async () => {
    const next = madeBy(await threshold((await bring(some)).revisionId, 0.25));
    const last = madeBy(await threshold(next.revisionId, 0.75));
    expect((await look(last.revisionId)).edges).toEqual([[1, 2]]);
  });

  test('has a count of edges for every weight', async () => {
    const { revisionId } = await bring(some);
    expect((await owner.get(`${at(revisionId)}/weights`)).read(importWeights).weights).toEqual({
      nodes: 3,
      edges: 3,
      withoutWeight: 1,
      steps: [
        { least: 0.25, edges: 2 },
        { least: 0.75, edges: 1 },
      ],
      complete: true,
    });
  });

  test('is refused where the edges have no weights', async () => {
    const { revisionId } = await bring();
    const { status, problem } = await threshold(revisionId, 1);
    expect([status, problem.code]).toEqual([409, 'revisions.no_weights']);
    expect((await owner.get(`${at(revisionId)}/weights`)).read(importWeights).weights).toBeNull();
  });

  test('that leaves nothing out is refused, also for a revision that is not the latest', async () => {
    const { id, revisionId } = await bring(WEIGHTED_PATH);
    madeBy(await threshold(revisionId, 0.5));
    for (const least of [0, 0.25]) {
      const { status, problem } = await threshold(revisionId, least);
      expect([status, problem.code]).toEqual([409, 'revisions.same_content']);
    }
    const again = await threshold(revisionId, 0.5);
    expect(again.problem.code).toBe('revisions.same_content');
    const { revisions } = (await owner.get(`${path}/datasets/${id}`)).read(dataset);
    expect(revisions.map(({ number }) => number)).toEqual([2, 1]);
  });

  test.each([['words'], [null], [undefined]])('is a number, not %s', async (least) => {
    const { status, problem } = await threshold((await bring(WEIGHTED_PATH)).revisionId, least);
    expect([status, problem.issues?.[0]?.field]).toEqual([422, 'least']);
  });
});

describe('a correction of an entry', () => {
  test('keeps the text as it is typed, the weights, and the old revision', async () => {
    const { revisionId } = await bring(WEIGHTED_PATH);
    const before = await look(revisionId);
    const next = madeBy(
      await correct(revisionId, [
        { row: 0, entry: ' 1.50 ', earliest: '1', latest: '2e0', note: 'Read wrongly.' },
      ]),
    );
    const after = await look(next.revisionId);
    expect(after.nodes[0]).toMatchObject({
      entryRaw: '1.50',
      entry: 1.5,
      earliestRaw: '1',
      earliest: 1,
      latestRaw: '2e0',
      latest: 2,
    });
    expect(after.nodes.slice(1)).toEqual(before.nodes.slice(1));
    expect(after.report.origin).toEqual({
      kind: 'corrections',
      from: 1,
      corrections: [{ id: 'a', before: '1', after: '1.50', note: 'Read wrongly.' }],
    });
    expect(await look(revisionId)).toEqual(before);
    const weights = await owner.get(`${at(next.revisionId)}/weights`);
    expect(weights.read(importWeights).weights?.steps).toHaveLength(2);
  });

  test('keeps an end that is left out and opens one that is empty', async () => {
    const first = (await bring()).revisionId;
    const windowed = madeBy(
      await correct(first, [{ row: 1, entry: '2', earliest: '1', latest: '3' }]),
    );
    const next = madeBy(await correct(windowed.revisionId, [{ row: 1, entry: '2.5', latest: '' }]));
    expect((await look(next.revisionId)).nodes[1]).toMatchObject({
      ...{ entry: 2.5, earliestRaw: '1', earliest: 1, latestRaw: '', latest: null },
    });
  });

  test('by a month is its middle, with the month as window', async () => {
    const next = madeBy(
      await correct((await bring(DAYS)).revisionId, [{ row: 0, entry: '1970-02' }]),
    );
    expect((await look(next.revisionId)).nodes[0]).toMatchObject({
      ...{ entryRaw: '1970-02', entry: 44, earliest: 31, latest: 58 },
    });
  });

  test.each([
    ['a number among dates', { entry: '7' }, 'entry', /is a number, but .* a date/],
    ['no day of the calendar', { entry: '1970-02-30' }, 'entry', /no day/],
    ['a day that can be two', { entry: '01/02/1970' }, 'entry', /two different days/],
    ['no entry', { entry: '  ' }, 'entry', /when the node arrived/],
    ['an earliest after it', { entry: '1970-01-02', earliest: '1970-01-03' }, 'earliest', /after/],
    ['a latest before it', { entry: '1970-01-02', latest: '1970-01-01' }, 'latest', /before/],
    ['a latest of another unit', { entry: '1970-01-02', latest: '9' }, 'latest', /a number/],
    ['a row that is not there', { entry: '1970-01-02', row: 3 }, 'row', /no row 3/],
  ])('by %s is refused under its field', async (_kind, wrong, field, words) => {
    const { revisionId } = await bring(DAYS);
    const good = { row: 1, entry: '1970-01-05' };
    const { status, problem } = await correct(revisionId, [good, { row: 0, ...wrong }]);
    expect(status).toBe(422);
    expect(problem.issues).toHaveLength(1);
    expect(problem.issues?.[0]?.field).toBe(`corrections.1.${field}`);
    expect(problem.issues?.[0]?.message).toMatch(words);
  });

  test('of a time of day has a zone where the others have one; a date is its midnight', async () => {
    const { revisionId } = await bring(
      timed('seconds', [
        ['1970-01-01T00:00Z', 0],
        ['1970-01-01T01:00Z', 3600],
        ['1970-01-01T02:00Z', 7200],
      ]),
    );
    const { problem } = await correct(revisionId, [{ row: 0, entry: '1970-01-01T03:00' }]);
    expect(problem.issues?.[0]).toMatchObject({ field: 'corrections.0.entry' });
    expect(problem.issues?.[0]?.message).toMatch(/no time zone/);
    const next = madeBy(await correct(revisionId, [{ row: 0, entry: '1970-01-02' }]));
    expect((await look(next.revisionId)).nodes[0]?.entry).toBe(86_400);
  });

  test('of one node twice, or of none, is refused', async () => {
    const { revisionId } = await bring();
    const one = { row: 0, entry: '1.5' };
    const twice = await correct(revisionId, [one, one]);
    expect(twice.problem.issues?.[0]?.field).toBe('corrections.1.row');
    expect((await correct(revisionId, [])).problem.issues?.[0]?.field).toBe('corrections');
  });

  test('that changes nothing is refused', async () => {
    const { status, problem } = await correct((await bring()).revisionId, [{ row: 0, entry: '1' }]);
    expect([status, problem.code]).toEqual([409, 'revisions.same_content']);
  });
});

describe('runs and groups of a revision', () => {
  test('stay with it when another is made from it', async () => {
    const { id, revisionId } = await bring(WEIGHTED_PATH);
    const runId = await makeDoneRun(app.db, made.scope, revisionId);
    const groups = `${path}/runs/${runId}/groups`;
    const wanted = { name: 'Pair', nodeIds: ['a', 'b'], origin: 'hand' };
    const saved = (await owner.post(groups, wanted)).read(group);
    const before = (await owner.get(`${path}/runs/${runId}`)).read(run);
    madeBy(await threshold(revisionId, 0.5));
    madeBy(await correct(revisionId, [{ row: 0, entry: '0.5' }]));
    expect((await owner.get(`${path}/runs/${runId}`)).read(run)).toEqual(before);
    expect(before.revisionId).toBe(revisionId);
    expect((await owner.get(groups)).read(groupList).groups).toEqual([saved]);
    const { runs } = (await owner.get(`${path}/datasets/${id}`)).read(dataset);
    expect(runs).toMatchObject([{ id: runId, revisionNumber: 1 }]);
  });
});

describe('who may make a revision from another', () => {
  test.each([
    ['analyst', 201, 201],
    ['recorder', 403, 201],
    ['reviewer', 403, 403],
  ] as const)('%s: threshold %i, correction %i', async (role, byThreshold, byCorrection) => {
    const { revisionId } = await bring(WEIGHTED_PATH);
    const client = await app.clientOf((await makeMember(app.db, made.scope, role)).id);
    expect((await threshold(revisionId, 0.5, client)).status).toBe(byThreshold);
    const corrections = [{ row: 0, entry: '0.5' }];
    expect((await correct(revisionId, corrections, client)).status).toBe(byCorrection);
    expect((await client.get(`${at(revisionId)}/difference`)).status).toBe(200);
  });

  test('nobody by the address of another workspace', async () => {
    const other = await makeWorkspace(app.db, 'Other');
    const { revisionId } = await makeDataset(app.db, other.scope, 'Theirs', WEIGHTED_PATH);
    const answers = await Promise.all([
      threshold(revisionId, 0.5),
      correct(revisionId, [{ row: 0, entry: '0.5' }]),
      owner.get(`${at(revisionId)}/difference`),
      owner.get(`${at(revisionId)}/weights`),
    ]);
    expect(answers.map(({ status }) => status)).toEqual([404, 404, 404, 404]);
  });
});
