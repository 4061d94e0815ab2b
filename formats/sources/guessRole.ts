import { isDateLike, isNumberLike } from './cellKinds';
import { EDGE_WORDS, NODE_WORDS, named } from './columnWords';
import type { RawTable, TableRole } from './types';

/** Words that are ends of edges and nothing else. */
const CLEAR_SOURCES = EDGE_WORDS.source.filter((word) => word.length > 1 && word !== 'parent');

/** Guesses what the rows of a table are: by column names, then by the file's name, then by content. */
export function guessRole(file: string, { columns, preview }: RawTable): TableRole {
  const hasEnds =
    named(columns, EDGE_WORDS.source) !== null && named(columns, EDGE_WORDS.target) !== null;
  if (hasEnds && named(columns, CLEAR_SOURCES) !== null) return 'edges';
  if (/edge|link|arc|contact|interaction|tie/i.test(file) && columns.length >= 2) return 'edges';
  if (/node|vert/i.test(file) || columns.length < 2) return 'nodes';
  if (named(columns, [...NODE_WORDS.id, ...NODE_WORDS.entry]) !== null) return 'nodes';
  if (hasEnds) return 'edges';
  return roleByContent(preview.map(({ cells }) => cells));
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
