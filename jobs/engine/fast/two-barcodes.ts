import type { Budget } from './budget';
import type { DimensionChanges } from './changes';
import type { RankedBars } from './recorded-bars';
import { lowerBound } from './sort';

/** The recorded barcode (0) or the one that differs from it (1). */
export type Side = 0 | 1;

export const otherSide = (side: Side): Side => (side === 0 ? 1 : 0);

/**
 * The finite bars of one dimension before and after a swap, and a matching between them. Bars of a
 * side are numbered: index in the recorded barcode, behind them the added bars. A recorded bar that
 * is not removed is on both sides, and begins matched with itself: that is said by an old stamp, so
 * that nothing is copied or cleared from pair to pair.
 */
export class TwoBarcodes {
  /** Number of recorded bars, the number of the first added one. */
  readonly count: number;
  readonly births: Float64Array;
  readonly deaths: Float64Array;
  readonly addedBirths: Float64Array;
  readonly addedDeaths: Float64Array;
  readonly addedBirthRanks: Int32Array;
  readonly addedDeathRanks: Int32Array;
  addedCount = 0;
  removedCount = 0;
  /** The removed and the added bars. */
  readonly removedBars: Int32Array;
  readonly addedBars: Int32Array;
  /** Value `run` at the removed recorded bars. */
  private readonly removed: Int32Array;
  /** Partner of a bar in this run if the stamp is `run`; otherwise the bar itself. -1: diagonal. */
  private readonly mates: readonly [Int32Array, Int32Array];
  private readonly stamps: readonly [Int32Array, Int32Array];
  private run = 0;

  constructor(
    private readonly bars: RankedBars,
    private readonly value: Float64Array,
    budget: Budget,
    /** Most added bars; more of them need a larger object. */
    readonly mostAdded: number,
  ) {
    this.births = bars.births;
    this.deaths = bars.deaths;
    this.count = bars.births.length;
    const capacity = this.count + mostAdded;
    this.removed = budget.int32(this.count);
    this.removedBars = budget.int32(this.count);
    this.addedBars = budget.int32(mostAdded);
    this.addedBirths = budget.float64(mostAdded);
    this.addedDeaths = budget.float64(mostAdded);
    this.addedBirthRanks = budget.int32(mostAdded);
    this.addedDeathRanks = budget.int32(mostAdded);
    this.mates = [budget.int32(capacity), budget.int32(capacity)];
    this.stamps = [budget.int32(capacity), budget.int32(capacity)];
  }

  release(budget: Budget): void {
    const { removed, removedBars, addedBars, mates, stamps } = this;
    for (const array of [removed, removedBars, addedBars, ...mates, ...stamps]) {
      budget.release(array);
    }
    const { addedBirths, addedDeaths, addedBirthRanks, addedDeathRanks } = this;
    for (const array of [addedBirths, addedDeaths, addedBirthRanks, addedDeathRanks]) {
      budget.release(array);
    }
  }

  /** Every common bar matched with itself, the changed ones unmatched. */
  begin(changes: DimensionChanges): void {
    this.run++;
    this.markRemoved(changes);
    const { value, count } = this;
    this.addedCount = changes.addedCount;
    for (let i = 0; i < this.addedCount; i++) {
      const key = changes.added[i]!;
      const birth = Math.floor(key / value.length);
      const death = key % value.length;
      this.addedBirthRanks[i] = birth;
      this.addedDeathRanks[i] = death;
      this.addedBirths[i] = value[birth]!;
      this.addedDeaths[i] = value[death]!;
      this.addedBars[i] = count + i;
      this.setMate(1, count + i, -1);
    }
  }

  /** Equal bars lie side by side, so that repeats take the next one. */
  private markRemoved(changes: DimensionChanges): void {
    const { keys } = this.bars;
    this.removedCount = changes.removedCount;
    let index = -1;
    for (let i = 0; i < changes.removedCount; i++) {
      const key = changes.removed[i]!;
      index =
        i > 0 && changes.removed[i - 1] === key ? index + 1 : lowerBound(keys, keys.length, key);
      if (keys[index] !== key) throw new Error('A swap removed a bar that was not recorded.');
      this.removed[index] = this.run;
      this.removedBars[i] = index;
      this.setMate(0, index, -1);
    }
  }

  isRemoved(bar: number): boolean {
    return this.removed[bar] === this.run;
  }

  /** True if a recorded bar is on both sides and matched with itself. */
  isAtHome(bar: number): boolean {
    return this.stamps[0][bar] !== this.run && this.stamps[1][bar] !== this.run;
  }

  mate(side: Side, bar: number): number {
    return this.stamps[side][bar] === this.run ? this.mates[side][bar]! : bar;
  }

  setMate(side: Side, bar: number, mate: number): void {
    this.stamps[side][bar] = this.run;
    this.mates[side][bar] = mate;
  }

  join(side: Side, bar: number, other: number): void {
    this.setMate(side, bar, other);
    this.setMate(otherSide(side), other, bar);
  }

  birth(bar: number): number {
    return bar < this.count ? this.births[bar]! : this.addedBirths[bar - this.count]!;
  }

  death(bar: number): number {
    return bar < this.count ? this.deaths[bar]! : this.addedDeaths[bar - this.count]!;
  }

  /** Cost of the diagonal. */
  half(bar: number): number {
    return (this.death(bar) - this.birth(bar)) / 2;
  }
}
