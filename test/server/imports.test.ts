import { readFileSync } from 'node:fs';
import { eq, sql } from 'drizzle-orm';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { decodeFloat64 } from '../../db/codecs/typedArrays';
import { deleteExpiredImports } from '../../db/repositories/imports';
import { importFiles, importPieces, imports, revisions, stagedPieces } from '../../db/schema/index';
import { dataset, revision } from '../../server/contract/datasets';
import { IMPORT_LIMITS, importList, importWeights } from '../../server/contract/imports';
import { EDGES_CSV, importForm, makeWorkspace, NODES_CSV } from '../support/factories';
import { Importing } from '../support/importing';

let by: Importing;
beforeAll(async () => {
  by = await Importing.open();
});
afterAll(() => by.up.app.close());
afterEach(() => by.up.nothingLeft());

const FILES = { 'nodes.csv': NODES_CSV, 'edges.csv': EDGES_CSV };
const WEIGHTED = { 'links.csv': 'source,target,weight\na,b,1\nb,c,2\nc,a,2\nc,d,\n' };

describe('a draft', () => {
  test('shows its files, what was guessed, what was found and how the network grows', async () => {
    const draft = await by.begin(FILES);
    expect(draft).toMatchObject({
      name: 'nodes',
      state: 'open',
      version: 1,
      ready: true,
      remembered: false,
      questions: [],
      issues: [],
      saved: null,
      createdBy: 'Owner of Fen',
    });
    expect(draft.files).toMatchObject([
      {
        name: 'nodes.csv',
        bytes: NODES_CSV.length,
        format: 'table',
        nodes: { columns: ['id', 'label', 'entry'], rowCount: 3, where: 'line' },
        edges: null,
      },
      { name: 'edges.csv', nodes: null, edges: { columns: ['source', 'target'], rowCount: 2 } },
    ]);
    expect(draft.files[0]?.nodes?.preview[0]).toEqual({ line: 2, cells: ['a', 'Node a', '1'] });
    expect(draft.choices.columns.nodes).toMatchObject({ id: 'id', label: 'label', entry: 'entry' });
    expect(draft.found).toMatchObject({ nodes: 3, edges: 2, components: 1 });
    expect(draft.growth).toMatchObject({
      entryUnit: 'number',
      entries: [1, 2, 3],
      labels: ['Node a', 'Node b', 'Node c'],
      edgesBy: [0, 1, 2],
      edges: [
        [0, 1],
        [1, 2],
      ],
    });
  });

  test('is left, listed, resumed by somebody else and saved', async () => {
    const { id } = await by.begin(FILES, { name: 'Left for later' });
    const list = (await by.client.get(by.path)).read(importList);
    expect(list.imports.find((one) => one.id === id)).toMatchObject({
      name: 'Left for later',
      files: [{ name: 'nodes.csv' }, { name: 'edges.csv' }],
    });
    const resumed = await by.look(id);
    const saved = await by.saved(resumed, { name: 'Fen', description: 'By draft.' });
    expect(saved.number).toBe(1);
    const kept = (await by.client.get(`${by.up.path}/${saved.datasetId}`)).read(dataset);
    expect(kept).toMatchObject({ name: 'Fen', description: 'By draft.' });
    expect(kept.revisions[0]?.report).toMatchObject({
      nodeRows: 3,
      imported: {
        choices: resumed.choices,
        found: resumed.found,
        files: [{ name: 'nodes.csv' }, {}],
      },
    });
    expect((await by.look(id)).saved).toEqual({
      datasetId: saved.datasetId,
      revisionId: saved.revisionId,
    });
    const after = (await by.client.get(by.path)).read(importList);
    expect(after.imports.map((one) => one.id)).not.toContain(id);
    expect(await by.up.app.db.$count(stagedPieces)).toBe(0);
  });

  test('of pasted text is an import like any other', async () => {
    const draft = await by.begin({}, { pasted: 'source\ttarget\ttime\na\tb\t5\nb\tc\t7\n' });
    expect(draft.files).toMatchObject([{ name: 'Pasted text', pasted: true }]);
    expect(draft.choices.order).toEqual({ kind: 'first_edge' });
    expect(draft.growth?.entries).toEqual([5, 5, 7]);
  });

  test('is read by what was said about a file, and again by what is guessed', async () => {
    const draft = await by.begin({ 'n.csv': 'id;entry\na;1,5\nb;2,5\n' });
    expect(draft.files[0]?.reading).toMatchObject({ delimiter: ';', decimal: ',' });
    const comma = await by.change(draft.id, {
      hints: [{ position: 0, hint: { reading: { delimiter: ',' } } }],
    });
    expect(comma.version).toBe(2);
    expect(comma.files[0]?.reading?.delimiter).toBe(',');
    expect(comma.files[0]?.hint).toEqual({ reading: { delimiter: ',' } });
    const back = await by.change(draft.id, { hints: [{ position: 0, hint: {} }] });
    expect(back.growth?.entries).toEqual([1.5, 2.5]);
  });

  test('asks whether 01/02/2024 is in January or February, and is ready once it is told', async () => {
    const draft = await by.begin({ 'n.csv': 'id,entry\na,01/02/2024\nb,03/04/2024\n' });
    expect(draft.ready).toBe(false);
    expect(draft.questions).toMatchObject([{ kind: 'day_order', blocking: true, column: 'entry' }]);
    const told = await by.change(draft.id, {
      choices: { ...draft.choices, dayOrder: 'day_first' },
    });
    expect(told.ready).toBe(true);
    expect(told.questions).toEqual([]);
    const day = (text: string) => Date.parse(text) / 86_400_000;
    expect(told.growth?.entries).toEqual([day('2024-02-01'), day('2024-04-03')]);
    const back = await by.change(draft.id, { choices: null });
    expect(back.choices).toEqual(draft.guessed);
    expect(back.ready).toBe(false);
  });

  test('asks of the entry column that is chosen, whichever was guessed', async () => {
    const table = 'id,entry,seen\na,1,1999\nb,2,\nc,3,2004\n';
    const draft = await by.begin({ 'n.csv': table });
    expect([draft.choices.columns.nodes.entry, draft.questions]).toEqual(['entry', []]);
    const { columns } = draft.choices;
    const nodes = { ...columns.nodes, entry: 'seen' };
    const choices = { ...draft.choices, columns: { ...columns, nodes } };
    const asked = await by.change(draft.id, { choices });
    expect(asked.questions).toMatchObject([
      { kind: 'years', column: 'seen', examples: ['1999', '2004'] },
      { kind: 'missing', column: 'seen' },
    ]);
    expect(asked.questions[1]?.text).toMatch(/^1 node has no entry/);
    const told = await by.change(draft.id, { choices: { ...choices, missing: 'last' } });
    expect(told.questions.map(({ kind }) => kind)).toEqual(['years']);
    expect((await by.change(draft.id, { choices: null })).questions).toEqual([]);
  });

  test('with another name is the same version', async () => {
    const draft = await by.begin(FILES);
    const renamed = await by.change(draft.id, { name: 'Renamed' });
    expect(renamed).toMatchObject({ name: 'Renamed', version: 1 });
  });

  test('of a column that does not exist says so and is not ready', async () => {
    const draft = await by.begin(FILES);
    const { columns } = draft.choices;
    const changed = await by.change(draft.id, {
      choices: {
        ...draft.choices,
        columns: { ...columns, nodes: { ...columns.nodes, entry: 'arrived' } },
      },
    });
    expect(changed.ready).toBe(false);
    expect(changed.issues[0]?.message).toContain('arrived');
    expect(changed.growth).toBeNull();
  });

  test('is removed with its files, and then is not there', async () => {
    const { id } = await by.begin(FILES);
    expect((await by.client.ask(`${by.path}/${id}`, { method: 'DELETE' })).status).toBe(204);
    expect((await by.client.get(`${by.path}/${id}`)).status).toBe(404);
    const { db } = by.up.app;
    expect(await db.$count(importFiles, eq(importFiles.importId, id))).toBe(0);
    expect(await db.$count(importPieces, eq(importPieces.importId, id))).toBe(0);
  });

  test('whose reading was lost with the server is read when somebody looks', async () => {
    const draft = await by.begin(FILES);
    const lost = { readVersion: null, view: null, weights: null };
    await by.up.app.db.update(imports).set(lost).where(eq(imports.id, draft.id));
    expect(await by.look(draft.id)).toEqual(draft);
  });

  test('of a graph file shows its nodes and its edges', async () => {
    const text = readFileSync('test/formats/fixtures/graphs/reedbed.graphml', 'utf8');
    const draft = await by.begin({ 'reedbed.graphml': text });
    expect(draft.files).toMatchObject([{ format: 'graphml', nodes: {}, edges: {} }]);
    expect(draft).toMatchObject({ ready: true, issues: [] });
    expect(draft.found.nodes).toBe(draft.files[0]?.nodes?.rowCount);
  });

  test('is kept for the days that the page promises', async () => {
    const { updatedAt, expiresAt } = await by.begin(FILES);
    const days = (Date.parse(expiresAt) - Date.parse(updatedAt)) / 86_400_000;
    expect(days).toBeCloseTo(IMPORT_LIMITS.days, 1);
  });

  test('is refused where the workspace has begun too many', async () => {
    const full = await makeWorkspace(by.up.app.db, 'Full');
    const rows = Array.from({ length: 50 }, (_, n) => ({
      workspaceId: full.id,
      name: `Draft ${n}`,
      expiresAt: new Date(Date.now() + 86_400_000),
    }));
    await by.up.app.db.insert(imports).values(rows);
    const owner = await by.up.app.clientOf(full.owner.id);
    const path = `/api/workspaces/${full.id}/imports`;
    const { status, problem } = await owner.ask(path, { form: importForm(FILES) });
    expect([status, problem.code]).toEqual([409, 'imports.too_many']);
  });

  test('that nobody came back to for 30 days is gone, and then removed', async () => {
    const { id } = await by.begin(FILES);
    const { db } = by.up.app;
    const past = { expiresAt: sql`now() - interval '1 second'` };
    await db.update(imports).set(past).where(eq(imports.id, id));
    expect((await by.client.get(`${by.path}/${id}`)).status).toBe(404);
    expect((await by.ask(id, { name: 'Late' })).status).toBe(404);
    expect(await deleteExpiredImports(db)).toBe(1);
    expect(await db.$count(imports, eq(imports.id, id))).toBe(0);
  });
});

describe('weights', () => {
  test('say how many edges each threshold keeps, and are saved with the revision', async () => {
    const draft = await by.begin(WEIGHTED);
    expect(draft.choices.columns.edges.weight).toBe('weight');
    const path = `${by.path}/${draft.id}/weights`;
    const { weights } = (await by.client.get(path)).read(importWeights);
    expect(weights).toEqual({
      nodes: 4,
      edges: 4,
      withoutWeight: 1,
      steps: [
        { least: 1, edges: 3 },
        { least: 2, edges: 2 },
      ],
      complete: true,
    });
    const cut = await by.change(draft.id, {
      choices: { ...draft.choices, weights: { kind: 'threshold', least: 2 } },
    });
    expect(cut.found).toMatchObject({ edges: 2, edgesBelowThreshold: 1, edgesWithoutWeight: 1 });
    const { revisionId } = await by.saved(cut, { name: 'Weighted' });
    const [row] = await by.up.app.db
      .select({ weights: revisions.weights })
      .from(revisions)
      .where(eq(revisions.id, revisionId));
    expect(decodeFloat64(row?.weights ?? new Uint8Array())).toEqual(Float64Array.of(2, 2));
    const read = await by.client.get(`${by.up.workspacePath}/revisions/${revisionId}`);
    expect(read.read(revision).edges).toEqual([
      [0, 2],
      [1, 2],
    ]);
  });

  test('past two hundred are told in two hundred steps, the least and the largest among them', async () => {
    const rows = Array.from({ length: 500 }, (_, n) => `a,b${n},${n / 7}`);
    const draft = await by.begin({ 'e.csv': ['source,target,weight', ...rows].join('\n') });
    const answer = await by.client.get(`${by.path}/${draft.id}/weights`);
    const { weights } = answer.read(importWeights);
    expect(weights?.complete).toBe(false);
    expect(weights?.steps).toHaveLength(200);
    expect(weights?.steps[0]).toEqual({ least: 0, edges: 500 });
    expect(weights?.steps.at(-1)).toEqual({ least: 499 / 7, edges: 1 });
  });

  test('are none where the files have none', async () => {
    const { id } = await by.begin(FILES);
    const answer = await by.client.get(`${by.path}/${id}/weights`);
    expect(answer.read(importWeights)).toEqual({ weights: null });
  });
});

describe('what each column is', () => {
  test('is remembered for files with the same columns, in any order, in this workspace alone', async () => {
    const files = { 'n.csv': 'code,seen,first\na,9,1\nb,8,2\n' };
    const draft = await by.begin(files);
    expect(draft.remembered).toBe(false);
    const { columns } = draft.choices;
    const chosen = {
      ...draft.choices,
      columns: {
        ...columns,
        nodes: { id: 'code', label: null, entry: 'first', earliest: null, latest: null },
      },
    };
    const changed = await by.change(draft.id, { choices: chosen });
    await by.saved(changed, { name: 'Codes' });
    const again = await by.begin({ 'other.csv': 'first,code,seen\n4,x,1\n6,y,1\n' });
    expect(again.remembered).toBe(true);
    expect(again.choices.columns.nodes.entry).toBe('first');
    expect(again.growth?.entries).toEqual([4, 6]);
    const guessed = await by.change(again.id, { choices: null });
    expect(guessed).toMatchObject({ remembered: false, choices: again.guessed });
    const elsewhere = await Importing.open();
    try {
      expect((await elsewhere.begin(files)).remembered).toBe(false);
    } finally {
      await elsewhere.up.app.close();
    }
  });
});
