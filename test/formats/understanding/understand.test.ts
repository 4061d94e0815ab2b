import { describe, expect, test } from 'vitest';
import { contentHash } from '../../../formats/canonical';
import { readNetwork } from '../../../formats/nodesAndEdges';
import { tableOf } from '../../../formats/sources/rawTable';
import { emptySource } from '../../../formats/sources/tableSource';
import type { RawSource } from '../../../formats/sources/types';
import { guessChoices } from '../../../formats/understanding/guessChoices';
import { understand } from '../../../formats/understanding/understand';
import { bring, drawn, LIMITS, placesOf, type Changes, type Files } from '../bring';

const NODES = 'id,label,entry\na,Alder,1\nb,Birch,2\nc,Cedar,2\n';
const EDGES = 'source,target\na,b\nb,c\n';

const messages = async (files: Files, changes: Changes = {}, limits = LIMITS) => {
  const brought = await bring(files, changes, {}, limits);
  expect(brought.network).toBeNull();
  return brought.issues.map(({ message }) => message).join('\n');
};

async function* once(text: string): AsyncGenerator<Uint8Array> {
  yield await Promise.resolve(new TextEncoder().encode(text));
}

describe('the same network', () => {
  test.each([
    ['numbers', NODES, EDGES],
    ['windows', 'id,entry,earliest,latest\na,5,4,6\nb,7,,\n', 'source,target\na,b\n'],
    ['dates', 'id,entry\na,2024-02-29\nb,1969-12-31\n', 'source,target\nb,a\na,a\n'],
    ['times', 'id,entry\na,1970-01-01\nb,1970-01-01T01:00+01:00\n', 'source,target\n'],
    ['weights', NODES, 'source,target,weight\na,b,2\nb,a,3\n'],
  ])(
    'has the same content hash as the upload of two files gives it: %s',
    async (_, nodes, edges) => {
      const upload = await readNetwork(
        { name: 'nodes.csv', bytes: once(nodes) },
        { name: 'edges.csv', bytes: once(edges) },
        LIMITS,
      );
      const { network } = await bring({ 'nodes.csv': nodes, 'edges.csv': edges });
      if (!upload.ok || !network) throw new Error('One of them was refused.');
      expect(contentHash(network)).toBe(contentHash(upload));
    },
  );

  test('has one hash from an edge list, a matrix and a pair of tables', async () => {
    const pair = await bring({
      'nodes.csv': 'id,entry\na,1\nb,2\nc,3\n',
      'edges.csv': 'from,to\nb,a\nc,b\n',
    });
    const matrix = await bring({ 'm.csv': ',a,b,c\na,0,1,0\nb,1,0,1\nc,0,1,0\n' });
    if (!pair.network || !matrix.network) throw new Error('One of them was refused.');
    expect(contentHash(matrix.network)).toBe(contentHash(pair.network));
  });
});

describe('where the order comes from', () => {
  test('the order of rows is 1, 2, … and is said', async () => {
    const { found, network } = await bring(
      { 'nodes.csv': NODES, 'edges.csv': EDGES },
      { order: { kind: 'rows' } },
    );
    expect(network?.nodes.map(({ entry, entryRaw }) => [entry, entryRaw])).toEqual([
      [1, '1'],
      [2, '2'],
      [3, '3'],
    ]);
    expect(found).toMatchObject({ ties: 0, orderFrom: 'The order of the rows of nodes.csv.' });
  });

  test('two nodes that one edge row brings in are tied', async () => {
    const brought = await bring({ 'edges.csv': 'source,target\na,b\nb,c\nd,e\nc,f\n' });
    expect(drawn(brought).nodes).toEqual(['a@1', 'b@1', 'c@2', 'd@3', 'e@3', 'f@4']);
    expect(brought.found).toMatchObject({ ties: 2, tiedNodes: 4 });
    expect(brought.asked).toMatchObject([{ kind: 'order', blocking: false }]);
  });

  test('the first time of any incident edge counts, self loops and folded edges too', async () => {
    const brought = await bring({
      'edges.csv': 'source,target,time\na,b,9\nb,a,4\nc,c,2\nb,c,5\na,d,\n',
      'nodes.csv': 'id,label\na,A\nb,B\nc,C\nd,D\n',
    });
    expect(brought.guessed.order.kind).toBe('first_edge');
    expect(placesOf(brought)).toEqual(['nodes.csv:5:entry']);
    const last = await bring(
      {
        'edges.csv': 'source,target,time\na,b,9\nb,a,4\nc,c,2\nb,c,5\na,d,\n',
        'nodes.csv': 'id,label\na,A\nb,B\nc,C\nd,D\n',
      },
      { missing: 'last' },
    );
    expect(drawn(last).nodes).toEqual(['a@4', 'b@4', 'c@2', 'd@5[2,5]']);
    expect(last.found).toMatchObject({ edgesWithoutTime: 1, placedLast: 1 });
    expect(last.found.notes.join(' ')).toMatch(/placed one after the last entry/);
  });

  test('without any time to go by, an order by column or first edge is refused', async () => {
    const files = { 'edges.csv': EDGES };
    expect(await messages(files, { order: { kind: 'column' } })).toMatch(/no table of nodes/);
    expect(await messages(files, { order: { kind: 'first_edge' } })).toMatch(/No column is chosen/);
    const nodes = { 'nodes.csv': 'id,label\na,A\n' };
    expect(await messages(nodes, { order: { kind: 'column' } })).toMatch(/No column is chosen/);
  });

  test('where every entry is missing nothing can be placed last, and none is left to keep', async () => {
    const files = { 'nodes.csv': 'id,entry\na,NA\nb,?\n' };
    const columns = { nodes: { entry: 'entry' }, order: { kind: 'column' } } as const;
    expect(await messages(files, { ...columns, missing: 'last' })).toMatch(/entry is missing/);
    expect(await messages(files, { ...columns, missing: 'leave_out' })).toMatch(/left out/);
  });
});

describe('nodes and their names', () => {
  test('edges find their nodes in any normal form, and the id stays as written', async () => {
    const { network } = await bring({
      'nodes.csv': 'id,entry\ne\u0301,1\nb,2\n',
      'edges.csv': 'source,target\n\u00e9,b\n',
    });
    expect(network?.nodes[0]?.id).toBe('e\u0301');
    expect([...(network?.edges ?? [])]).toEqual([0, 1]);
  });

  test('nodes of a matrix or graph that the node table lacks have no entry', async () => {
    const files = {
      'nodes.csv': 'id,entry\na,3\nb,1\n',
      'matrix.csv': ',a,b,lone\na,0,1,0\nb,1,0,0\nlone,0,0,0\n',
    };
    const refused = await bring(files);
    expect(refused.issues.map(({ message }) => message).join()).toMatch(/“lone” is not among/);
    const brought = await bring(files, { missing: 'leave_out' });
    expect(drawn(brought)).toEqual({ nodes: ['a@3', 'b@1'], edges: ['a-b*1'] });
    expect(brought.found).toMatchObject({ nodesOnlyInEdges: 1, nodesLeftOut: 1 });
  });

  test.each([
    ['a NUL', 'a\0b', /NUL/],
    ['a lone surrogate', `long enough ${'\ud800'}`, /lone surrogate/],
    ['301 characters', 'x'.repeat(301), /301 characters/],
    ['a megabyte', 'x'.repeat(1_000_000), /1000000 characters/],
  ])('an id with %s is refused by line, from a table or an edge', (_, id, message) => {
    const base = { ...emptySource('graph.json', READING), format: 'node_link' as const };
    const nodes: RawSource = {
      ...base,
      nodes: tableOf(['id'], () => [{ line: 7, cells: [id] }], 'element'),
    };
    const edges: RawSource = {
      ...base,
      edges: tableOf(['source', 'target'], () => [{ line: 7, cells: ['a', id] }], 'element'),
    };
    for (const source of [nodes, edges]) {
      const { issues } = understand([source], guessChoices([source]).choices, LIMITS);
      expect(issues).toMatchObject([{ file: 'graph.json', line: 7, field: 'id' }]);
      expect(issues[0]?.message).toMatch(message);
    }
  });

  const READING = { encoding: 'utf-8', delimiter: ',', decimal: '.', header: true } as const;

  test('ten thousand combining marks are a label like any other, if it is short enough', async () => {
    const text = await messages({ 'nodes.csv': `id,entry\na${'\u0301'.repeat(10_000)},1\n` });
    expect(text).toMatch(/10001 characters/);
    const kept = await bring({ 'nodes.csv': `id,entry\na${'\u0301'.repeat(200)},1\n` });
    expect(kept.network?.nodes[0]?.id).toHaveLength(201);
  });

  test('an empty id and an empty end are refused by line', async () => {
    const brought = await bring({
      'nodes.csv': 'id,label,entry\n,x,1\na,y,2\n',
      'edges.csv': 'source,target,weight\na,,1\n,a,1\n',
    });
    expect(placesOf(brought)).toEqual([
      'nodes.csv:2:id',
      'edges.csv:2:target',
      'edges.csv:3:source',
    ]);
  });
});

describe('choices', () => {
  test('a column that is not there is named with those that are', async () => {
    const text = await messages({ 'nodes.csv': NODES }, { nodes: { entry: 'arrival' } });
    expect(text).toBe(
      'There is no column “arrival”. The columns are id, label, entry. Choose another.',
    );
  });

  test.each<[string, Changes, RegExp]>([
    ['no ids', { nodes: { id: null } }, /names the nodes/],
    ['no ends', { edges: { source: null } }, /two ends/],
    ['one column for both ends', { edges: { target: 'source' } }, /same column/],
    [
      'a threshold without weights',
      { weights: { kind: 'threshold', least: 1 } },
      /No column of weights/,
    ],
    ['a density past 1', { weights: { kind: 'density', share: 1.5 } }, /from 0 to 1/],
    [
      'a threshold that is no number',
      { weights: { kind: 'threshold', least: NaN } },
      /least weight/,
    ],
  ])('%s', async (_, changes, message) => {
    expect(await messages({ 'nodes.csv': NODES, 'edges.csv': EDGES }, changes)).toMatch(message);
  });

  test('any column may be chosen for any part, and the others are named as ignored', async () => {
    const brought = await bring(
      { 'nodes.csv': 'id,code,entry,seen\na,X1,1,9\nb,X2,2,8\n' },
      { nodes: { id: 'code', label: 'id', entry: 'seen' } },
    );
    expect(drawn(brought).nodes).toEqual(['X1@9', 'X2@8']);
    expect(brought.found.ignoredColumns).toEqual(['nodes.csv: entry']);
  });
});

describe('limits', () => {
  const limits = { ...LIMITS, nodes: 3, edgeRows: 4 };

  test('more nodes than can be stored are refused, from a table, an edge list and a matrix', async () => {
    expect(await messages({ 'n.csv': `id,entry\na,1\nb,2\nc,3\nd,4\n` }, {}, limits)).toMatch(
      /more than 3 nodes/,
    );
    expect(await messages({ 'e.csv': 'source,target\na,b\nc,d\n' }, {}, limits)).toMatch(
      /more than 3 nodes/,
    );
    expect(
      await messages(
        { 'm.csv': ',a,b,c,d\na,0,1,0,0\nb,1,0,0,0\nc,0,0,0,0\nd,0,0,0,0\n' },
        {},
        limits,
      ),
    ).toMatch(/4 nodes; at most 3/);
  });

  test('more edge rows than are read are refused by the line of the first too many', async () => {
    const brought = await bring({ 'e.csv': `source,target\n${'a,b\n'.repeat(5)}` }, {}, {}, limits);
    expect(placesOf(brought)).toEqual(['e.csv:6:']);
  });

  test('a star of 100,000 leaves is refused as plainly', async () => {
    const star = Array.from({ length: 100_000 }, (_, k) => `hub,leaf ${k}`).join('\n');
    expect(await messages({ 'e.csv': `source,target\n${star}` })).toMatch(/more than 5000 nodes/);
  });

  test('one node is a network, and none is refused', async () => {
    expect(drawn(await bring({ 'n.csv': 'id,entry\na,1\n' })).nodes).toEqual(['a@1']);
    expect(await messages({ 'n.csv': 'id,entry\n' })).toMatch(/no nodes/);
  });
});

describe('values that an export recorded', () => {
  const header =
    'id,label,entry,entry_value,earliest,earliest_value,latest,latest_value,entry_unit';

  test('come back exactly, whatever the raw text would mean', async () => {
    const brought = await bring({
      'nodes.csv': `${header}\na,A,01/02/2024,19754,,19751,,19757,days\nb,B,,19760,,,NA,,days\n`,
    });
    expect(brought.questions).toEqual([]);
    expect(brought.network).toMatchObject({
      entryUnit: 'days',
      nodes: [
        { entryRaw: '01/02/2024', entry: 19754, earliest: 19751, latest: 19757, latestRaw: '' },
        { entryRaw: '', entry: 19760, earliest: null, latest: null, latestRaw: 'NA' },
      ],
    });
    expect(brought.found.ignoredColumns).toEqual([]);
  });

  test('are refused where they are no numbers or change their unit', async () => {
    const brought = await bring({
      'nodes.csv': `${header}\na,A,1,1,,,,,number\nb,B,2,x,,,,,number\nc,C,3,3,,,,,days\n`,
    });
    expect(placesOf(brought)).toEqual(['nodes.csv:3:entry_value', 'nodes.csv:4:entry_unit']);
  });
});
