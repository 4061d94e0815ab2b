import { stringify } from 'csv-stringify/sync';

/** A cell of an exported table; null is written as an empty cell. */
export type Cell = string | number | null;

/** Rows that are written at a time. */
const BATCH = 512;

/**
 * The one writer of comma-separated values (RFC 4180, line feeds): the header, then the rows, as
 * pieces of text. Text cells that a spreadsheet program would run as a formula (beginning with
 * `=`, `+`, `-`, `@`, TAB or CR) get a leading apostrophe unless they are plain numbers; so do cells
 * that have such an apostrophe of their own, so that `undefused` gives back every cell. Number cells
 * are written with all their digits; cells with spaces at their ends are quoted.
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

/** The same for rows that are at hand. */
export function* csvPieces(
  header: readonly string[],
  rows: Iterable<readonly Cell[]>,
): Generator<string> {
  let batch: (readonly Cell[])[] = [header];
  for (const row of rows) {
    batch.push(row);
    if (batch.length < BATCH) continue;
    yield text(batch);
    batch = [];
  }
  if (batch.length > 0) yield text(batch);
}

const FORMULA = /^'*[=+\-@\t\r]/;
const DEFUSED = /^'+[=+\-@\t\r]/;
const PLAIN_NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
/** Cells that readers would trim, or whose carriage return would end the row. */
const QUOTED = /^\s|\s$|\r/;

function text(rows: readonly (readonly Cell[])[]): string {
  return stringify(
    rows.map((row) => row.map(defused)),
    { quoted_match: QUOTED },
  );
}

function defused(cell: Cell): string {
  if (cell === null) return '';
  if (typeof cell === 'number') return String(cell);
  return FORMULA.test(cell) && !PLAIN_NUMBER.test(cell) ? `'${cell}` : cell;
}

/** The text that a cell of the writer above stands for. */
export const undefused = (cell: string): string => (DEFUSED.test(cell) ? cell.slice(1) : cell);
