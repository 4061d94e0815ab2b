import { describe, expect, test } from 'vitest';
import { differenceOf, type ComparedNode } from '../../server/revisions/difference';

const node = (nodeId: string, entry: number, more: Partial<ComparedNode> = {}): ComparedNode => ({
  nodeId,
  label: `Node ${nodeId}`,
  entryRaw: String(entry),
  entry,
  earliestRaw: '',
  earliest: null,
  latestRaw: '',
  latest: null,
  ...more,
});

const revision = (
  nodes: readonly ComparedNode[],
  edges: readonly number[],
  entryUnit: 'number' | 'days' | 'seconds' = 'number',
) => ({ entryUnit, nodes, edges: Uint32Array.from(edges) });

const path = revision([node('a', 1), node('b', 2), node('c', 3)], [0, 1, 1, 2]);

describe('the difference of two revisions', () => {
  test('is nothing where they hold the same', () => {
    const { counts, rowsMoved } = differenceOf(path, path);
    expect(Object.values(counts)).toEqual([0, 0, 0, 0, 0, 0, 0]);
    expect(rowsMoved).toBe(false);
  });

  test('names nodes by id, and edges of a removed node as removed', () => {
    const found = differenceOf(
      path,
      revision([node('d', 0), node('b', 2), node('a', 1)], [0, 1, 1, 2]),
    );
    expect(found.nodesAdded).toEqual([{ id: 'd', label: 'Node d' }]);
    expect(found.nodesRemoved).toEqual([{ id: 'c', label: 'Node c' }]);
    expect(found.edgesAdded).toEqual([{ a: 'd', b: 'b' }]);
    expect(found.edgesRemoved).toEqual([{ a: 'b', b: 'c' }]);
    expect(found.entriesChanged).toEqual([]);
    expect(found.rowsMoved).toBe(true);
  });

  test('finds an edge that is gone between two that stay, and at the end', () => {
    const four = ['a', 'b', 'c', 'd'].map((id, at) => node(id, at));
    const found = differenceOf(
      revision(four, [0, 1, 0, 2, 1, 3, 2, 3]),
      revision(four, [0, 1, 1, 2, 1, 3]),
    );
    expect(found.edgesRemoved).toEqual([
      { a: 'a', b: 'c' },
      { a: 'c', b: 'd' },
    ]);
    expect(found.edgesAdded).toEqual([{ a: 'b', b: 'c' }]);
  });

  test('tells the text of an entry before and after, and a label by both', () => {
    const after = revision(
      [node('a', 1, { label: 'Alder' }), node('b', 2, { entryRaw: '2.0' }), node('c', 5)],
      [0, 1, 1, 2],
    );
    const found = differenceOf(path, after);
    expect(found.relabelled).toEqual([{ id: 'a', before: 'Node a', after: 'Alder' }]);
    expect(found.entriesChanged).toEqual([
      { id: 'b', label: 'Node b', before: '2', after: '2.0' },
      { id: 'c', label: 'Node c', before: '3', after: '5' },
    ]);
  });

  test('tells a window as written, or by its value where nobody wrote it', () => {
    const before = revision([node('a', 10, { earliest: 0, latest: 31 })], [], 'days');
    const after = revision([node('a', 10, { earliestRaw: '2 Jan 1970', earliest: 1 })], [], 'days');
    expect(differenceOf(before, after).windowsChanged).toEqual([
      {
        id: 'a',
        label: 'Node a',
        before: { earliest: '1970-01-01', latest: '1970-02-01' },
        after: { earliest: '2 Jan 1970', latest: null },
      },
    ]);
  });

  test('lists 200 of a kind and counts all', () => {
    const many = Array.from({ length: 300 }, (_, at) => node(`n${at}`, at));
    const star = many.slice(1).flatMap((_, at) => [0, at + 1]);
    const found = differenceOf(revision([], []), revision(many, star));
    expect(found.counts).toMatchObject({ nodesAdded: 300, edgesAdded: 299 });
    expect([found.nodesAdded.length, found.edgesAdded.length]).toEqual([200, 200]);
  });
});
