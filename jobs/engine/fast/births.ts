import type { Budget } from './budget';
import type { DimensionChanges } from './changes';

/** Births per block of the range maxima. */
const BLOCK = 16;
/** Runs of common births up to this much longer than the queue are walked over. */
const SHORT_RUN = 2 * BLOCK;

/**
 * The infinite part of the bottleneck distance of one dimension: births of both sides sorted and
 * matched in order, the largest difference. Births of one side that wait for a partner queue up; a
 * common birth passes the queue on by one place. So over a run of common births with c in the queue
 * the recorded births X are only shifted by c ranks, and the largest difference is a range maximum
 * of X[k] - X[k - c].
 */
export class InfiniteBirths {
  /** X: the recorded births, ascending, as values of f. */
  private readonly births: Float64Array;
  /** Number of recorded births below each rank. */
  private readonly bornAt: Int32Array;
  /** Per c, made when first needed: sparse table of the maxima of whole blocks of k. */
  private readonly tables: (Float64Array[] | undefined)[] = [];
  /** Births that wait, from `head` on. */
  private queue: Float64Array;
  private head = 0;
  private tail = 0;
  private largest = 0;

  /** @param ranks birth ranks of the recorded infinite bars, ascending; `value`: f by rank */
  constructor(
    ranks: Int32Array,
    private readonly value: Float64Array,
    private readonly budget: Budget,
  ) {
    this.births = budget.float64(ranks.length);
    ranks.forEach((rank, k) => (this.births[k] = value[rank]!));
    this.bornAt = budget.int32(value.length + 1);
    for (const rank of ranks) this.bornAt[rank + 1]!++;
    for (let r = 0; r < value.length; r++) this.bornAt[r + 1]! += this.bornAt[r]!;
    this.queue = budget.float64(256);
  }

  distance(changes: DimensionChanges): number {
    const { ranks, counts, rankCount } = changes;
    this.head = this.tail = this.largest = 0;
    let waiting = 0;
    let i = 0;
    for (let t = 0; t < rankCount; t++) {
      const rank = ranks[t]!;
      const next = this.bornAt[rank]!;
      if (waiting !== 0) this.passRun(i, next);
      i = next;
      const sign = Math.sign(counts[t]!);
      for (let n = Math.abs(counts[t]!); n > 0; n--) {
        // A removed birth is one of X and no longer common.
        if (sign < 0) i++;
        if (waiting * sign < 0) this.meet(this.value[rank]!);
        else this.wait(this.value[rank]!);
        waiting += sign;
      }
    }
    if (waiting !== 0) throw new Error('A swap changed the number of infinite bars.');
    return this.largest;
  }

  /** Common births X[from..to-1] pass the queue on. */
  private passRun(from: number, to: number): void {
    const { births } = this;
    const c = this.tail - this.head;
    if (to - from <= c + SHORT_RUN) {
      for (let k = from; k < to; k++) {
        this.meet(births[k]!);
        this.wait(births[k]!);
      }
      return;
    }
    for (let k = from; k < from + c; k++) this.meet(births[k]!);
    this.largest = Math.max(this.largest, this.rangeMaximum(from + c, to, c));
    this.head = this.tail = 0;
    for (let k = to - c; k < to; k++) this.wait(births[k]!);
  }

  private meet(birth: number): void {
    const gap = birth - this.queue[this.head++]!;
    if (gap > this.largest) this.largest = gap;
  }

  private wait(birth: number): void {
    if (this.tail === this.queue.length) this.makeRoom();
    this.queue[this.tail++] = birth;
  }

  private makeRoom(): void {
    const { queue, head, tail } = this;
    if (2 * (tail - head) > queue.length) {
      this.queue = this.budget.float64(queue.length * 2);
      this.budget.release(queue);
    }
    this.queue.set(queue.subarray(head, tail));
    this.tail -= head;
    this.head = 0;
  }

  /** Largest X[k] - X[k - c] for from <= k < to. */
  private rangeMaximum(from: number, to: number, c: number): number {
    const firstBlock = Math.ceil(from / BLOCK);
    const lastBlock = Math.floor(to / BLOCK);
    const rows = (this.tables[c] ??= this.makeTable(c));
    const level = 31 - Math.clz32(lastBlock - firstBlock);
    const row = rows[level]!;
    return Math.max(
      this.scan(from, firstBlock * BLOCK, c),
      row[firstBlock]!,
      row[lastBlock - (1 << level)]!,
      this.scan(lastBlock * BLOCK, to, c),
    );
  }

  private scan(from: number, to: number, c: number): number {
    const { births } = this;
    let largest = 0;
    for (let k = from; k < to; k++) {
      const gap = births[k]! - births[k - c]!;
      if (gap > largest) largest = gap;
    }
    return largest;
  }

  /** Row l holds at b the maximum over the blocks b .. b + 2^l - 1. */
  private makeTable(c: number): Float64Array[] {
    const blocks = Math.floor(this.births.length / BLOCK);
    const rows = [this.budget.float64(blocks)];
    for (let b = 0; b < blocks; b++) {
      rows[0]![b] = this.scan(Math.max(b * BLOCK, c), (b + 1) * BLOCK, c);
    }
    for (let width = 1; 2 * width <= blocks; width *= 2) {
      const below = rows[rows.length - 1]!;
      const row = this.budget.float64(blocks);
      for (let b = 0; b + 2 * width <= blocks; b++) {
        row[b] = Math.max(below[b]!, below[b + width]!);
      }
      rows.push(row);
    }
    return rows;
  }
}
