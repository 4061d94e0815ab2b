import { AugmentingSearch } from './augmenting-search';
import { BarIndex } from './bar-index';
import type { Budget } from './budget';
import type { DimensionChanges } from './changes';
import type { Pulse } from './pulse';
import type { RankedBars } from './recorded-bars';
import { TwoBarcodes, type Side } from './two-barcodes';

/**
 * The finite part of the bottleneck distance between the recorded barcode of one dimension and one
 * that differs by a few bars, in one monotone sweep of delta.
 *
 * Every bar that both sides have starts matched with itself. Each removed bar longer than 2 delta
 * must be matched: an augmenting path is sought. If there is none, the bars reached are a Hall
 * violator, hence delta has to rise, just until there is one; what is matched stays. Then the added
 * bars are covered in the same way from the same matching, which never uncovers a removed one
 * (Mendelsohn, Dulmage 1958). Delta rises only after a failed search, so the result is exact.
 */
export class BottleneckSweep {
  readonly mostAdded: number;
  private readonly barcodes: TwoBarcodes;
  private readonly index: BarIndex;
  private readonly search: AugmentingSearch;

  /** @param mostAdded most added bars; a larger set needs a larger sweep */
  constructor(
    bars: RankedBars,
    value: Float64Array,
    private readonly budget: Budget,
    pulse: Pulse,
    mostAdded: number,
  ) {
    this.mostAdded = mostAdded;
    this.barcodes = new TwoBarcodes(bars, value, budget, mostAdded);
    this.index = new BarIndex(bars, value, budget);
    this.search = new AugmentingSearch(this.barcodes, this.index, budget, pulse);
  }

  /** Gives its bytes back. */
  release(): void {
    this.barcodes.release(this.budget);
    this.index.release(this.budget);
    this.search.release(this.budget);
  }

  /** @param floor a known lower bound of the whole distance: nothing smaller is looked for. */
  distance(changes: DimensionChanges, floor: number): number {
    const { barcodes, search } = this;
    barcodes.begin(changes);
    search.delta = floor;
    this.raiseToNearest(0, barcodes.removedBars, barcodes.removedCount);
    this.raiseToNearest(1, barcodes.addedBars, barcodes.addedCount);
    this.coverAll(0, barcodes.removedBars, barcodes.removedCount);
    this.coverAll(1, barcodes.addedBars, barcodes.addedCount);
    return search.delta;
  }

  /** Lower bound: every bar goes at least to the nearest bar of the whole other side, or half its length. */
  private raiseToNearest(side: Side, bars: Int32Array, count: number): void {
    const { barcodes, search } = this;
    search.begin(side);
    for (let i = 0; i < count; i++) {
      const half = barcodes.half(bars[i]!);
      if (half <= search.delta) continue;
      search.delta = Math.max(search.delta, search.nearestOf(bars[i]!, half));
    }
  }

  /** Covers the given changed bars, longest first. */
  private coverAll(side: Side, bars: Int32Array, count: number): void {
    const { barcodes, search } = this;
    this.sortByLength(bars, count);
    for (let i = 0; i < count && barcodes.half(bars[i]!) > search.delta; i++) {
      if (barcodes.mate(side, bars[i]!) < 0) search.cover(side, bars[i]!);
    }
  }

  /** Longest first; insertion, since there are few. */
  private sortByLength(bars: Int32Array, count: number): void {
    const { barcodes } = this;
    for (let i = 1; i < count; i++) {
      const bar = bars[i]!;
      const half = barcodes.half(bar);
      let j = i - 1;
      for (; j >= 0 && barcodes.half(bars[j]!) < half; j--) bars[j + 1] = bars[j]!;
      bars[j + 1] = bar;
    }
  }
}
