import { stringify } from 'csv-stringify/sync';

/** A cell of an exported table; null is written as an empty cell. */
export type Cell = string | number | null;

/** Rows that are written at a time. */
const BATCH = 512;

/**
 * The one writer of comma-separated values (RFC 4180, line feeds): the header, then the rows, as
 * pieces of text. Text cells that a spreadsheet program would run as a formula (beginning with
 * `=`, `+`, `-`, `@`, TAB or CR) get a leading apostrophe unless they are plain numbers; number
 * cells are written with all their digits.
 */
export async function* csvLines(
  header: readonly string[],
  rows: Iterable<readonly Cell[]> | AsyncIterable<readonly Cell[]>,
): AsyncGenerator<string> {
  let batch: (readonly Cell[])[] = [header];
  for await (const row of rows) {
    batch.push(row);
    if (batch.length < BATCH) continue;
    yield text(batch);
    batch = [];
  }
  if (batch.length > 0) yield text(batch);
}

const FORMULA = /^[=+\-@\t\r]/;
const PLAIN_NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;

function text(rows: readonly (readonly Cell[])[]): string {
  return stringify(rows.map((row) => row.map(defused)));
}

function defused(cell: Cell): string {
  if (cell === null) return '';
  if (typeof cell === 'number') return String(cell);
  return FORMULA.test(cell) && !PLAIN_NUMBER.test(cell) ? `'${cell}` : cell;
}
