import { IssueList } from '../issues';
import { isExport } from '../understanding/choices';
import { guessRole } from './guessRole';
import { isMatrix, matrixSource } from './matrixSource';
import { bodyOf, layoutOf, type TableLayout } from './tableBody';
import {
  PREVIEW_ROWS,
  type RawRow,
  type RawSource,
  type RawTable,
  type SourceBytes,
  type SourceHint,
  type SourceLimits,
  type TextReading,
} from './types';

/** Reads a delimited file as a table of nodes or edges, or as an adjacency matrix where it is one. */
export function tableSource(
  file: SourceBytes,
  reading: TextReading,
  hint: SourceHint,
  limits: SourceLimits,
): RawSource {
  const layout = layoutOf(file.bytes, reading, limits.lineCharacters);
  const blank = emptySource(file.name, reading);
  if (!layout) return withoutRecords(file, reading, limits, blank);
  const guessed = hint.format === undefined && !isWritten(layout.columns);
  if (hint.format === 'matrix' || (guessed && isMatrix(file.bytes, layout)))
    return matrixSource(file, layout, limits);
  if (layout.columns.length > limits.columns) {
    return {
      ...blank,
      issues: [
        {
          file: file.name,
          line: layout.firstLine,
          message: `There are ${layout.columns.length} columns; at most ${limits.columns} are read. Leave the others out.`,
        },
      ],
    };
  }
  const issues = new IssueList(limits.issues);
  const table = readBody(file, layout, limits, issues);
  const role = hint.role ?? guessRole(file.name, table);
  return {
    ...blank,
    nodes: role === 'nodes' ? table : null,
    edges: role === 'edges' ? table : null,
    dropped: layout.leadingLines > 0 ? [{ what: 'comment lines', count: layout.leadingLines }] : [],
    notes: notesOn(layout),
    issues: issues.listed,
    leftOut: issues.leftOut,
  };
}

/** Columns as an export has them, whose nodes may be called like its columns. */
const isWritten = (columns: readonly string[]): boolean =>
  isExport(columns) || (columns[0] === 'source' && columns[1] === 'target');

/** A source of which nothing could be read. */
export function emptySource(file: string, reading: TextReading): RawSource {
  return {
    file,
    format: 'table',
    reading,
    nodes: null,
    edges: null,
    directed: false,
    dropped: [],
    notes: [],
    issues: [],
    leftOut: 0,
  };
}

/** Nothing but faults, or nothing at all. */
function withoutRecords(
  file: SourceBytes,
  reading: TextReading,
  limits: SourceLimits,
  blank: RawSource,
): RawSource {
  const none = {
    reading,
    lineCharacters: limits.lineCharacters,
    columns: [],
    header: null,
    firstLine: 1,
    leadingLines: 0,
  };
  const issues = new IssueList(limits.issues);
  for (const { fault } of bodyOf(file.bytes, none)) {
    if (fault) issues.add({ file: file.name, ...fault });
  }
  if (!issues.any) {
    issues.add({
      file: file.name,
      message: 'The file is empty. It needs a row for each node or each edge.',
    });
  }
  return { ...blank, issues: issues.listed, leftOut: issues.leftOut };
}

/** Goes through every row once: counts them, keeps the first, and lists what is wrong. */
function readBody(
  { name, bytes }: SourceBytes,
  layout: TableLayout,
  limits: SourceLimits,
  issues: IssueList,
): RawTable {
  const preview: RawRow[] = [];
  let rowCount = 0;
  for (const { row, fault } of bodyOf(bytes, layout)) {
    if (fault) {
      issues.add({ file: name, ...fault });
      continue;
    }
    if (rowCount === limits.edgeRows) {
      issues.add({
        file: name,
        line: row.line,
        message: `There are more than ${limits.edgeRows} rows. Leave the weaker edges out.`,
      });
      break;
    }
    if (rowCount < PREVIEW_ROWS) preview.push(row);
    rowCount++;
  }
  return {
    columns: layout.columns,
    preview,
    rowCount,
    rows: () => firstRows(bytes, layout, rowCount),
    where: 'line',
  };
}

function* firstRows(bytes: Uint8Array, layout: TableLayout, count: number): Generator<RawRow> {
  let given = 0;
  for (const { row } of bodyOf(bytes, layout)) {
    if (!row) continue;
    if (given++ === count) return;
    yield row;
  }
}

function notesOn({ columns, header }: TableLayout): string[] {
  if (header === null) {
    return [
      `The first row is read as data, not as names of columns, so the columns are called ${columns.slice(0, 2).join(', ')}${columns.length > 2 ? ', …' : ''}.`,
    ];
  }
  const renamed = columns.filter((name, at) => name !== header[at]);
  if (renamed.length === 0) return [];
  return [
    `Columns without a name of their own are called by their position: ${renamed.slice(0, 10).join(', ')}${renamed.length > 10 ? ', …' : ''}.`,
  ];
}
