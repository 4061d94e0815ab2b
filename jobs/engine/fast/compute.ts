import { wholeRows } from '../choice';
import type { Control, PairChoice, PairResults, RowResults } from '../types';
import { BettiGap } from './betti-gap';
import { InfiniteBirths } from './births';
import { BottleneckSweep } from './bottleneck';
import { Changes, type DimensionChanges } from './changes';
import { QUIET, type Foundation } from './foundation';
import { Overlay } from './overlay';
import { RowComplex } from './row';
import { RowSweep } from './row-sweep';

/**
 * Computes pairs of the matrix and keeps its buffers between rows. After an exception (a limit, a
 * stop) the buffers are in no defined state and the object must be thrown away.
 */
export class MatrixComputation {
  /** What the last swap changes, per dimension. */
  readonly changes: Changes;
  private readonly row: RowComplex;
  private readonly overlay: Overlay;
  private readonly sweeps: readonly RowSweep[];
  private readonly bottlenecks: BottleneckSweep[] = [];
  private readonly gap: BettiGap;
  private readonly births: readonly InfiniteBirths[];

  constructor(private readonly foundation: Foundation) {
    const { tables, recorded, scale, bars, pulse, links, settled, zeroTests } = foundation;
    // Whatever an earlier computation held has gone with it, except for the store, which has grown.
    tables.budget.used = foundation.bytes + 4 * recorded.store.data.length;
    this.row = new RowComplex(tables, recorded, scale, pulse, links, zeroTests);
    this.changes = new Changes(tables.budget, tables.top, scale);
    this.overlay = new Overlay(
      tables,
      recorded,
      bars,
      this.row,
      this.changes,
      pulse,
      links,
      settled,
      zeroTests,
    );
    this.sweeps = bars.events.map(
      (events, k) => new RowSweep(scale, events, this.row.finite[k]!, this.row.alive[k]!),
    );
    this.births = bars.bars.map(
      ({ infinite }) => new InfiniteBirths(infinite, scale.value, tables.budget),
    );
    this.gap = new BettiGap(scale.value.length);
  }

  /** All pairs (p, q), q > p, of the given rows. */
  rows(rows: Uint32Array, control: Control): RowResults {
    const choice = wholeRows(rows, this.foundation.tables.nodeCount);
    return { rows: Uint32Array.from(rows), ...this.pairs(choice, control) };
  }

  /** The chosen pairs; the choice is in order. */
  pairs(choice: PairChoice, control: Control): PairResults {
    const { tables, pulse } = this.foundation;
    const pairCount = choice.partners.length;
    const distances = new Float64Array(tables.top * pairCount);
    const bettiGaps = new Int32Array(tables.top * pairCount);
    const results = { pairCount, distances, bettiGaps };
    pulse.begin(control);
    try {
      pulse.look();
      choice.rows.forEach((p, i) => this.fillRow(p, i, choice, results));
      pulse.look();
    } finally {
      pulse.begin(QUIET);
    }
    return results;
  }

  private fillRow(p: number, i: number, choice: PairChoice, results: PairResults): void {
    const { tables, pulse } = this.foundation;
    const { starts, partners } = choice;
    const end = starts[i + 1]!;
    if (starts[i] === end) return;
    this.beginRow(p);
    let q = p + 1;
    for (let pair = starts[i]!; pair < end; pair++) {
      for (; q < partners[pair]!; q++) this.advance(q);
      this.swap(p, q++);
      for (let k = 0; k < tables.top; k++) this.fillCell(k, pair, results);
      pulse.pairsDone = pair + 1;
      pulse.tick(200);
    }
  }

  private fillCell(k: number, pair: number, results: PairResults): void {
    const changes = this.changes.dimensions[k]!;
    if (changes.empty) return;
    const cell = k * results.pairCount + pair;
    results.distances[cell] = this.distance(k, changes);
    results.bettiGaps[cell] = this.gap.of(changes);
  }

  beginRow(p: number): void {
    this.row.take(p);
    this.overlay.beginRow(p);
    for (const sweep of this.sweeps) sweep.begin();
  }

  /** Leaves what the swap of positions p and q changes in `changes`; q takes every value after p. */
  swap(p: number, q: number): void {
    const { rank } = this.foundation.scale;
    // Equal values: the swap changes nothing.
    const moves = rank[p] !== rank[q];
    this.advance(q);
    if (moves) this.overlay.swap(p, q);
    for (let k = 0; k < this.sweeps.length; k++) {
      const changes = this.changes.dimensions[k]!;
      if (moves) this.sweeps[k]!.contribute(q, changes);
      changes.settle();
    }
  }

  /** Brings a row's sweep over q forward without computing the pair. */
  advance(q: number): void {
    this.overlay.advance(q);
    for (const sweep of this.sweeps) sweep.advance(q);
  }

  private distance(k: number, changes: DimensionChanges): number {
    const { bars, scale, tables, pulse } = this.foundation;
    const floor = changes.rankCount === 0 ? 0 : this.births[k]!.distance(changes);
    if (changes.removedCount + changes.addedCount === 0) return floor;
    let sweep = this.bottlenecks[k];
    if (sweep === undefined || sweep.mostAdded < changes.addedCount) {
      const most = 2 * changes.addedCount + 64;
      sweep?.release();
      sweep = new BottleneckSweep(bars.bars[k]!, scale.value, tables.budget, pulse, most);
      this.bottlenecks[k] = sweep;
    }
    return sweep.distance(changes, floor);
  }
}
