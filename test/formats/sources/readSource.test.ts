import { describe, expect, test } from 'vitest';
import { readSource } from '../../../formats/sources/readSource';
import type { SourceHint } from '../../../formats/sources/types';
import { LIMITS } from '../bring';

const read = (content: string | Uint8Array, hint: SourceHint = {}, name = 'table.csv') =>
  readSource(
    { name, bytes: typeof content === 'string' ? new TextEncoder().encode(content) : content },
    hint,
    LIMITS,
  );

const faults = async (...parameters: Parameters<typeof read>) => {
  const { issues } = await read(...parameters);
  return issues.map(({ line, message }) => `${line ?? ''}:${message}`);
};

describe('how a table is written is guessed', () => {
  test.each([
    ['commas', 'a,b,1\nb,c,2\n', ','],
    ['semicolons around decimal commas', 'a;b;1,5\nb;c;2,5\n', ';'],
    ['tabs', 'a\tb c\t1\nb\tc d\t2\n', '\t'],
    ['bars', 'a|b, c|1\nb|c|2\n', '|'],
    ['spaces', 'a b 1\nb  c 2\n', ' '],
    ['commas among spaces', 'Bog moss,Crane fly,1\nCrane fly,Sedge,2\n', ','],
    ['semicolons between cells of commas', 'a;"x,y";1\nb;"z,w";2\n', ';'],
    ['one column', 'id\na\nb\n', ','],
  ])('%s', async (_, text, delimiter) => {
    expect((await read(text)).reading.delimiter).toBe(delimiter);
  });

  test.each([
    ['names in use', 'source,target\na,b\n', true],
    ['text over numbers', 'reed,depth\na,1\nb,2\n', true],
    ['text over dates', 'reed,seen on\na,2024-01-01\nb,2024-01-02\n', true],
    ['numbers at once', 'a,b,1\nb,c,2\n', false],
    ['ends that come again', 'ash,beech\nbeech,cedar\n', false],
    ['whole numbers alone', '1 2\n2 3\n', false],
    ['names in use over numbered nodes', 'from to\n1 2\n2 3\n', true],
  ])('whether there is a header: %s', async (_, text, header) => {
    expect((await read(text)).reading.header).toBe(header);
  });

  test('what is said about a file goes before every guess', async () => {
    const text = 'a;b,c;1\nb;c,d;2\n';
    const { reading, nodes, edges } = await read(text, {
      role: 'nodes',
      reading: { delimiter: ',', header: true, decimal: ',' },
    });
    expect(reading).toEqual({ encoding: 'utf-8', delimiter: ',', decimal: ',', header: true });
    expect(edges).toBeNull();
    expect(nodes?.columns).toEqual(['a;b', 'c;1']);
    const bytes = Uint8Array.from('id;name\n1;\u00e9\n', (letter) => letter.charCodeAt(0));
    const guessed = await read(bytes);
    expect(guessed.reading.encoding).toBe('windows-1252');
    expect(guessed.nodes?.preview[0]?.cells).toEqual(['1', 'é']);
    expect(await faults(bytes, { reading: { encoding: 'utf-8' } })).toEqual([
      expect.stringMatching(/^2:.*not UTF-8/),
    ]);
  });

  test.each([
    ['ends by name', 'caller,callee\na,b\n', 'edges'],
    ['ids by name', 'id,label\na,b\nb,c\n', 'nodes'],
    [
      'a person in every row once, and a date',
      'person,joined\nx,2024-01-01\ny,2024-01-02\n',
      'nodes',
    ],
    ['a person who comes again, and another', 'person,friend\nx,y\nx,z\ny,z\n', 'edges'],
    ['ends that come again, without names', 'x,y\nx,z\n', 'edges'],
    ['one column', 'x\ny\nz\n', 'nodes'],
  ])('what the rows are: %s', async (_, text, role) => {
    const { nodes, edges } = await read(text, {}, 'pasted text');
    expect([nodes !== null, edges !== null]).toEqual([role === 'nodes', role === 'edges']);
  });

  test('rows are read again and again, and only the first are held', async () => {
    const text = `a,b\n${Array.from({ length: 500 }, (_, k) => `${k},x`).join('\n')}`;
    const { nodes } = await read(text, { role: 'nodes' });
    expect([nodes?.rowCount, nodes?.preview.length]).toEqual([500, 50]);
    const lines = () => [...(nodes?.rows() ?? [])].map(({ line }) => line);
    expect(lines()).toEqual(Array.from({ length: 500 }, (_, k) => k + 2));
    expect(lines()).toEqual(lines());
  });

  test('a table whose header lacks the name of its first column is read', async () => {
    const { nodes } = await read('label,entry\n1,Ash,3\n2,Beech,4\n', { role: 'nodes' });
    expect(nodes?.columns).toEqual(['column 1', 'label', 'entry']);
    expect(nodes?.preview[1]).toEqual({ line: 3, cells: ['2', 'Beech', '4'] });
  });
});

describe('what is no table is refused in a plain sentence', () => {
  test.each([
    ['gzip', [0x1f, 0x8b, 8], /gzip/],
    ['a spreadsheet', [0x50, 0x4b, 3, 4], /spreadsheet/],
    ['a picture called .graphml', [0x89, 0x50, 0x4e, 0x47], /PNG/],
    ['a PDF', [0x25, 0x50, 0x44, 0x46, 0x2d], /PDF/],
    ['nothing', [], /empty/],
    ['blank lines', [10, 10, 13, 10, 32, 10], /empty/],
    ['bytes with NUL', [97, 44, 98, 10, 0, 1, 2], /NUL/],
  ])('%s', async (_, bytes, message) => {
    const found = await faults(Uint8Array.from(bytes), {}, 'x.graphml');
    const table = await faults(Uint8Array.from(bytes));
    expect(table.join('\n')).toMatch(message);
    expect(found.length).toBeGreaterThan(0);
  });

  test('a file one byte over the cap', async () => {
    const bytes = new Uint8Array(LIMITS.bytes + 1).fill(97);
    expect(await faults(bytes)).toEqual([
      expect.stringMatching(/52428801 bytes; at most 52428800/),
    ]);
  });

  test('too many columns', async () => {
    const wide = Array.from({ length: LIMITS.columns + 1 }, (_, k) => `c${k}`).join(',');
    expect(await faults(`${wide}\n`)).toEqual([expect.stringMatching(/10001 columns/)]);
  });

  test('half of a UTF-16 character at the end', async () => {
    expect(await faults(Uint8Array.of(0xff, 0xfe, 105, 0, 10, 0, 97))).toEqual([
      expect.stringMatching(/^2:.*UTF-16/),
    ]);
  });

  test('past two hundred problems the others are counted', async () => {
    const { issues, leftOut } = await read(`id,entry\n${'a\n'.repeat(300)}`, { role: 'nodes' });
    expect([issues.length, leftOut]).toEqual([200, 100]);
  });
});

describe('an adjacency matrix', () => {
  const matrix = (text: string) => read(text, { format: 'matrix' });

  test('is known by its labels, whatever their order and numbers', async () => {
    expect((await read(',b,a\na,1,0\nb,0,1\n')).format).toBe('matrix');
    expect((await read(',1,2,3\n1,0,1,0\n2,1,0,1\n3,0,1,0\n')).format).toBe('matrix');
    expect((await read('a,b,c\na,b,1\nb,c,2\n')).format).toBe('table');
  });

  test('gives the edge between rows and columns by label', async () => {
    const { edges } = await matrix(',b,a,c\na,5,0,0\nb,0,5,7\nc,7,0,0\n');
    expect([...(edges?.rows() ?? [])].map(({ cells }) => cells.join(' '))).toEqual([
      'a b 5',
      'b c 7',
    ]);
  });

  test.each([
    ['a column without a row', ',a,b\na,0,1\n', /no row “b”/],
    ['a row without a column', ',a,b\na,0,1\nb,1,0\nc,0,0\n', /no column “c”/],
    ['a row twice', ',a,b\na,0,1\na,1,0\nb,0,0\n', /already on line 2/],
    ['a name twice', ',a,a\na,0,1\na,1,0\n', /stands twice/],
    ['a column without a name', ',a,\na,0,1\nb,1,0\n', /has no name/],
    ['no names', '0,1\n1,0\n', /needs the names/],
    ['words in cells', ',a,b\na,0,near\nb,1,0\n', /“near” is no number/],
    ['a weight past all numbers', ',a,b\na,0,1e309\nb,1,0\n', /“1e309” is no number/],
    ['a ragged row', ',a,b\na,0\nb,1,0\n', /2 cells/],
  ])('with %s is refused', async (_, text, message) => {
    expect((await faults(text, { format: 'matrix' })).join('\n')).toMatch(message);
  });
});
