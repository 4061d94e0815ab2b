import { randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { datasets, imports, revisions } from '../../db/schema/index';
import { dataset } from '../../server/contract/datasets';
import { savedImport } from '../../server/contract/imports';
import { EDGES_CSV, makeDataset, makeWorkspace, NODES_CSV } from '../support/factories';
import { Importing } from '../support/importing';

let by: Importing;
beforeAll(async () => {
  by = await Importing.open();
});
afterAll(() => by.up.app.close());
afterEach(() => by.up.nothingLeft());

const FILES = { 'nodes.csv': NODES_CSV, 'edges.csv': EDGES_CSV };

describe('saving', () => {
  test('one import many times at once makes one revision, and every answer names it', async () => {
    const draft = await by.begin(FILES);
    const before = await by.up.app.db.$count(datasets);
    const json = { version: draft.version, name: 'At once' };
    const answers = await Promise.all([1, 2, 3, 4].map(() => by.save(draft.id, json)));
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201, 201]);
    const ids = new Set(answers.map((answer) => answer.read(savedImport).revisionId));
    expect(ids.size).toBe(1);
    expect(await by.up.app.db.$count(datasets)).toBe(before + 1);
    const [id] = ids;
    expect(await by.up.app.db.$count(revisions, eq(revisions.id, id ?? ''))).toBe(1);
    expect((await by.save(draft.id, json)).read(savedImport).revisionId).toBe(id);
  });

  test('into a dataset makes its next revision', async () => {
    const first = await by.saved(await by.begin(FILES), { name: 'Grows' });
    const next = await by.begin(
      { 'nodes.csv': NODES_CSV, 'edges.csv': 'source,target\na,c\n' },
      { datasetId: first.datasetId },
    );
    expect(next).toMatchObject({ datasetId: first.datasetId, datasetName: 'Grows' });
    const saved = await by.saved(next, { datasetId: first.datasetId });
    expect(saved).toMatchObject({ datasetId: first.datasetId, number: 2 });
    const kept = (await by.client.get(`${by.up.path}/${first.datasetId}`)).read(dataset);
    expect(kept.revisions.map(({ number }) => number)).toEqual([2, 1]);
  });

  test('what the dataset holds already is refused, and the draft stays', async () => {
    const first = await by.saved(await by.begin(FILES), { name: 'Same' });
    const same = await by.begin(FILES, { datasetId: first.datasetId });
    const json = { version: same.version, datasetId: first.datasetId };
    const { status, problem } = await by.save(same.id, json);
    expect([status, problem.code]).toEqual([409, 'revisions.same_content']);
    expect((await by.look(same.id)).state).toBe('open');
  });

  test('gives the content that the upload of both files gives', async () => {
    const saved = await by.saved(await by.begin(FILES), { name: 'Guided' });
    const uploaded = (await by.up.send({})).read(dataset);
    const guided = (await by.client.get(`${by.up.path}/${saved.datasetId}`)).read(dataset);
    expect(guided.revisions[0]?.contentHash).toBe(uploaded.revisions[0]?.contentHash);
  });

  test('another version than the one that was looked at is refused', async () => {
    const draft = await by.begin(FILES);
    await by.change(draft.id, { choices: { ...draft.choices, tolerance: 0.5 } });
    const { status, problem } = await by.save(draft.id, { version: 1, name: 'Stale' });
    expect([status, problem.code]).toEqual([409, 'imports.changed']);
  });

  test('is refused while there is no network', async () => {
    const draft = await by.begin({ 'nodes.csv': 'id,entry\na,1\na,2\n' });
    const { status, problem } = await by.save(draft.id, { version: 1, name: 'Twice' });
    expect([status, problem.code]).toEqual([422, 'imports.not_ready']);
  });

  test.each([
    ['nothing to save it as', { version: 1 }],
    ['both a name and a dataset', { version: 1, name: 'x', datasetId: randomUUID() }],
    ['a workspace', { version: 1, name: 'x', workspaceId: randomUUID() }],
    ['no version', { name: 'x' }],
  ])('with %s is refused', async (_what, json) => {
    const { id } = await by.begin(FILES);
    expect((await by.save(id, json)).status).toBe(422);
  });

  test('ends the draft: it is neither changed nor removed then', async () => {
    const draft = await by.begin(FILES);
    await by.saved(draft, { name: 'Ended' });
    const changed = await by.ask(draft.id, { name: 'Other' });
    const removed = await by.client.ask(`${by.path}/${draft.id}`, { method: 'DELETE' });
    for (const { status, problem } of [changed, removed]) {
      expect([status, problem.code]).toEqual([409, 'imports.saved']);
    }
  });
});

describe('a dataset of another workspace', () => {
  test('answers like a missing one, in the form and in saving', async () => {
    const other = await makeWorkspace(by.up.app.db, 'Other');
    const foreign = await makeDataset(by.up.app.db, other.scope);
    for (const datasetId of [foreign.id, randomUUID()]) {
      const begun = await by.send(FILES, { datasetId });
      expect([begun.status, begun.problem.code]).toEqual([404, 'datasets.not_found']);
      const { id, version } = await by.begin(FILES);
      const saved = await by.save(id, { version, datasetId });
      expect([saved.status, saved.problem.code]).toEqual([404, 'datasets.not_found']);
    }
    expect(await by.up.app.db.$count(imports, eq(imports.workspaceId, other.id))).toBe(0);
    expect(await by.up.app.db.$count(revisions, eq(revisions.datasetId, foreign.id))).toBe(1);
  });
});
