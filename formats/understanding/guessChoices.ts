import { isDateLike, isMissing, isNumberLike } from '../sources/cellKinds';
import { EDGE_WORDS, named, NODE_WORDS, wordOf } from '../sources/columnWords';
import type { RawSource, RawTable } from '../sources/types';
import { IssueList } from '../issues';
import type { EdgeColumns, ImportChoices, NodeColumns, OrderKind, Question } from './choices';
import { timeColumnOf, openQuestions, type TimedColumn } from './openQuestions';
import { dayQuestion } from './ordering';
import { hasValues } from './recordedTimes';
import { cellsOf, pickTables, type PickedTable } from './tables';
import { TimeScale } from './timeScale';

/** Rows that the guesses about times look at. */
const LOOKED_AT = 20_000;

/** Guesses what each column is, where the order comes from and how times are read; and what has to be asked. */
export function guessChoices(sources: readonly RawSource[]): {
  choices: ImportChoices;
  questions: readonly Question[];
} {
  const { nodes, edges } = pickTables(sources, new IssueList());
  const columns = {
    nodes: nodes ? guessNodeColumns(nodes) : NO_NODE_COLUMNS,
    edges: edges ? guessEdgeColumns(edges.table) : NO_EDGE_COLUMNS,
  };
  const kind = guessOrder(columns);
  // An export says what its times mean, and writes all numbers with a point.
  const recorded = nodes !== null && hasValues(nodes);
  const commas = !recorded && sources.some(({ reading }) => reading.decimal === ',');
  const decimal = commas ? ',' : '.';
  const timed = recorded ? null : timeColumnOf({ nodes, edges }, { order: { kind }, columns });
  const scale = timed ? scaleOf(timed, decimal) : null;
  const choices: ImportChoices = {
    columns,
    order: { kind },
    dayOrder: scale?.dayOrder ?? null,
    years: 'numbers',
    decimal,
    tolerance: null,
    missing: 'refuse',
    weights: { kind: 'all' },
  };
  const questions = [
    ...(timed && scale ? dayQuestion(timed.file, timed.column, scale.ambiguous) : []),
    ...openQuestions(sources, choices),
  ];
  return { choices, questions };
}

const NO_NODE_COLUMNS: NodeColumns = {
  id: null,
  label: null,
  entry: null,
  earliest: null,
  latest: null,
};
const NO_EDGE_COLUMNS: EdgeColumns = { source: null, target: null, weight: null, time: null };

function guessNodeColumns(picked: PickedTable): NodeColumns {
  const { table } = picked;
  const exported =
    hasValues(picked) && ['id', 'entry'].every((name) => table.columns.includes(name));
  if (exported) return exportedColumns(table);
  const left = new Set(table.columns);
  const take = (column: string | null): string | null => {
    if (column !== null) left.delete(column);
    return column;
  };
  const byName = (words: readonly string[]) => named([...left], words);
  const earliest = take(byName(NODE_WORDS.earliest));
  const latest = take(byName(NODE_WORDS.latest));
  const id = take(byName(NODE_WORDS.id) ?? distinctColumn(table, left));
  const entry = take(
    byName(NODE_WORDS.entry.filter((word) => entryFits(table, left, word))) ??
      timeColumn(table, left),
  );
  const label = take(byName(NODE_WORDS.label) ?? worded(left, 'label'));
  return { id, label, entry, earliest, latest };
}

/** The columns of an export are known, whatever their texts look like. */
function exportedColumns({ columns }: RawTable): NodeColumns {
  const own = (name: string): string | null => (columns.includes(name) ? name : null);
  return {
    id: own('id'),
    label: own('label'),
    entry: own('entry'),
    earliest: own('earliest'),
    latest: own('latest'),
  };
}

/** A name that only may be the entry (t, order, day) is taken where its cells are times. */
function entryFits(table: RawTable, left: ReadonlySet<string>, word: string): boolean {
  const column = named([...left], [word]);
  return column === null || table.rowCount === 0 || shareOfTimes(table, column) >= 0.5;
}

const worded = (left: ReadonlySet<string>, part: string): string | null =>
  [...left].find((name) => wordOf(name).split('_').includes(part)) ?? null;

/** The first column whose cells are all there and all different. */
function distinctColumn(table: RawTable, left: ReadonlySet<string>): string | null {
  const hit = [...left].find((column) => {
    const cells = cellsOf(table, column);
    return new Set(cells).size === cells.length && !cells.includes('');
  });
  return hit ?? [...left][0] ?? null;
}

function shareOfTimes(table: RawTable, column: string): number {
  const known = cellsOf(table, column).filter((cell) => !isMissing(cell));
  if (known.length === 0) return 0;
  return known.filter((cell) => isDateLike(cell) || isNumberLike(cell)).length / known.length;
}

/** The first column of dates, else the first of numbers. */
function timeColumn(table: RawTable, left: ReadonlySet<string>): string | null {
  const dated = [...left].find((column) => {
    const known = cellsOf(table, column).filter((cell) => !isMissing(cell));
    return known.length > 0 && known.filter(isDateLike).length >= known.length * 0.8;
  });
  return dated ?? [...left].find((column) => shareOfTimes(table, column) >= 0.8) ?? null;
}

function guessEdgeColumns(table: RawTable): EdgeColumns {
  const left = new Set(table.columns);
  const take = (column: string | null): string | null => {
    if (column !== null) left.delete(column);
    return column;
  };
  const byName = (words: readonly string[]) => named([...left], words);
  let source = byName(EDGE_WORDS.source);
  let target = byName(EDGE_WORDS.target);
  if (source === null || target === null || source === target) {
    [source = null, target = null] = table.columns;
  }
  take(source);
  take(target);
  // A column that is called a weight is no time, whatever its numbers look like.
  const called = take(byName(EDGE_WORDS.weight));
  const time = take(byName(EDGE_WORDS.time) ?? edgeTime(table, left));
  const weight = called ?? take(unnamedWeight(table, left));
  return { source, target, weight, time };
}

/** A column of dates; or, without names, of whole numbers past a million that never fall. */
function edgeTime(table: RawTable, left: ReadonlySet<string>): string | null {
  return (
    [...left].find((column) => {
      const known = cellsOf(table, column).filter((cell) => !isMissing(cell));
      if (known.length === 0) return false;
      if (known.every(isDateLike)) return true;
      const values = known.map(Number);
      return values.every(
        (value, at) => Number.isInteger(value) && value >= 1e6 && value >= (values[at - 1] ?? 0),
      );
    }) ?? null
  );
}

/** In a table without names, the first column of numbers that is left. */
function unnamedWeight(table: RawTable, left: ReadonlySet<string>): string | null {
  return (
    [...left].find((column) => /^column \d+$/.test(column) && shareOfTimes(table, column) === 1) ??
    null
  );
}

function guessOrder({ nodes, edges }: ImportChoices['columns']): OrderKind {
  if (nodes.entry !== null) return 'column';
  return edges.time !== null ? 'first_edge' : 'rows';
}

function scaleOf({ file, table, column, others }: TimedColumn, decimal: '.' | ',') {
  const scale = new TimeScale(file, { decimal, dayOrder: null, years: 'numbers' });
  const places = [column, ...others].flatMap((name) =>
    name === null ? [] : [{ field: name, at: table.columns.indexOf(name) }],
  );
  let rows = 0;
  for (const { line, cells } of table.rows()) {
    if (++rows > LOOKED_AT) break;
    for (const { field, at } of places) scale.see(cells[at] ?? '', { line, field });
  }
  const ambiguous = scale.settle(new IssueList());
  return { dayOrder: scale.dayOrder, ambiguous };
}
