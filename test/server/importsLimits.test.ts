import { afterAll, beforeAll, expect, test } from 'vitest';
import { imports } from '../../db/schema/index';
import { EDGES_CSV, NODES_CSV } from '../support/factories';
import { Importing } from '../support/importing';

let by: Importing;
beforeAll(async () => {
  // No process is up in ten milliseconds.
  by = await Importing.open({ reading: { time: 0.01 } });
});
afterAll(() => by.up.app.close());

const FILES = { 'nodes.csv': NODES_CSV, 'edges.csv': EDGES_CSV };

test('a draft whose reading passes a limit says so, and can be looked at and removed', async () => {
  const draft = await by.begin(FILES);
  expect(draft).toMatchObject({
    ready: false,
    growth: null,
    files: [{ name: 'nodes.csv', format: null, nodes: null }, { name: 'edges.csv' }],
  });
  expect(draft.issues[0]?.message).toContain('longer than 0.01 s');
  expect(await by.look(draft.id)).toEqual(draft);
  const csv = await by.client.get(`${by.path}/${draft.id}/problems.csv`);
  expect(csv.text.split('\n')[1]).toContain('longer than 0.01 s');
  expect((await by.save(draft.id, { version: 1, name: 'Too slow' })).status).toBe(422);
  expect((await by.client.ask(`${by.path}/${draft.id}`, { method: 'DELETE' })).status).toBe(204);
  await by.up.nothingLeft();
});

test('more imports at once than may wait are asked to come again, and leave no draft', async () => {
  const before = await by.up.app.db.$count(imports);
  const answers = await Promise.all(Array.from({ length: 12 }, () => by.send(FILES)));
  const later = answers.filter(({ status }) => status === 503);
  const read = answers.filter(({ status }) => status === 201);
  expect(later.length + read.length).toBe(12);
  for (const { problem, headers } of later) {
    expect([problem.code, headers.get('retry-after')]).toEqual(['service.busy', '60']);
  }
  expect(await by.up.app.db.$count(imports)).toBe(before + read.length);
});
