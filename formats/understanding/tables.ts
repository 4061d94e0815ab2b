import { quoted, type IssueList } from '../issues';
import type { RawSource, RawTable } from '../sources/types';

/** A table and the name of its file. */
export interface PickedTable {
  readonly file: string;
  readonly source: RawSource;
  readonly table: RawTable;
}

export interface PickedTables {
  readonly nodes: PickedTable | null;
  readonly edges: PickedTable | null;
  /** Node tables of graph files and matrices beside a node table of its own: they only name nodes. */
  readonly naming: readonly PickedTable[];
}

/**
 * Which source gives the nodes and which the edges: a node table of its own goes before the nodes of
 * a graph file or matrix. Two tables for one part are an issue.
 */
export function pickTables(sources: readonly RawSource[], issues: IssueList): PickedTables {
  const nodeTables = sources.flatMap((source) => picked(source, source.nodes));
  const edgeTables = sources.flatMap((source) => picked(source, source.edges));
  const own = nodeTables.filter(({ source }) => source.format === 'table');
  const others = nodeTables.filter(({ source }) => source.format !== 'table');
  if (own.length > 1) tooMany('nodes', own, issues);
  if (own.length === 0 && others.length > 1) tooMany('nodes', others, issues);
  if (edgeTables.length > 1) tooMany('edges', edgeTables, issues);
  return {
    nodes: own[0] ?? others[0] ?? null,
    edges: edgeTables[0] ?? null,
    naming: own.length > 0 ? others : others.slice(1),
  };
}

const picked = (source: RawSource, table: RawTable | null): PickedTable[] =>
  table ? [{ file: source.file, source, table }] : [];

function tooMany(what: string, tables: readonly PickedTable[], issues: IssueList): void {
  const [first, second] = tables;
  issues.add({
    file: second?.file ?? '',
    message: `${quoted(first?.file ?? '')} holds ${what} already. Bring the ${what} in one file, or say that the rows of one file are something else.`,
  });
}

/**
 * Where the chosen columns stand in a table; -1 for those not chosen. A chosen column that is not
 * there is an issue.
 */
export function indicesOf<Name extends string>(
  { file, table }: PickedTable,
  chosen: Readonly<Record<Name, string | null>>,
  names: readonly Name[],
  issues: IssueList,
): Record<Name, number> {
  const known = table.columns.map((name) => name.normalize('NFC'));
  const indices = Object.create(null) as Record<Name, number>;
  for (const name of names) {
    const column = chosen[name];
    indices[name] = column === null ? -1 : known.indexOf(column.normalize('NFC'));
    if (column === null || indices[name] >= 0) continue;
    issues.add({
      file,
      field: name,
      message: `There is no column ${quoted(column)}. The columns are ${table.columns.slice(0, 20).join(', ')}. Choose another.`,
    });
  }
  return indices;
}

/** The cells of a column in the first rows; empty texts where there is no such column. */
export const cellsOf = ({ columns, preview }: RawTable, column: string): string[] => {
  const at = columns.indexOf(column);
  return preview.map(({ cells }) => cells[at] ?? '');
};
