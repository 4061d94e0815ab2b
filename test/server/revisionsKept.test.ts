import { afterAll, beforeAll, expect, test } from 'vitest';
import { dataset, revision } from '../../server/contract/datasets';
import { group, groupList } from '../../server/contract/groups';
import { madeRevision, revisionDifference } from '../../server/contract/revisions';
import { run } from '../../server/contract/runs';
import { startApp, type TestApp } from '../support/app';
import type { Client } from '../support/client';
import {
  makeDataset,
  makeDoneRun,
  makeWorkspace,
  networkForm,
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

const bring = () => makeDataset(app.db, made.scope, 'Invented', WEIGHTED_PATH);
const numbersOf = async (id: string) =>
  (await owner.get(`${path}/datasets/${id}`)).read(dataset).revisions.map(({ number }) => number);
const threshold = (revisionId: string, least: number) =>
  owner.post(`${path}/revisions/${revisionId}/threshold`, { least });
const correct = (revisionId: string, corrections: object[]) =>
  owner.post(`${path}/revisions/${revisionId}/corrections`, { corrections });
const differenceOf = async (revisionId: string) =>
  (await owner.get(`${path}/revisions/${revisionId}/difference`)).read(revisionDifference)
    .difference;

test('a new file makes a revision that tells nodes, edges and entries changed; runs and groups of the first stay with it', async () => {
  const { id, revisionId } = await bring();
  const runId = await makeDoneRun(app.db, made.scope, revisionId);
  const wanted = { name: 'Pair', nodeIds: ['a', 'b'], origin: 'hand' };
  const saved = (await owner.post(`${path}/runs/${runId}/groups`, wanted)).read(group);
  const before = (await owner.get(`${path}/runs/${runId}`)).read(run);
  const form = networkForm({
    name: null,
    nodes: 'id,label,entry\na,Alder,1\nb,Node b,2.5\nd,Node d,4\n',
    edges: 'source,target\na,b\nb,d\n',
  });
  const answer = await owner.ask(`${path}/datasets/${id}/revisions`, { form });
  expect(answer.status, answer.text).toBe(201);
  const { revisions, runs } = answer.read(dataset);
  const second = revisions.find(({ number }) => number === 2);
  expect(await differenceOf(second?.id ?? '')).toMatchObject({
    nodesAdded: [{ id: 'd', label: 'Node d' }],
    nodesRemoved: [{ id: 'c', label: 'Node c' }],
    relabelled: [{ id: 'a', before: 'Node a', after: 'Alder' }],
    entriesChanged: [{ id: 'b', before: '2', after: '2.5' }],
    edgesAdded: [{ a: 'b', b: 'd' }],
    edgesRemoved: [{ a: 'b', b: 'c' }],
  });
  expect(runs).toMatchObject([{ id: runId, revisionNumber: 1 }]);
  expect((await owner.get(`${path}/runs/${runId}`)).read(run)).toEqual(before);
  expect((await owner.get(`${path}/runs/${runId}/groups`)).read(groupList).groups).toEqual([saved]);
});

test('a threshold above every weight leaves the nodes without an edge, and says so', async () => {
  const { revisionId } = await bring();
  const next = (await threshold(revisionId, 0.751)).read(madeRevision);
  const bare = (await owner.get(`${path}/revisions/${next.revisionId}`)).read(revision);
  expect([bare.nodes.length, bare.edges]).toEqual([3, []]);
  expect(bare.report).toMatchObject({
    isolatedNodes: 3,
    components: 3,
    origin: { kind: 'threshold', from: 1, least: 0.751, below: 2, withoutWeight: 0 },
  });
  expect((await differenceOf(next.revisionId))?.counts).toMatchObject({
    edgesRemoved: 2,
    edgesAdded: 0,
    nodesRemoved: 0,
  });
});

test.each([
  ['entry', { entry: 'in spring' }],
  ['earliest', { entry: '2', earliest: '3' }],
  ['latest', { entry: '2', latest: 'later' }],
])(
  'a correction with a wrong %s is refused naming the node and the field',
  async (field, texts) => {
    const { id, revisionId } = await bring();
    const { status, problem } = await correct(revisionId, [
      { row: 0, entry: '0.5' },
      { row: 1, ...texts },
    ]);
    expect(status).toBe(422);
    expect(problem.issues?.map((issue) => issue.field)).toEqual([`corrections.1.${field}`]);
    expect(problem.issues?.[0]?.message).toMatch(new RegExp(`^Node “b”, ${field}: .*“\\S`));
    expect(await numbersOf(id)).toEqual([1]);
  },
);

test('a change that changes nothing is refused, and makes no revision', async () => {
  const { id, revisionId } = await bring();
  for (const same of [
    await threshold(revisionId, 0.25),
    await correct(revisionId, [{ row: 0, entry: '1', note: 'Looked up again.' }]),
  ]) {
    expect([same.status, same.problem.code]).toEqual([409, 'revisions.same_content']);
  }
  expect(await numbersOf(id)).toEqual([1]);
});
