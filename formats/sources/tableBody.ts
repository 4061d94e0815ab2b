import { declaredDelimiter, isComment } from './guessReading';
import { columnNames } from './rawTable';
import { recordsOf, type Found } from './records';
import type { RawRow, TextReading } from './types';

/** How the records of a file make a table. */
export interface TableLayout {
  readonly reading: TextReading;
  readonly lineCharacters: number;
  readonly columns: readonly string[];
  /** Cells of the header as written; null where the first row is data. */
  readonly header: readonly string[] | null;
  /** Line of the header, or of the first row. */
  readonly firstLine: number;
  /** Comment lines and a "sep=" line before it. */
  readonly leadingLines: number;
}

/** A row of a table, or what is wrong at a line. */
export type BodyRow =
  | { readonly row: RawRow; readonly fault: null }
  | { readonly row: null; readonly fault: { readonly line?: number; readonly message: string } };

/** Records that decide whether the rows are one cell longer than the header. */
const LOOKED_AT = 20;

/** Finds header and columns; null if the file holds no readable record. */
export function layoutOf(
  bytes: Uint8Array,
  reading: TextReading,
  lineCharacters: number,
): TableLayout | null {
  let leadingLines = 0;
  const rows: { line: number; cells: readonly string[] }[] = [];
  for (const found of recordsOf(bytes, { ...reading, lineCharacters })) {
    if (found.cells === null) continue;
    if (rows.length === 0 && isLeading(found.cells)) leadingLines++;
    else if (rows.push(found) > LOOKED_AT) break;
  }
  const [first, ...rest] = rows;
  if (!first) return null;
  // Tables of statistics programs may leave the column of row names without a name.
  const rowNames =
    reading.header &&
    rest.length > 0 &&
    rest.every(({ cells }) => cells.length === first.cells.length + 1 && cells.at(-1) !== '');
  const header = rowNames ? ['', ...first.cells] : first.cells;
  return {
    reading,
    lineCharacters,
    columns: columnNames(reading.header ? header : first.cells.map(() => '')),
    header: reading.header ? header : null,
    firstLine: first.line,
    leadingLines,
  };
}

const isLeading = (cells: readonly string[]): boolean =>
  isComment(cells) || declaredDelimiter(cells) !== null;

/** The rows below the header, and the faults between them; rows of empty cells alone are left out. */
export function* bodyOf(bytes: Uint8Array, layout: TableLayout): Generator<BodyRow> {
  const { reading, lineCharacters, columns, header, firstLine } = layout;
  for (const found of recordsOf(bytes, { ...reading, lineCharacters })) {
    if (found.line !== undefined && found.line < firstLine && found.cells !== null) continue;
    if (found.line === firstLine && header !== null && found.cells !== null) continue;
    const body = bodyRow(found, columns.length, header !== null);
    if (body) yield body;
  }
}

function bodyRow(found: Found, width: number, named: boolean): BodyRow | null {
  const { line, cells } = found;
  if (cells === null) return { row: null, fault: { line, message: found.message } };
  if (cells.length === width) {
    return cells.every((cell) => cell === '')
      ? null
      : { row: { line: found.line, cells }, fault: null };
  }
  if (cells.every((cell) => cell === '')) return null;
  if (cells.length > width && cells.slice(width).every((cell) => cell === ''))
    return { row: { line: found.line, cells: cells.slice(0, width) }, fault: null };
  const other = named ? 'the header' : 'the first row';
  return {
    row: null,
    fault: {
      line,
      message: `This row has ${cells.length} ${cells.length === 1 ? 'cell' : 'cells'}, ${other} ${width}. Add or remove cells, or put a cell that holds the delimiter in double quotes.`,
    },
  };
}
