import type { Cell } from './csv';

/** The dimensions that have a column, whether computed or not. */
const DIMENSIONS = [0, 1, 2, 3] as const;

/** Header of pairs.csv: d = bottleneck distance (exact), g = largest Betti-curve gap (bars). */
export const PAIRS_HEADER: readonly string[] = [
  ...['node_a', 'node_b', 'entry_a', 'entry_b', 'bound'],
  ...DIMENSIONS.map((k) => `d${k}`),
  ...DIMENSIONS.map((k) => `g${k}`),
  'similarity',
];

/** Header of barcodes.csv; the death is empty for a bar that never dies. */
export const BARCODES_HEADER: readonly string[] = ['dimension', 'birth', 'death'];

/** Results of the pairs (p, q), q = p + 1 .. n - 1, of one arrival position p. */
export interface MatrixRow {
  readonly p: number;
  /** Distance in dimension k of the pair (p, p + 1 + i), or NaN where k was not computed. */
  distance(k: number, i: number): number;
  bettiGap(k: number, i: number): number;
}

export interface ArrivingNode {
  /** As in nodes.csv. */
  readonly nodeId: string;
  readonly entryRaw: string;
  /** In the entry unit of the network. */
  readonly entry: number;
}

export interface PairsTable {
  /** In arrival order: by entry, equal entries by row of nodes.csv. */
  readonly nodes: readonly ArrivingNode[];
  readonly scale: 'entry' | 'rank';
  /** Chosen dimensions, ascending; those up to the largest are computed. */
  readonly dimensions: readonly number[];
  readonly rows: Iterable<MatrixRow> | AsyncIterable<MatrixRow>;
}

/** The value of every arrival position on the scale; equal entries share a step of the rank. */
function valuesInOrder(entries: readonly number[], scale: PairsTable['scale']): number[] {
  if (scale === 'entry') return [...entries];
  let step = 0;
  return entries.map((entry, p) => (p > 0 && entry === entries[p - 1] ? step : ++step));
}

/**
 * The rows below PAIRS_HEADER, one a pair, in the order of `rows` and then of q; bound and distances
 * in the unit of the scale, similarity in [0, 1]. Dimensions that were not computed are empty.
 */
export async function* pairsTable(table: PairsTable): AsyncGenerator<Cell[]> {
  const { nodes, scale, dimensions, rows } = table;
  const values = valuesInOrder(
    nodes.map(({ entry }) => entry),
    scale,
  );
  const computed = Math.max(...dimensions);
  for await (const row of rows) {
    const a = nodes[row.p];
    for (let q = row.p + 1; q < nodes.length; q++) {
      const b = nodes[q];
      if (!a || !b) continue;
      const i = q - row.p - 1;
      const bound = (values[q] ?? 0) - (values[row.p] ?? 0);
      const largest = Math.max(...dimensions.map((k) => row.distance(k, i)));
      yield [
        a.nodeId,
        b.nodeId,
        a.entryRaw,
        b.entryRaw,
        bound,
        ...DIMENSIONS.map((k) => (k <= computed ? row.distance(k, i) : null)),
        ...DIMENSIONS.map((k) => (k <= computed ? row.bettiGap(k, i) : null)),
        bound === 0 ? 1 : 1 - largest / bound,
      ];
    }
  }
}

/** Bars of one dimension; a death of Infinity never comes. */
export interface TableBars {
  readonly births: Float64Array;
  readonly deaths: Float64Array;
}

/** The rows below BARCODES_HEADER, by dimension, birth and death. */
export function* barcodesTable(barcode: readonly TableBars[]): Generator<Cell[]> {
  for (const [dimension, { births, deaths }] of barcode.entries()) {
    for (const [k, birth] of births.entries()) {
      const death = deaths[k] ?? Infinity;
      yield [dimension, birth, death === Infinity ? null : death];
    }
  }
}
