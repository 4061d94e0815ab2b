import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { bring, drawn } from './bring';
import { BAD_GRAPHS, GOOD_GRAPHS } from './graphFixtures';
import { expectLaws } from './networkLaws';

const FOLDER = join(import.meta.dirname, 'fixtures/graphs');
const bytesOf = (file: string): Uint8Array => new Uint8Array(readFileSync(join(FOLDER, file)));

describe('invented graph files are brought in as intended, and what is dropped is counted', () => {
  test.each(GOOD_GRAPHS)('$shows', async (fixture) => {
    const brought = await bring({ [fixture.file]: bytesOf(fixture.file) }, fixture.changes);
    expect(drawn(brought)).toEqual({ nodes: fixture.nodes, edges: fixture.edges });
    const [source] = brought.sources;
    expect(source?.format).toBe(fixture.format);
    expect(source?.directed).toBe(fixture.directed ?? false);
    expect([source?.nodes, source?.edges].map((table) => table?.columns.join(' '))).toEqual(
      fixture.columns,
    );
    expect(source?.dropped).toEqual(fixture.dropped ?? []);
    expect(source?.notes).toEqual(
      (fixture.notes ?? []).map((part) => expect.stringContaining(part) as string),
    );
    expect(brought.network?.entryUnit).toBe(fixture.unit ?? 'number');
    if (fixture.labels)
      expect(brought.network?.nodes.map(({ label }) => label)).toEqual(fixture.labels);
    expect(brought.found).toMatchObject(fixture.found ?? {});
    expectLaws(brought);
  });
});

describe('invented graph files are refused for exactly what is wrong with them', () => {
  test.each(BAD_GRAPHS)('$shows', async ({ file, problems }) => {
    const brought = await bring({ [file]: bytesOf(file) });
    expect(brought.network).toBeNull();
    expect(brought.issues.map((one) => `${one.line ?? ''}:${one.field ?? ''}`)).toEqual(
      problems.map(([place]) => place),
    );
    for (const [at, [, says]] of problems.entries())
      expect(brought.issues[at]?.message).toContain(says);
    expectLaws(brought);
  });
});

test('every file of the folder has its row', () => {
  const listed = [...GOOD_GRAPHS, ...BAD_GRAPHS].map(({ file }) => file);
  expect(listed.sort()).toEqual(readdirSync(FOLDER).sort());
});
