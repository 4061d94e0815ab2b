import type { Budget } from './budget';
import { barKey } from './row';
import type { Scale } from './scale';
import { sortNumbers } from './sort';

/** What one swap does to the barcode of one dimension, with all that cancels taken out. */
export class DimensionChanges {
  /** Finite bars removed and added, as sorted keys (`barKey`), repeated by multiplicity. */
  removed: Float64Array;
  added: Float64Array;
  removedCount = 0;
  addedCount = 0;
  /** Changes of the number of infinite bars: ranks ascending, and the signed number of each. */
  readonly ranks: Int32Array;
  readonly counts: Int32Array;
  rankCount = 0;

  /** Collected so far: twice the key of a bar, plus 1 if it is added. */
  private pending: Float64Array;
  private pendingCount = 0;
  /** Signed number of infinite bars by birth rank, and the ranks at which it may not be zero. */
  private readonly births: Int32Array;
  private touched: Int32Array;
  private touchedCount = 0;

  constructor(
    private readonly budget: Budget,
    rankCount: number,
  ) {
    this.removed = budget.float64(64);
    this.added = budget.float64(64);
    this.pending = budget.float64(64);
    this.births = budget.int32(rankCount);
    this.touched = budget.int32(rankCount * 2 + 64);
    this.ranks = budget.int32(rankCount);
    this.counts = budget.int32(rankCount);
  }

  finite(key: number, sign: number): void {
    if (this.pendingCount === this.pending.length) this.growPending();
    this.pending[this.pendingCount++] = 2 * key + (sign > 0 ? 1 : 0);
  }

  infinite(rank: number, count: number): void {
    if (this.births[rank] === 0) {
      if (this.touchedCount === this.touched.length) this.growTouched();
      this.touched[this.touchedCount++] = rank;
    }
    this.births[rank]! += count;
  }

  /** Cancels what was collected, fills the public lists and begins anew. */
  settle(): void {
    this.settleFinite();
    this.settleInfinite();
  }

  get empty(): boolean {
    return this.removedCount + this.addedCount + this.rankCount === 0;
  }

  private settleFinite(): void {
    const { pending, pendingCount: count } = this;
    this.removedCount = this.addedCount = 0;
    this.pendingCount = 0;
    sortNumbers(pending, count);
    for (let i = 0; i < count;) {
      const key = Math.floor(pending[i]! / 2);
      let sum = 0;
      for (; i < count && Math.floor(pending[i]! / 2) === key; i++) {
        sum += pending[i]! % 2 === 0 ? -1 : 1;
      }
      for (; sum < 0; sum++) this.removed[this.removedCount++] = key;
      for (; sum > 0; sum--) this.added[this.addedCount++] = key;
    }
  }

  private settleInfinite(): void {
    const { births, touched, touchedCount } = this;
    this.rankCount = 0;
    this.touchedCount = 0;
    let kept = 0;
    for (let i = 0; i < touchedCount; i++) {
      if (births[touched[i]!] !== 0) touched[kept++] = touched[i]!;
    }
    sortNumbers(touched, kept);
    for (let i = 0; i < kept; i++) {
      const rank = touched[i]!;
      if (births[rank] === 0) continue;
      this.ranks[this.rankCount] = rank;
      this.counts[this.rankCount++] = births[rank]!;
      births[rank] = 0;
    }
  }

  private growPending(): void {
    const { budget, pending } = this;
    for (const old of [this.removed, this.added, pending]) budget.release(old);
    this.removed = budget.float64(pending.length * 2);
    this.added = budget.float64(pending.length * 2);
    this.pending = budget.float64(pending.length * 2);
    this.pending.set(pending);
  }

  private growTouched(): void {
    const { budget, touched } = this;
    this.touched = budget.int32(touched.length * 2);
    this.touched.set(touched);
    budget.release(touched);
  }
}

/** Collects the changes of one swap, per dimension 0..D, given by position. */
export class Changes {
  readonly dimensions: readonly DimensionChanges[];

  constructor(
    budget: Budget,
    dimensionCount: number,
    private readonly scale: Scale,
  ) {
    this.dimensions = Array.from(
      { length: dimensionCount },
      () => new DimensionChanges(budget, scale.value.length),
    );
  }

  /** A bar from one position to another is removed (-1) or added (+1); none if f is equal there. */
  finite(k: number, birth: number, death: number, sign: number): void {
    const { rank, value } = this.scale;
    if (rank[birth] === rank[death]) return;
    this.dimensions[k]!.finite(barKey(rank[birth]!, rank[death]!, value.length), sign);
  }

  /** An infinite bar born at a position is removed (-1) or added (+1). */
  infinite(k: number, birth: number, sign: number): void {
    this.dimensions[k]!.infinite(this.scale.rank[birth]!, sign);
  }
}
