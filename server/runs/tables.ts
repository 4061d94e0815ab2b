import { pairsTable, type ArrivingNode, type PairsTable } from '../../formats/matrixTable';
import type { Cell } from '../../formats/csv';
import { arrivalsOf } from './arrivals';

/** The rows of pairs.csv of nodes that are given in row order, as the database keeps them. */
export function pairsOfRows(table: PairsTable): AsyncGenerator<Cell[]> {
  const { rowAt } = arrivalsOf(table.nodes.map(({ entry }) => entry));
  const nodes = Array.from(rowAt, (row) => table.nodes[row]).filter(
    (node): node is ArrivingNode => node !== undefined,
  );
  return pairsTable({ ...table, nodes });
}
