import { MAX_DIMENSION } from '#contract/enums';
import type { StoredBars } from '../../db/codecs/barcode';
import type { Scale } from '#contract/enums';
import { arrivalsOf } from './arrivals';
import type { Cell } from '../../formats/csv';
import type { MatrixRow } from './matrix';

const DIMENSIONS = Array.from({ length: MAX_DIMENSION + 1 }, (_, k) => k);

export const PAIRS_HEADER: readonly string[] = [
  ...['node_a', 'node_b', 'entry_a', 'entry_b', 'bound'],
  ...DIMENSIONS.map((k) => `d${k}`),
  ...DIMENSIONS.map((k) => `g${k}`),
  'similarity',
];

export const BARCODES_HEADER: readonly string[] = ['dimension', 'birth', 'death'];

export interface PairsTable {
  readonly nodes: readonly {
    readonly nodeId: string;
    readonly entryRaw: string;
    readonly entry: number;
  }[];
  readonly scale: Scale;
  /** Chosen dimensions, ascending; those up to the largest are computed. */
  readonly dimensions: readonly number[];
  readonly rows: AsyncIterable<MatrixRow>;
}

/** The value of every arrival position on the scale; equal entries share a step of the rank. */
function valuesInOrder(entries: readonly number[], scale: Scale): number[] {
  if (scale === 'entry') return [...entries];
  let step = 0;
  return entries.map((entry, p) => (p > 0 && entry === entries[p - 1] ? step : ++step));
}

/** One row a pair, p then q in arrival order; distances in the unit of the scale. */
export async function* pairsTable(table: PairsTable): AsyncGenerator<Cell[]> {
  const { nodes, scale, dimensions, rows } = table;
  const { rowAt } = arrivalsOf(nodes.map(({ entry }) => entry));
  const ordered = Array.from(rowAt, (row) => nodes[row]).filter((node) => node !== undefined);
  const values = valuesInOrder(
    ordered.map(({ entry }) => entry),
    scale,
  );
  const computed = Math.max(...dimensions);
  for await (const row of rows) {
    const a = ordered[row.p];
    for (let q = row.p + 1; q < ordered.length; q++) {
      const b = ordered[q];
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

/** One row a bar, by dimension, birth and death; an empty death for a bar that never dies. */
export function* barcodesTable(barcode: readonly StoredBars[]): Generator<Cell[]> {
  for (const [dimension, { births, deaths }] of barcode.entries()) {
    for (const [k, birth] of births.entries()) {
      const death = deaths[k] ?? Infinity;
      yield [dimension, birth, death === Infinity ? null : death];
    }
  }
}
