import { describe, expect, test } from 'vitest';
import { contentHash } from '../../formats/canonical';
import { readNetwork } from '../../formats/nodesAndEdges';
import type { FormatLimits, ReadOutcome } from '../../formats/types';

const LIMITS: FormatLimits = {
  nodes: 50,
  edgeRows: 100,
  lineCharacters: 2000,
  labelCharacters: 40,
};

async function* inPieces(content: string | Uint8Array, size: number): AsyncGenerator<Uint8Array> {
  const bytes = typeof content === 'string' ? new TextEncoder().encode(content) : content;
  for (let at = 0; at < bytes.length; at += size)
    yield await Promise.resolve(bytes.subarray(at, at + size));
}

function read(nodes: string | Uint8Array, edges: string, size = 7): Promise<ReadOutcome> {
  return readNetwork(
    { name: 'nodes.csv', bytes: inPieces(nodes, size) },
    { name: 'edges.csv', bytes: inPieces(edges, size) },
    LIMITS,
  );
}

async function network(nodes: string | Uint8Array, edges: string) {
  const outcome = await read(nodes, edges);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.issues));
  return outcome;
}

async function issues(nodes: string | Uint8Array, edges = 'source,target\n') {
  const outcome = await read(nodes, edges);
  if (outcome.ok) throw new Error('The files were accepted.');
  return outcome.issues.map(
    ({ file, line, field, message }) => [file, line, field, message] as const,
  );
}

const NODES = 'id,label,entry\na,Alder,1\nb,Birch,2\nc,Cedar,2\n';
const EDGES = 'source,target\na,b\nb,c\n';

describe('what is right is read as it was meant', () => {
  test('ids, labels, entries and edges arrive by node row', async () => {
    const { nodes, edges, entryUnit } = await network(NODES, EDGES);
    expect(nodes.map(({ id, label, entry }) => [id, label, entry])).toEqual([
      ['a', 'Alder', 1],
      ['b', 'Birch', 2],
      ['c', 'Cedar', 2],
    ]);
    expect([...edges]).toEqual([0, 1, 1, 2]);
    expect(entryUnit).toBe('number');
  });

  test.each([
    ['a byte order mark', `\uFEFF${NODES}`],
    ['carriage returns with line feeds', NODES.replaceAll('\n', '\r\n')],
    ['carriage returns alone', NODES.replaceAll('\n', '\r')],
    ['mixed line ends', NODES.replace('\n', '\r\n')],
    ['no line end at the end', NODES.trimEnd()],
    ['spaces after commas', NODES.replaceAll(',', ', ')],
    ['blank lines', NODES.replaceAll('\n', '\n\n')],
  ])('%s changes nothing', async (_, nodes) => {
    expect((await network(nodes, EDGES)).nodes).toEqual((await network(NODES, EDGES)).nodes);
  });

  test('columns may stand in any order, and others are named as ignored', async () => {
    const { nodes, report } = await network(
      'entry,habitat,id\n3,fen,x\n1,mere,y\n',
      'source,target\nx,y\n',
    );
    expect(nodes.map(({ id, label, entry }) => [id, label, entry])).toEqual([
      ['x', 'x', 3],
      ['y', 'y', 1],
    ]);
    expect(report.ignoredColumns).toEqual(['nodes.csv: habitat']);
  });

  test('self loops, repeats and reversals are folded and counted', async () => {
    const { edges, report } = await network(NODES, 'source,target\na,b\na,b\nb,a\nb,a\nc,c\n');
    expect([...edges]).toEqual([0, 1]);
    expect(report).toMatchObject({
      edgeRows: 5,
      selfLoops: 1,
      duplicateEdges: 2,
      reversedEdges: 1,
    });
  });

  test('ties, repeated labels, components and isolated nodes are counted', async () => {
    const { report } = await network(
      'id,label,entry\na,Oak,1\nb,Oak,1\nc,Ash,2\nd,Elm,3\n',
      'source,target\na,b\n',
    );
    expect(report).toMatchObject({
      tiedNodes: 2,
      repeatedLabels: 2,
      components: 3,
      isolatedNodes: 2,
    });
  });

  test('days count from 1970-01-01, and a leap day is a day', async () => {
    const { nodes, entryUnit } = await network(
      'id,entry\na,1970-01-02\nb,2024-02-29\n',
      'source,target\n',
    );
    expect(entryUnit).toBe('days');
    expect(nodes.map(({ entry }) => entry)).toEqual([1, 19782]);
  });

  test('one time of day makes the unit seconds, and zones are followed', async () => {
    const { nodes, entryUnit } = await network(
      'id,entry\na,1970-01-01\nb,1970-01-01T01:00+01:00\nc,1970-01-01 00:00:01.5Z\n',
      'source,target\n',
    );
    expect(entryUnit).toBe('seconds');
    expect(nodes.map(({ entry }) => entry)).toEqual([0, 0, 1.5]);
  });

  test.each([
    ['-0', 0],
    ['1e-320', 1e-320],
    ['-1.5', -1.5],
    ['+3', 3],
    ['.5', 0.5],
    ['9007199254740991', 2 ** 53 - 1],
  ])('the entry %s is a number', async (text, value) => {
    expect((await network(`id,entry\na,${text}\n`, 'source,target\n')).nodes[0]?.entry).toBe(value);
  });

  test('__proto__ and constructor are ids and headers like any other', async () => {
    const { nodes, edges, report } = await network(
      'id,entry,__proto__\n__proto__,1,x\nconstructor,2,y\n',
      'source,target\n__proto__,constructor\n',
    );
    expect(nodes.map(({ id }) => id)).toEqual(['__proto__', 'constructor']);
    expect([...edges]).toEqual([0, 1]);
    expect(report.ignoredColumns).toEqual(['nodes.csv: __proto__']);
  });

  test('an edge finds its node by NFC, and the id is kept as written', async () => {
    const { nodes, edges } = await network(
      'id,entry\ne\u0301,1\nb,2\n',
      'source,target\n\u00e9,b\n',
    );
    expect(nodes[0]?.id).toBe('e\u0301');
    expect([...edges]).toEqual([0, 1]);
  });

  test('windows are read beside entries', async () => {
    const { nodes } = await network(
      'id,entry,earliest,latest\na,5,4,6\nb,7,,\n',
      'source,target\n',
    );
    expect(nodes.map(({ earliest, latest }) => [earliest, latest])).toEqual([
      [4, 6],
      [null, null],
    ]);
  });
});

describe('what is wrong is named by file, line and column', () => {
  test.each([
    ['1,5', '"1,5"', /decimal comma/],
    ['0x10', '0x10', /neither a plain number/],
    ['NaN', 'NaN', /not a number/],
    ['-Infinity', '-Infinity', /not a number/],
    ['1e309', '1e309', /larger than a number/],
    ['2^53 + 1', '9007199254740993', /told apart/],
    ['01/02/2024', '01/02/2024', /two different days/],
    ['30 February', '2024-02-30', /no day/],
    ['29 February of a common year', '2023-02-29', /no day/],
    ['year 0', '0000-01-01', /no day/],
    ['24:00', '2024-01-01T24:00', /no time of day/],
    ['nothing', '', /empty/],
  ])('the entry %s', async (_, cell, message) => {
    const found = await issues(`id,entry\na,1\nb,${cell}\n`);
    expect(found[0]?.slice(0, 3)).toEqual(['nodes.csv', 3, 'entry']);
    expect(found[0]?.[3]).toMatch(message);
  });

  test.each([
    ['an empty file', '', undefined, /empty/],
    ['a header only', 'id,entry\n', undefined, /no nodes/],
    ['a missing column', 'id,label\na,b\n', 1, /no column “entry”/],
    ['a repeated column', 'id,entry,entry\na,1,2\n', 1, /2 times/],
    ['a ragged row', 'id,entry\na,1\nb\n', 3, /1 cells/],
    ['a repeated id', 'id,entry\na,1\nb,2\na,3\n', 4, /line 2/],
    ['an id repeated in another normal form', 'id,entry\n\u00e9,1\ne\u0301,3\n', 3, /line 2/],
    ['an empty id', 'id,entry\n,1\n', 2, /empty/],
    ['a long label', `id,label,entry\na,${'x'.repeat(41)},1\n`, 2, /41 characters/],
    ['an unclosed quote', 'id,entry\na,1\n"b,2\n', undefined, /never closed/],
    ['a quote inside a cell', 'id,entry\na,1\nb"c,2\n', 3, /inside a cell/],
    ['a NUL', 'id,entry\na,1\nb\0,2\n', 3, /NUL/],
    ['a row without end', `id,entry\na,${'1'.repeat(3000)}\n`, undefined, /longer than 2000/],
    ['a window that begins after the entry', 'id,entry,earliest\na,1,2\n', 2, /after the entry/],
    ['a window that ends before the entry', 'id,entry,latest\na,2,1\n', 2, /before the entry/],
    ['numbers among dates', 'id,entry\na,2024-01-01\nb,2024-01-02\nc,7\n', 4, /one kind/],
    [
      'times with and without a zone',
      'id,entry\na,2024-01-01T10:00Z\nb,2024-01-02T10:00\n',
      3,
      /zone/,
    ],
  ])('%s', async (_, nodes, line, message) => {
    const found = await issues(nodes);
    expect(found.map((issue) => issue[3]).join('\n')).toMatch(message);
    const hit = found.find((issue) => message.test(issue[3]));
    expect(hit?.[0]).toBe('nodes.csv');
    if (line !== undefined) expect(hit?.[1]).toBe(line);
  });

  test('UTF-16, gzip and bytes that are not UTF-8', async () => {
    expect((await issues(Uint8Array.of(0xff, 0xfe, 105, 0)))[0]?.[3]).toMatch(/UTF-16/);
    expect((await issues(Uint8Array.of(0x1f, 0x8b, 8, 0)))[0]?.[3]).toMatch(/compressed/);
    const latin1 = Uint8Array.from('id,entry\na,1\nb\u00e9,2\n', (letter) => letter.charCodeAt(0));
    expect((await issues(latin1))[0]?.slice(0, 2)).toEqual(['nodes.csv', 3]);
  });

  test('an edge to a node that does not exist, and every problem of both files at once', async () => {
    const found = await issues('id,entry\na,1\nb,x\n', 'source,target\na,b\na,zz\n');
    expect(found.map((issue) => issue.slice(0, 3))).toEqual([
      ['nodes.csv', 3, 'entry'],
      ['edges.csv', 3, 'target'],
    ]);
    expect(found[1]?.[3]).toContain('“zz”');
  });

  test('too many nodes and too many edge rows', async () => {
    const nodes = `id,entry\n${Array.from({ length: 51 }, (_, k) => `n${k},${k}`).join('\n')}`;
    expect((await issues(nodes))[0]?.[3]).toMatch(/51 nodes; at most 50/);
    const edges = `source,target\n${'a,b\n'.repeat(101)}`;
    expect((await issues(NODES, edges))[0]?.slice(0, 2)).toEqual(['edges.csv', 102]);
  });

  test('past two hundred problems the others are counted', async () => {
    const outcome = await readNetwork(
      { name: 'nodes.csv', bytes: inPieces(`id,entry\n${'a,x\n'.repeat(300)}`, 999) },
      { name: 'edges.csv', bytes: inPieces('source,target\n', 99) },
      { ...LIMITS, nodes: 1000 },
    );
    expect(outcome).toMatchObject({ ok: false, leftOut: 399 });
  });
});

describe('the content hash names what was meant', () => {
  test('it does not depend on order or direction of edges', async () => {
    const one = contentHash(await network(NODES, 'source,target\na,b\nb,c\n'));
    const other = contentHash(await network(NODES, 'source,target\nc,b\na,b\nb,a\n'));
    expect(one).toBe(other);
    expect(one).toMatch(/^[0-9a-f]{64}$/);
  });

  test.each([
    ['a label', NODES.replace('Alder', 'Aspen'), EDGES],
    ['an entry', NODES.replace('Alder,1', 'Alder,1.5'), EDGES],
    ['the raw text of an entry', NODES.replace('Alder,1', 'Alder,1.0'), EDGES],
    ['an edge', NODES, 'source,target\na,b\na,c\n'],
  ])('it changes with %s', async (_, nodes, edges) => {
    expect(contentHash(await network(nodes, edges))).not.toBe(
      contentHash(await network(NODES, EDGES)),
    );
  });
});
