import { IssueList, quoted } from '../issues';
import { isMissing, isNumber } from './cellKinds';
import { tableOf } from './rawTable';
import { bodyOf, type TableLayout } from './tableBody';
import type { RawRow, RawSource, SourceBytes, SourceLimits } from './types';

/** Rows that decide whether a table is a matrix. */
const LOOKED_AT = 20;

/** Whether the first cells of the rows are among the labels of the header, and most of the rest are numbers. */
export function isMatrix(bytes: Uint8Array, layout: TableLayout): boolean {
  const labels = columnLabels(layout);
  if (labels.length < 2 || layout.header?.slice(1).includes('') !== false) return false;
  const known = new Set(labels);
  if (known.size < labels.length) return false;
  let rows = 0;
  let wrong = 0;
  for (const { row } of bodyOf(bytes, layout)) {
    if (!row) continue;
    const [first = '', ...cells] = row.cells;
    if (!known.has(key(first))) return false;
    wrong += cells.filter((cell) => !isWeight(cell, layout)).length;
    if (++rows === LOOKED_AT) break;
  }
  return rows > 0 && wrong <= (rows * labels.length) / 4;
}

const key = (label: string): string => label.normalize('NFC');

/** Labels of the columns after the corner, in NFC. */
const columnLabels = ({ header }: TableLayout): string[] => (header ?? []).slice(1).map(key);

const isWeight = (cell: string, { reading }: TableLayout): boolean =>
  isMissing(cell) || isNumber(cell, reading.decimal);

const valueOf = (cell: string, { reading }: TableLayout): number =>
  isMissing(cell) ? 0 : Number(reading.decimal === ',' ? cell.replace(',', '.') : cell);

/**
 * Reads an adjacency matrix with labels on both sides. A cell that is empty or zero is no edge, any
 * other is the weight of one. A pair whose two cells agree is one edge; one whose cells differ gives
 * a row for each that is not zero, and the source is called directed.
 */
export function matrixSource(
  file: SourceBytes,
  layout: TableLayout,
  limits: SourceLimits,
): RawSource {
  const issues = new IssueList(limits.issues);
  const labels = columnLabels(layout);
  checkLabels(file.name, layout, limits, issues);
  const halves = issues.any ? null : readHalves(file, layout, issues);
  const good = halves !== null && !issues.any;
  const { asymmetric } = halves ?? { asymmetric: 0 };
  const written = (layout.header ?? []).slice(1);
  const edges = good
    ? tableOf(['source', 'target', 'weight'], () => matrixEdges(file, layout, halves), 'line')
    : null;
  if (edges && edges.rowCount > limits.edgeRows) {
    issues.add({
      file: file.name,
      message: `The matrix has ${edges.rowCount} edges; at most ${limits.edgeRows} are read. Empty the cells of the weaker ones.`,
    });
  }
  return {
    file: file.name,
    format: 'matrix',
    reading: layout.reading,
    nodes: good ? tableOf(['id'], () => labelRows(written, layout.firstLine), 'line') : null,
    edges,
    directed: asymmetric > 0,
    dropped: layout.leadingLines > 0 ? [{ what: 'comment lines', count: layout.leadingLines }] : [],
    notes: good ? notesOn(labels.length, asymmetric) : [],
    issues: issues.listed,
    leftOut: issues.leftOut,
  };
}

function notesOn(size: number, asymmetric: number): string[] {
  const read = `The table is read as an adjacency matrix of ${size} nodes; empty cells and zeros are no edges.`;
  return asymmetric === 0
    ? [`${read} It is symmetric.`]
    : [
        read,
        `${asymmetric} ${asymmetric === 1 ? 'pair has' : 'pairs have'} two different values in the two halves; each such pair is one edge with the larger of them.`,
      ];
}

function checkLabels(
  file: string,
  layout: TableLayout,
  limits: SourceLimits,
  issues: IssueList,
): void {
  const line = layout.firstLine;
  if (layout.header === null) {
    issues.add({
      file,
      line,
      message:
        'A matrix needs the names of the nodes in its first row and in its first column. Add them, or say that the first row names the columns.',
    });
    return;
  }
  const labels = columnLabels(layout);
  if (labels.length > limits.nodes) {
    issues.add({
      file,
      line,
      message: `There are ${labels.length} nodes; at most ${limits.nodes} can be stored. Leave the others out.`,
    });
  }
  const seen = new Set<string>();
  for (const [at, label] of labels.entries()) {
    const field = `column ${at + 2}`;
    if (label === '') issues.add({ file, line, field, message: 'The column has no name.' });
    else if (seen.has(label))
      issues.add({
        file,
        line,
        field,
        message: `The name ${quoted(label)} stands twice in the first row. Every node needs a name of its own.`,
      });
    seen.add(label);
  }
}

/** What both passes over the cells share. */
interface Halves {
  readonly columnOf: ReadonlyMap<string, number>;
  /** Value of every pair as the row read first has it, by pair(i, j); NaN until read. */
  readonly values: Float64Array;
  /** Pairs whose two cells differ. */
  readonly asymmetric: number;
}

/** Place of an unordered pair of distinct columns in the triangle below the diagonal. */
const pair = (a: number, b: number): number => {
  const [low, high] = a < b ? [a, b] : [b, a];
  return (high * (high - 1)) / 2 + low;
};

function readHalves(file: SourceBytes, layout: TableLayout, issues: IssueList): Halves {
  const labels = columnLabels(layout);
  const columnOf = new Map(labels.map((label, at) => [label, at]));
  const values = new Float64Array((labels.length * (labels.length - 1)) / 2).fill(NaN);
  const lineOf = new Map<number, number>();
  let asymmetric = 0;
  for (const { row, fault } of bodyOf(file.bytes, layout)) {
    if (fault) {
      issues.add({ file: file.name, ...fault });
      continue;
    }
    const i = ownColumn(file.name, row, columnOf, lineOf, issues);
    if (i === undefined) continue;
    lineOf.set(i, row.line);
    for (let j = 0; j < labels.length; j++) {
      const cell = row.cells[j + 1] ?? '';
      const value = cellValue(cell, layout);
      if (value === null) {
        addCell(file.name, row.line, layout.columns[j + 1] ?? '', cell, layout, issues);
      } else if (i !== j) {
        const at = pair(i, j);
        const earlier = values[at] ?? NaN;
        if (Number.isNaN(earlier)) values[at] = value;
        else if (earlier !== value) asymmetric++;
      }
    }
  }
  for (const [at, label] of labels.entries()) {
    if (lineOf.has(at) || issues.leftOut > 0) continue;
    issues.add({
      file: file.name,
      message: `The matrix has a column but no row ${quoted(label)}. A matrix has every node once in each; ${lineOf.size} of ${labels.length} rows are there.`,
    });
  }
  return { columnOf, values, asymmetric };
}

function ownColumn(
  file: string,
  { line, cells }: RawRow,
  columnOf: ReadonlyMap<string, number>,
  lineOf: ReadonlyMap<number, number>,
  issues: IssueList,
): number | undefined {
  const label = cells[0] ?? '';
  const at = columnOf.get(key(label));
  const earlier = at === undefined ? undefined : lineOf.get(at);
  if (at !== undefined && earlier === undefined) return at;
  issues.add({
    file,
    line,
    field: 'column 1',
    message:
      at === undefined
        ? `The matrix has a row but no column ${quoted(label)}. A matrix has every node once in each.`
        : `The row ${quoted(label)} stands already on line ${earlier}.`,
  });
  return undefined;
}

/** The weight in a cell, 0 for none, or null if it is no number. */
function cellValue(cell: string, layout: TableLayout): number | null {
  if (!isWeight(cell, layout)) return null;
  const value = valueOf(cell, layout);
  return Number.isFinite(value) ? value : null;
}

function addCell(
  file: string,
  line: number,
  field: string,
  cell: string,
  { reading }: TableLayout,
  issues: IssueList,
): void {
  issues.add({
    file,
    line,
    field,
    message: `${quoted(cell)} is no number with a decimal ${reading.decimal === ',' ? 'comma' : 'point'}. A cell holds a weight, or 0 or nothing where there is no edge.`,
  });
}

function* labelRows(labels: readonly string[], line: number): Generator<RawRow> {
  for (const label of labels) yield { line, cells: [label] };
}

/** One row for every edge: agreeing cells once, differing ones each, the diagonal as self loops. */
function* matrixEdges(
  file: SourceBytes,
  layout: TableLayout,
  { columnOf, values }: Halves,
): Generator<RawRow> {
  const labels = (layout.header ?? []).slice(1);
  const done = new Uint8Array(labels.length);
  for (const { row } of bodyOf(file.bytes, layout)) {
    if (!row) continue;
    const i = columnOf.get(key(row.cells[0] ?? '')) ?? 0;
    for (let j = 0; j < labels.length; j++) {
      const cell = row.cells[j + 1] ?? '';
      const value = valueOf(cell, layout);
      if (value === 0 || (done[j] === 1 && value === values[pair(i, j)])) continue;
      yield { line: row.line, cells: [row.cells[0] ?? '', labels[j] ?? '', cell] };
    }
    done[i] = 1;
  }
}
