import { isDateLike, isNumberLike } from './cellKinds';
import { EDGE_WORDS, NODE_WORDS, named } from './columnWords';
import type { RawTable, TableRole } from './types';

/** Words that are ends of edges and nothing else. */
const CLEAR_SOURCES = EDGE_WORDS.source.filter((word) => word.length > 1 && word !== 'parent');

const EDGE_FILE = /(?:^|[^a-z])(?:edge|link|arc|contact|interaction|tie)s?(?:[^a-z]|$)/i;
const NODE_FILE = /(?:^|[^a-z])(?:node|vertex|vertices)s?(?:[^a-z]|$)/i;

/** Guesses what the rows of a table are: by column names, then by the file's name, then by content. */
export function guessRole(file: string, { columns, preview }: RawTable): TableRole {
  const hasEnds =
    named(columns, EDGE_WORDS.source) !== null && named(columns, EDGE_WORDS.target) !== null;
  if (hasEnds && named(columns, CLEAR_SOURCES) !== null) return 'edges';
  if (columns.length < 2 || (!hasEnds && namesEachOnce({ columns, preview }))) return 'nodes';
  if (EDGE_FILE.test(file)) return 'edges';
  if (NODE_FILE.test(file)) return 'nodes';
  if (hasEnds) return 'edges';
  const rows = preview.map(({ cells }) => cells);
  // Lists of numbered nodes without names of columns are edges: 1 2.
  const unnamed = columns.every((name, at) => name === `column ${at + 1}`);
  if (unnamed && rows.every((cells) => cells.slice(0, 2).every((cell) => /^\d+$/.test(cell))))
    return 'edges';
  return roleByContent(rows);
}

/** Whether a column that is called like an id has a value of its own in every row. */
function namesEachOnce({ columns, preview }: Pick<RawTable, 'columns' | 'preview'>): boolean {
  const column = named(columns, NODE_WORDS.id);
  if (column === null) return false;
  const at = columns.indexOf(column);
  return new Set(preview.map(({ cells }) => cells[at])).size === preview.length;
}

/** Ends come again, from row to row or from column to column; a node has one row. */
function roleByContent(rows: readonly (readonly string[])[]): TableRole {
  const firsts = rows.map(([a = '']) => a);
  const seconds = rows.map(([, b = '']) => b);
  const data = seconds.filter(
    (cell) => isDateLike(cell) || (/[.,]/.test(cell) && isNumberLike(cell)),
  );
  if (data.length === rows.length) return 'nodes';
  const known = new Set(firsts);
  const repeats = known.size < firsts.length;
  return repeats || seconds.some((cell) => known.has(cell)) ? 'edges' : 'nodes';
}
