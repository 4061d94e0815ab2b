import type { Control, RowResults } from '../types';
import { BettiGap } from './betti-gap';
import { InfiniteBirths } from './births';
import { BottleneckSweep } from './bottleneck';
import { Changes, type DimensionChanges } from './changes';
import { reduceLinks, type LinkColumns } from './links';
import { Overlay } from './overlay';
import { Pulse } from './pulse';
import { reduceRecorded, type Recorded } from './recorded';
import { readRecordedBars, type RecordedBars } from './recorded-bars';
import { RowComplex } from './row';
import { RowSweep } from './row-sweep';
import type { Scale } from './scale';
import type { Tables } from './tables';

/** The recorded complex, reduced: what every row of the matrix starts from. */
export interface Foundation {
  readonly tables: Tables;
  readonly scale: Scale;
  readonly recorded: Recorded;
  readonly bars: RecordedBars;
  /** Per dimension of columns; absent where the zero test would cost more than it saves. */
  readonly links: readonly (LinkColumns | undefined)[];
}

export function layFoundation(tables: Tables, scale: Scale, pulse: Pulse): Foundation {
  const recorded = reduceRecorded(tables, pulse);
  const bars = readRecordedBars(tables, recorded, scale);
  const links = tables.levels.map((_, d) =>
    d >= 2 && (globalThis as any).LINKS !== '0' ? reduceLinks(tables, d, pulse) : undefined,
  );
  return { tables, scale, recorded, bars, links };
}

/** Computes pairs of the matrix; keeps its buffers between rows. */
export class MatrixComputation {
  readonly changes: Changes;
  private readonly pulse: Pulse;
  private readonly row: RowComplex;
  private readonly overlay: Overlay;
  private readonly sweeps: readonly RowSweep[];
  private readonly bottlenecks: BottleneckSweep[] = [];
  private readonly gap: BettiGap;
  private readonly births: readonly InfiniteBirths[];

  constructor(
    private readonly foundation: Foundation,
    control: Control,
  ) {
    const { tables, recorded, scale, bars } = foundation;
    this.pulse = new Pulse(control);
    this.row = new RowComplex(
      tables,
      recorded,
      scale,
      this.pulse,
      (d) => d >= 2 && (globalThis as any).LINKS !== '0' && (globalThis as any).LINKS !== '1',
    );
    this.changes = new Changes(tables.budget, tables.top, scale);
    this.overlay = new Overlay(
      tables,
      recorded,
      bars,
      this.row,
      this.changes,
      this.pulse,
      foundation.links,
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
  rows(rows: Uint32Array): RowResults {
    const { nodeCount, top } = this.foundation.tables;
    let pairCount = 0;
    for (const p of rows) pairCount += nodeCount - 1 - p;
    const distances = new Float64Array(top * pairCount);
    const bettiGaps = new Int32Array(top * pairCount);
    let pair = 0;
    this.pulse.pairsDone = 0;
    for (const p of rows) {
      this.beginRow(p);
      for (let q = p + 1; q < nodeCount; q++, pair++) {
        this.swap(p, q);
        for (let k = 0; k < top; k++) {
          const changes = this.changes.dimensions[k]!;
          if (changes.empty) continue;
          distances[k * pairCount + pair] = this.distance(k, changes);
          bettiGaps[k * pairCount + pair] = this.gap.of(changes);
        }
        this.pulse.pairsDone = pair + 1;
        this.pulse.tick(200);
      }
    }
    this.pulse.look();
    return { rows: Uint32Array.from(rows), pairCount, distances, bettiGaps };
  }

  beginRow(p: number): void {
    this.row.take(p);
    this.overlay.beginRow();
    for (const sweep of this.sweeps) sweep.begin();
  }

  /** Leaves what the swap of positions p and q changes in `changes`; q ascends within a row. */
  swap(p: number, q: number): void {
    const { rank } = this.foundation.scale;
    this.overlay.advance(q);
    for (const sweep of this.sweeps) sweep.advance(q);
    // Equal values: the swap changes nothing.
    const moves = rank[p] !== rank[q];
    if (moves) this.overlay.swap(p, q);
    this.sweeps.forEach((sweep, k) => {
      const changes = this.changes.dimensions[k]!;
      if (moves) sweep.contribute(q, changes);
      changes.settle();
    });
  }

  private distance(k: number, changes: DimensionChanges): number {
    const { bars, scale, tables } = this.foundation;
    const floor = changes.rankCount === 0 ? 0 : this.births[k]!.distance(changes);
    if (changes.removedCount + changes.addedCount === 0) return floor;
    let sweep = this.bottlenecks[k];
    if (sweep === undefined || sweep.mostAdded < changes.addedCount) {
      const most = 2 * changes.addedCount + 64;
      sweep = new BottleneckSweep(bars.bars[k]!, scale.value, tables.budget, this.pulse, most);
      this.bottlenecks[k] = sweep;
    }
    return sweep.distance(changes, floor);
  }
}
