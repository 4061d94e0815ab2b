import { layFoundation, QUIET, type Foundation } from '../../engine/fast/foundation';
import { barKey, RowComplex } from '../../engine/fast/row';
import { arrivalOrder, orderGraph } from '../../engine/graph';
import type { Limits, Network, RowResults } from '../../engine/types';
import type { Memory } from '../../engine/fast/budget';
import { DiagramDistance } from './diagramDistance';
import { PairColumn } from './pairColumn';
import { PairOverlay, type BarReceiver } from './pairOverlay';
import { readRecordedPairs, readSuffixColumns } from './recordedPairs';
import { RowClasses } from './rowClasses';
import { SuffixList } from './suffixList';
import { SwappedDiagram } from './swappedDiagram';

/** The engine's tables and recorded order, without what its later steps add to them. */
export function layFirstForm(
  network: Network,
  maxDimension: number,
  limits: Limits,
  memory: Memory = 'own',
): Foundation {
  const { values, starts, earlier } = orderGraph(network, arrivalOrder(network.values));
  const ends = new Int32Array(2 * earlier.length);
  for (let v = 0; v < values.length; v++) {
    for (let k = starts[v]!; k < starts[v + 1]!; k++) {
      ends[2 * k] = v;
      ends[2 * k + 1] = earlier[k]!;
    }
  }
  const request = { values, ends, maxDimension, limits, memory, control: QUIET };
  return layFoundation({ ...request, zeroTests: 'never' });
}

/**
 * The matrix by the first form of the algorithm: one reduction of K, one of M per row; per pair the
 * two stars and all columns after q explicitly, whole barcodes, and distances of whole barcodes by
 * trial. Exact like the engine; what it is compared with. Betti-curve gaps are left out.
 */
export class FirstForm implements BarReceiver {
  /** Both barcodes of the last swap, by dimension 0..D. */
  readonly diagrams: readonly SwappedDiagram[];
  private readonly row: RowComplex;
  private readonly classes: readonly RowClasses[];
  private readonly suffix: readonly SuffixList[];
  private readonly column: PairColumn;
  private readonly overlay: PairOverlay;
  private readonly distance: DiagramDistance;

  constructor(private readonly foundation: Foundation) {
    const { tables, recorded, scale, pulse } = foundation;
    const dimensions = Array.from({ length: tables.top }, (_, k) => k);
    const noLinks = tables.levels.map(() => undefined);
    this.row = new RowComplex(tables, recorded, scale, pulse, noLinks, 'never');
    this.classes = dimensions.map((k) => new RowClasses(tables, recorded, this.row, scale, k));
    this.suffix = tables.levels.map((_, d) => {
      const none = { start: new Int32Array(tables.nodeCount + 1), columns: new Int32Array(0) };
      return new SuffixList(tables, d, d === 0 ? none : readSuffixColumns(tables, recorded, d));
    });
    this.diagrams = dimensions.map(
      (k) =>
        new SwappedDiagram(readRecordedPairs(tables, recorded, scale, k), scale, tables.budget),
    );
    this.column = new PairColumn(tables, recorded, this.row);
    this.overlay = new PairOverlay(tables, this.row, this.suffix, this.column, this);
    this.distance = new DiagramDistance(scale.value.every(Number.isInteger));
  }

  /** Distances of all pairs (p, q), q > p, of the given rows, laid out as the engine does. */
  rows(rows: Uint32Array): RowResults {
    const { tables } = this.foundation;
    const { nodeCount, top } = tables;
    const pairCount = rows.reduce((sum, p) => sum + nodeCount - 1 - p, 0);
    const distances = new Float64Array(top * pairCount);
    let pair = 0;
    for (const p of rows) {
      this.beginRow(p);
      for (let q = p + 1; q < nodeCount; q++, pair++) {
        this.swap(p, q);
        for (let k = 0; k < top; k++) distances[k * pairCount + pair] = this.distanceOf(k, p, q);
      }
    }
    const bettiGaps = new Int32Array(distances.length);
    return { rows: Uint32Array.from(rows), pairCount, distances, bettiGaps };
  }

  beginRow(p: number): void {
    this.row.take(p);
    for (const classes of this.classes) classes.read(p);
    for (const list of this.suffix) list.begin(p);
  }

  /** Leaves both barcodes in `diagrams`; q takes every value after p. */
  swap(p: number, q: number): void {
    for (const list of this.suffix) list.advance(q);
    const { rank } = this.foundation.scale;
    if (rank[p] === rank[q]) return;
    for (const diagram of this.diagrams) diagram.begin();
    this.overlay.swap(p, q);
    const { claimM, base } = this.column;
    for (let k = 0; k < this.diagrams.length; k++) {
      this.diagrams[k]!.assemble({ p, q }, this.classes[k]!, claimM[k]!, base);
    }
  }

  finite(k: number, birth: number, death: number): void {
    const { rank, value } = this.foundation.scale;
    if (rank[birth] === rank[death]) return;
    this.diagrams[k]!.addFinite(barKey(rank[birth]!, rank[death]!, value.length));
  }

  infinite(k: number, birth: number): void {
    this.diagrams[k]!.addInfinite(birth);
  }

  /** The bottleneck distance of the last swap in dimension k. */
  distanceOf(k: number, p: number, q: number): number {
    const { rank, value } = this.foundation.scale;
    if (rank[p] === rank[q]) return 0;
    const { before, after: swapped, infinitePart } = this.diagrams[k]!;
    const bound = value[rank[q]!]! - value[rank[p]!]!;
    return this.distance.of(before, swapped, bound, infinitePart);
  }
}
