import type { Budget } from './budget';
import type { IntPool } from './pool';

/**
 * A column under reduction: a set of rows over F2 with fast symmetric difference and fast maximum.
 * Two levels: a bit per row, and above it a bit per word that may be non-zero, so that the maximum
 * is found without walking over empty words. Between reductions it is empty.
 */
export class RowSet {
  /** Bit r & 31 of words[r >> 5]: row r is in the set. */
  private readonly words: Int32Array;
  /** Bit w & 31 of summary[w >> 5]: words[w] may be non-zero (never clear while it is). */
  private readonly summary: Int32Array;
  /** No summary word above this one is non-zero. */
  private hint = -1;

  constructor(budget: Budget, size: number) {
    this.words = budget.int32(((size >>> 5) | 31) + 1);
    this.summary = budget.int32((size >>> 10) + 1);
  }

  toggle(row: number): void {
    const word = row >>> 5;
    this.words[word]! ^= 1 << (row & 31);
    const above = word >>> 5;
    this.summary[above]! |= 1 << (word & 31);
    if (above > this.hint) this.hint = above;
  }

  /** Toggles rows data[from..to-1]. */
  toggleAll(data: Int32Array, from: number, to: number): void {
    const { words, summary } = this;
    let { hint } = this;
    for (let i = from; i < to; i++) {
      const row = data[i]!;
      const word = row >>> 5;
      words[word]! ^= 1 << (row & 31);
      const above = word >>> 5;
      summary[above]! |= 1 << (word & 31);
      if (above > hint) hint = above;
    }
    this.hint = hint;
  }

  /** The largest row of the set, -1 if it is empty. */
  top(): number {
    const { words, summary } = this;
    for (let above = this.hint; above >= 0; above--) {
      let mask = summary[above]!;
      while (mask !== 0) {
        const bit = 31 - Math.clz32(mask);
        const word = (above << 5) | bit;
        const value = words[word]!;
        if (value !== 0) {
          this.hint = above;
          summary[above] = mask;
          return (word << 5) | (31 - Math.clz32(value));
        }
        mask &= ~(1 << bit);
      }
      summary[above] = 0;
    }
    this.hint = -1;
    return -1;
  }

  /** Moves the set into `pool`, largest row first, and leaves it empty. */
  drain(pool: IntPool): void {
    const { words, summary } = this;
    for (let above = this.hint; above >= 0; above--) {
      let mask = summary[above]!;
      while (mask !== 0) {
        const bit = 31 - Math.clz32(mask);
        const word = (above << 5) | bit;
        let value = words[word]!;
        pool.reserve(32);
        while (value !== 0) {
          const low = 31 - Math.clz32(value);
          pool.data[pool.length++] = (word << 5) | low;
          value &= ~(1 << low);
        }
        words[word] = 0;
        mask &= ~(1 << bit);
      }
      summary[above] = 0;
    }
    this.hint = -1;
  }
}
