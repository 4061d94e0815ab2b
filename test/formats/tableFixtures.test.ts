import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { bring, drawn, placesOf, type Changes } from './bring';
import { BAD_TABLES, GOOD_TABLES } from './tableFixtures';

const FOLDER = join(import.meta.dirname, 'fixtures/tables');

const bringFiles = (names: readonly string[], changes: Changes = {}) =>
  bring(Object.fromEntries(names.map((name) => [name, readFileSync(join(FOLDER, name))])), changes);

describe('invented tables are brought in as intended', () => {
  test.each(GOOD_TABLES)('$shows', async (fixture) => {
    const brought = await bringFiles(fixture.files, fixture.changes);
    expect(drawn(brought)).toEqual({ nodes: fixture.nodes, edges: fixture.edges });
    expect(brought.sources.map(({ format }) => format)).toEqual(fixture.formats);
    expect(brought.network?.entryUnit).toBe(fixture.unit);
    expect(brought.found).toMatchObject(fixture.found ?? {});
    expect(brought.found).toMatchObject({
      nodes: fixture.nodes.length,
      edges: fixture.edges.length,
    });
  });
});

describe('invented tables are refused for exactly what is wrong with them', () => {
  test.each(BAD_TABLES)('$shows', async ({ files, problems, questions }) => {
    const brought = await bringFiles(files);
    expect(brought.network).toBeNull();
    expect(placesOf(brought)).toEqual(problems.map(([place]) => place));
    for (const [at, [, says]] of problems.entries())
      expect(brought.issues[at]?.message).toContain(says);
    expect(brought.questions.map(({ kind }) => kind)).toEqual(questions ?? []);
  });
});

test('every file of the folder has its row', () => {
  const listed = new Set([...GOOD_TABLES, ...BAD_TABLES].flatMap(({ files }) => files));
  expect([...listed].sort()).toEqual(readdirSync(FOLDER).sort());
});

test('letters come through every encoding, and the guess is said', async () => {
  const labels = async (name: string) => {
    const { network, found } = await bringFiles([name]);
    return { labels: network?.nodes.map(({ label }) => label), notes: found.notes.join(' ') };
  };
  expect((await labels('moor-stations-de.csv')).labels).toEqual([
    'Möwenstein',
    'Gänseried',
    'Ried; Südufer',
    'Hörnle',
  ]);
  const western = await labels('orchard-windows1252.csv');
  expect(western.labels).toEqual(['Pommier', 'Poirier d’été', 'Cerisier “griotte”']);
  expect(western.notes).toMatch(/windows-1252/);
  const wide = await labels('tern-stations-utf16.txt');
  expect(wide.labels).toEqual(['North spit', 'Øst pier', 'Low light']);
  expect(wide.notes).toMatch(/UTF-16/);
  expect((await labels('labels.csv')).labels?.slice(0, 5)).toEqual([
    '=HYPERLINK("http://example.invalid")',
    '<img src=x onerror=alert(1)>',
    'two\nlines',
    ' leading',
    'abc\u202edef',
  ]);
});
