import { undefused } from '../csv';
import type { RawRow, RawTable } from '../sources/types';
import { hasValues } from './recordedTimes';
import type { PickedTable, PickedTables } from './tables';

/**
 * Gives back the cells that the writer of an export kept from being run as formulas. Only tables
 * that an export wrote are changed: a node table that carries values, and the edge table beside it.
 */
export function withoutDefusing(tables: PickedTables): PickedTables {
  const { nodes, edges } = tables;
  if (!nodes || nodes.source.format !== 'table' || !hasValues(nodes)) return tables;
  const ownEdges = edges?.source.format === 'table';
  return { ...tables, nodes: plain(nodes), edges: ownEdges ? plain(edges) : edges };
}

function plain(picked: PickedTable): PickedTable {
  const { table } = picked;
  const changed: RawTable = {
    ...table,
    preview: table.preview.map(plainRow),
    rows: () => plainRows(table.rows()),
  };
  return { ...picked, table: changed };
}

const plainRow = ({ line, cells }: RawRow): RawRow => ({ line, cells: cells.map(undefused) });

function* plainRows(rows: Iterable<RawRow>): Generator<RawRow> {
  for (const row of rows) yield plainRow(row);
}
