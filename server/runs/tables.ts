import { pairsTable, type ArrivingNode, type PairsTable } from '../../formats/matrixTable';
import type { Cell } from '../../formats/csv';
import { arrivalsOf } from './arrivals';

/** Results of the computed pairs of one arrival position p. */
export interface ComputedRow {
  readonly p: number;
  /** Positions q > p, ascending. */
  readonly partners: readonly number[];
  /** Distance in dimension k of the i-th of them, or NaN where k was not computed. */
  distance(k: number, i: number): number;
  bettiGap(k: number, i: number): number;
}

export interface ComputedPairs extends Pick<PairsTable, 'scale' | 'dimensions'> {
  /** In row order, as the database keeps them. */
  readonly nodes: readonly ArrivingNode[];
  readonly rows: AsyncIterable<ComputedRow>;
}

/** The rows of pairs.csv, one for each computed pair. */
export async function* pairsOfRows(table: ComputedPairs): AsyncGenerator<Cell[]> {
  const nodes = onScale(table);
  for await (const { p, partners, ...results } of table.rows) {
    const chosen = [p, ...partners].flatMap((position) => nodes[position] ?? []);
    // The values are on the scale already: the table of these nodes alone measures them as they are.
    const rows = [{ p: 0, ...results }];
    yield* pairsTable({ nodes: chosen, scale: 'entry', dimensions: table.dimensions, rows });
  }
}

/** The nodes in arrival order with their value on the scale; equal entries share a step of the rank. */
function onScale({ nodes, scale }: ComputedPairs): ArrivingNode[] {
  const { rowAt } = arrivalsOf(nodes.map(({ entry }) => entry));
  const arriving = Array.from(rowAt).flatMap((row) => nodes[row] ?? []);
  if (scale === 'entry') return arriving;
  let step = 0;
  let before: number | null = null;
  return arriving.map((node) => {
    if (node.entry !== before) step += 1;
    before = node.entry;
    return { ...node, entry: step };
  });
}
