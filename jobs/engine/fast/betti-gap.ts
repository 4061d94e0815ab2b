import type { DimensionChanges } from './changes';
import { sortNumbers } from './sort';

/** Largest absolute difference of the Betti curves of one dimension before and after a swap. */
export class BettiGap {
  /** Change of the difference at each rank, zero between pairs. */
  private readonly steps: Int32Array;
  /** Ranks with a step, some more than once. */
  private ranks = new Int32Array(256);
  private count = 0;

  constructor(private readonly rankCount: number) {
    this.steps = new Int32Array(rankCount);
  }

  of(changes: DimensionChanges): number {
    const { removed, removedCount, added, addedCount } = changes;
    this.count = 0;
    for (let i = 0; i < removedCount; i++) this.bar(removed[i]!, -1);
    for (let i = 0; i < addedCount; i++) this.bar(added[i]!, 1);
    for (let i = 0; i < changes.rankCount; i++) this.step(changes.ranks[i]!, changes.counts[i]!);
    sortNumbers(this.ranks, this.count);
    let difference = 0;
    let largest = 0;
    for (let i = 0; i < this.count; i++) {
      const rank = this.ranks[i]!;
      difference += this.steps[rank]!;
      this.steps[rank] = 0;
      if (i + 1 < this.count && this.ranks[i + 1] === rank) continue;
      largest = Math.max(largest, Math.abs(difference));
    }
    return largest;
  }

  private bar(key: number, sign: number): void {
    this.step(Math.floor(key / this.rankCount), sign);
    this.step(key % this.rankCount, -sign);
  }

  private step(rank: number, height: number): void {
    if (this.count === this.ranks.length) {
      const larger = new Int32Array(this.count * 2);
      larger.set(this.ranks);
      this.ranks = larger;
    }
    this.steps[rank]! += height;
    this.ranks[this.count++] = rank;
  }
}
