import type { Budget } from './budget';

/** The bars reached by a search, and a heap of those not expanded yet, the shortest on top. */
export class Frontier {
  /** Bars in the order in which they were reached, and half the length of each. */
  readonly bars: Int32Array;
  readonly halves: Float64Array;
  reached = 0;
  /** Places in `bars`; a binary heap by `halves`. */
  private readonly heap: Int32Array;
  private waiting = 0;

  constructor(budget: Budget, capacity: number) {
    this.bars = budget.int32(capacity);
    this.halves = budget.float64(capacity);
    this.heap = budget.int32(capacity);
  }

  release(budget: Budget): void {
    for (const array of [this.bars, this.halves, this.heap]) budget.release(array);
  }

  clear(): void {
    this.reached = this.waiting = 0;
  }

  /** @returns the place of the bar */
  reach(bar: number, half: number): number {
    const { heap, halves } = this;
    const place = this.reached++;
    this.bars[place] = bar;
    halves[place] = half;
    let at = this.waiting++;
    while (at > 0) {
      const above = (at - 1) >>> 1;
      if (halves[heap[above]!]! <= half) break;
      heap[at] = heap[above]!;
      at = above;
    }
    heap[at] = place;
    return place;
  }

  /** Takes the place of the shortest bar that waits, -1 if none does. */
  takeShortest(): number {
    if (this.waiting === 0) return -1;
    const { heap, halves } = this;
    const top = heap[0]!;
    const moved = heap[--this.waiting]!;
    const half = halves[moved]!;
    let at = 0;
    for (;;) {
      let child = 2 * at + 1;
      if (child >= this.waiting) break;
      if (child + 1 < this.waiting && halves[heap[child + 1]!]! < halves[heap[child]!]!) child++;
      if (halves[heap[child]!]! >= half) break;
      heap[at] = heap[child]!;
      at = child;
    }
    heap[at] = moved;
    return top;
  }
}
