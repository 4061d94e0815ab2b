import { Readable } from 'node:stream';
import { CsvError, parse } from 'csv-parse';
import { quoted, type IssueList } from './issues';
import { decodeUtf8, NotText } from './text';
import type { FormatLimits, SourceFile } from './types';

/** One row of a table. */
export interface TableRow {
  /** 1-based line on which the row begins. */
  readonly line: number;
  /** The cells of the asked columns, in the order asked for; a column that the file lacks is ''. */
  readonly cells: readonly string[];
}

export interface TableShape {
  readonly required: readonly string[];
  readonly optional: readonly string[];
}

interface Columns {
  /** Index in the file of every asked column, -1 where it is missing. */
  readonly indices: readonly number[];
  readonly width: number;
  readonly ignored: readonly string[];
}

/**
 * Reads a comma-separated table with a header, row by row; what is wrong goes to `issues`.
 * @param onIgnored receives the names of the columns that are read past
 */
export async function* readTable(
  file: SourceFile,
  shape: TableShape,
  limits: FormatLimits,
  issues: IssueList,
  onIgnored: (columns: readonly string[]) => void,
): AsyncGenerator<TableRow> {
  let columns: Columns | null = null;
  try {
    for await (const { line, cells } of records(file, limits)) {
      if (columns === null) {
        columns = readHeader(file.name, cells, shape, issues);
        if (columns === null) return;
        onIgnored(columns.ignored);
      } else if (cells.length !== columns.width) {
        issues.add({
          file: file.name,
          line,
          message: `This row has ${cells.length} cells, the header ${columns.width}. Add or remove commas, or put a cell that holds a comma in double quotes.`,
        });
      } else {
        yield { line, cells: columns.indices.map((index) => cells[index] ?? '') };
      }
    }
    if (columns === null) {
      issues.add({
        file: file.name,
        message: `The file is empty. It needs the header ${shape.required.join(',')} and a row for each entry.`,
      });
    }
  } catch (error) {
    addReadingIssue(file.name, error, limits, issues);
  }
}

async function* records(
  file: SourceFile,
  limits: FormatLimits,
): AsyncGenerator<{ line: number; cells: string[] }> {
  const parser = parse({
    bom: true,
    info: true,
    trim: true,
    skip_empty_lines: true,
    relax_column_count: true,
    record_delimiter: ['\r\n', '\n', '\r'],
    max_record_size: limits.lineCharacters,
  });
  const text = Readable.from(decodeUtf8(file));
  text.on('error', (error) => parser.destroy(error));
  text.pipe(parser);
  try {
    for await (const item of parser as AsyncIterable<{
      info: { lines: number };
      record: string[];
    }>) {
      const inside = item.record.reduce(
        (sum, cell) => sum + (cell.match(/\r\n|\n|\r/g)?.length ?? 0),
        0,
      );
      yield { line: item.info.lines - inside, cells: item.record };
    }
  } finally {
    text.destroy();
    parser.destroy();
  }
}

function readHeader(
  file: string,
  cells: readonly string[],
  shape: TableShape,
  issues: IssueList,
): Columns | null {
  const names = cells.map((name) => name.normalize('NFC').toLowerCase());
  const asked = [...shape.required, ...shape.optional];
  let wrong = false;
  for (const name of asked) {
    const count = names.filter((other) => other === name).length;
    const missing = count === 0 && shape.required.includes(name);
    if (!missing && count < 2) continue;
    wrong = true;
    issues.add({
      file,
      line: 1,
      field: name,
      message: missing
        ? `The header has no column ${quoted(name)}. The first line must name the columns: ${asked.join(',')}${shape.optional.length > 0 ? ` (${shape.optional.join(', ')} may be left out)` : ''}.`
        : `The column ${quoted(name)} stands ${count} times in the header. Keep one of them.`,
    });
  }
  if (wrong) return null;
  return {
    indices: asked.map((name) => names.indexOf(name)),
    width: cells.length,
    ignored: cells.filter((_, index) => !asked.includes(names[index] ?? '')),
  };
}

function addReadingIssue(
  file: string,
  error: unknown,
  limits: FormatLimits,
  issues: IssueList,
): void {
  if (error instanceof NotText) {
    issues.add({ file, line: error.line, message: error.message });
    return;
  }
  if (!(error instanceof CsvError)) throw error;
  const line = typeof error.lines === 'number' ? error.lines : undefined;
  issues.add({ file, line, message: csvSentence(error, limits) });
}

function csvSentence(error: CsvError, limits: FormatLimits): string {
  switch (error.code) {
    case 'CSV_QUOTE_NOT_CLOSED':
      return 'A double quote is opened and never closed. Close it, or double it ("") where it belongs to the text.';
    case 'CSV_MAX_RECORD_SIZE':
      return `A row is longer than ${limits.lineCharacters} characters. Look for a quote that is not closed, or for missing line ends.`;
    case 'CSV_INVALID_CLOSING_QUOTE':
    case 'INVALID_OPENING_QUOTE':
      return 'A double quote stands inside a cell. Put the whole cell in double quotes and double the quote ("").';
    default:
      return `The row cannot be read as comma-separated values (${error.code}). Save the table as CSV again.`;
  }
}
