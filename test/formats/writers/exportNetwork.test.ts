import { parse } from 'csv-parse/sync';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { contentHash } from '../../../formats/canonical';
import {
  EXPORT_FILES,
  EXPORT_KINDS,
  exportPieces,
  type ExportKind,
} from '../../../formats/writers/exportNetwork';
import type { WrittenNetwork } from '../../../formats/writers/types';
import { UnwritableText } from '../../../formats/writers/xmlText';
import { bring, type Brought, type Changes, type Files } from '../bring';
import { networkOf, NASTY_LABELS, SMALL_NETWORKS, writtenNetwork } from './networks';

const textOf = (kind: ExportKind, network: WrittenNetwork): string =>
  [...exportPieces(kind, network)].join('');

const WHOLE: Readonly<Record<string, readonly ExportKind[]>> = {
  tables: ['nodes_csv', 'edges_csv'],
  GraphML: ['graphml'],
  'JSON node-link': ['node_link'],
};

const exported = (kinds: readonly ExportKind[], network: WrittenNetwork): Files =>
  Object.fromEntries(kinds.map((kind) => [EXPORT_FILES[kind].name, textOf(kind, network)]));

/** Weights by the ids of their edge. */
function weightsOf({ nodes, edges, weights }: WrittenNetwork): Record<string, number> {
  const entries = Array.from(weights ?? [], (weight, at) => {
    const ends = [edges[2 * at], edges[2 * at + 1]].map((row) => nodes[row ?? 0]?.id);
    return [JSON.stringify(ends), weight] as const;
  });
  return Object.fromEntries(entries.filter(([, weight]) => !Number.isNaN(weight)));
}

function expectSame(brought: Brought, network: WrittenNetwork): void {
  expect(brought.issues).toEqual([]);
  expect(brought.asked).toEqual([]);
  const again = networkOf(brought);
  expect(again.nodes).toEqual(network.nodes);
  expect(contentHash(again)).toBe(contentHash(network));
  expect(weightsOf(again)).toEqual(weightsOf(network));
  expect(brought.found.ignoredColumns).toEqual([]);
  expect(brought.found.dropped).toEqual([]);
}

describe.each(Object.entries(WHOLE))('%s that were exported come back exactly', (_, kinds) => {
  test.each(Object.entries(SMALL_NETWORKS))('%s', async (__, files: Files) => {
    const changes: Changes = { dayOrder: 'day_first', missing: 'last' };
    const network = networkOf(await bring(files, changes));
    expectSame(await bring(exported(kinds, network)), network);
  });

  test('labels, ids and raw texts of every kind', async () => {
    const network = writtenNetwork(NASTY_LABELS.map((text) => ({ id: text, label: `${text}!` })));
    const labelled = writtenNetwork(
      NASTY_LABELS.map((text, at) => ({ id: `n${at}`, label: text, entryRaw: text })),
    );
    expectSame(await bring(exported(kinds, network)), network);
    expectSame(await bring(exported(kinds, labelled)), labelled);
  });

  test.each([
    [['source', 'target', 'weight', 'label', 'entry', 'entry_unit', 'id', '5']],
    [['target', '5']],
    [['label', 'entry', 'earliest']],
  ])('nodes that are called like columns: %j', async (ids) => {
    const network = writtenNetwork(ids.map((id) => ({ id, label: id, entryRaw: '' })));
    expectSame(await bring(exported(kinds, network)), network);
  });

  test('ids with decimal commas beside weights with points', async () => {
    const network = writtenNetwork(['1,5', '2,5', '3,5'].map((id) => ({ id, label: id })));
    expectSame(await bring(exported(kinds, network)), network);
  });

  test('any network of any texts and numbers', async () => {
    await fc.assert(
      fc.asyncProperty(anyNetwork, async (network) => {
        expectSame(await bring(exported(kinds, network)), network);
      }),
      { numRuns: 200, seed: 1 },
    );
  });

  test('two thousand nodes with twenty thousand edges, in several pieces', async () => {
    const network = writtenNetwork(
      Array.from({ length: 2_000 }, (__, at) => ({ id: `node ${at}`, label: `Node ${at}` })),
      20_000,
    );
    for (const kind of kinds) expect([...exportPieces(kind, network)].length).toBeGreaterThan(1);
    expectSame(await bring(exported(kinds, network)), network);
  });
});

/** Letters that mean something to one of the formats, and others. */
const letter = fc.constantFrom(
  ...['a', 'é', 'e\u0301', '"', "'", '=', '+', '-', '@', '\t', '\n', '\r', ' ', ',', ';', '<', '&'],
  ...[']]>', '\u0001', '\u0085', '\u2028', '\ufeff', '\u202e', '😀', '1', '.', '#', '%', '\\', '{'],
);
const text = fc.array(letter, { minLength: 1, maxLength: 6 }).map((letters) => letters.join(''));
const value = fc.double({ noNaN: true, noDefaultInfinity: true }).map((one) => one + 0);
const anyNetwork = fc
  .uniqueArray(text, { minLength: 1, maxLength: 12, selector: (id) => id.normalize('NFC') })
  .chain((ids) =>
    fc.record({
      ids: fc.constant(ids),
      labels: fc.array(text, { minLength: ids.length, maxLength: ids.length }),
      entries: fc.array(value, { minLength: ids.length, maxLength: ids.length }),
      weights: fc.array(value, { minLength: ids.length, maxLength: ids.length }),
    }),
  )
  .map(({ ids, labels, entries, weights }) =>
    writtenNetwork(
      ids.map((id, at) => ({ id, label: labels[at] ?? '', entry: entries[at] ?? 0 })),
      ids.length,
      weights,
    ),
  );

test('no cell of an exported table is run as a formula', () => {
  const network = writtenNetwork(NASTY_LABELS.map((id) => ({ id, label: id })));
  const cells: string[][] = [
    ...parse(textOf('nodes_csv', network)),
    ...parse(textOf('edges_csv', network), { relax_column_count: true }),
  ];
  const run = cells.flat().filter((cell) => /^[=+\-@\t\r]/.test(cell));
  expect(new Set(run)).toEqual(new Set(['-1.5']));
});

test('control characters make the file XML 1.1; what no XML holds is refused before any piece', () => {
  const alone = (id: string): WrittenNetwork => writtenNetwork([{ id, label: id }]);
  expect(textOf('graphml', alone('a'))).toMatch(/^<\?xml version="1\.0"/);
  expect(textOf('graphml', alone('a\u0001'))).toMatch(/^<\?xml version="1\.1"/);
  expect(() => exportPieces('graphml', alone('a\uffff'))).toThrow(UnwritableText);
});

test('every kind has a file name of its own', () => {
  const names = EXPORT_KINDS.map((kind) => EXPORT_FILES[kind].name);
  expect(new Set(names).size).toBe(EXPORT_KINDS.length);
});
