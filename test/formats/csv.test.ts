import { expect, test } from 'vitest';
import { parse } from 'csv-parse/sync';
import { csvLines, type Cell } from '../../formats/csv';

async function written(header: string[], rows: Cell[][]): Promise<string> {
  let text = '';
  for await (const piece of csvLines(header, rows)) text += piece;
  return text;
}

test('formula cells are defused and numbers are left alone', async () => {
  const cells = ['=HYPERLINK("x")', '+cmd', '-1.5', '@a', '\tb', '+2', -1.5, null, 'plain'];
  const [, row] = parse(
    await written(
      cells.map((_, k) => `c${k}`),
      [cells],
    ),
  );
  expect(row).toEqual([
    '\'=HYPERLINK("x")',
    "'+cmd",
    '-1.5',
    "'@a",
    "'\tb",
    '+2',
    '-1.5',
    '',
    'plain',
  ]);
});

test('a cell with commas, quotes and line ends comes back whole', async () => {
  const cell = 'a, "b"\nc';
  expect(parse(await written(['x'], [[cell]]))).toEqual([['x'], [cell]]);
});

test('numbers are written with all their digits', async () => {
  expect(await written(['x'], [[0.1 + 0.2], [1e21], [5e-324]])).toBe(
    'x\n0.30000000000000004\n1e+21\n5e-324\n',
  );
});

test('many rows are written in order', async () => {
  const rows = Array.from({ length: 2000 }, (_, k) => [k]);
  expect(await written(['k'], rows)).toBe(`k\n${rows.join('\n')}\n`);
});
