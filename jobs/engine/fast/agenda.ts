import type { Budget } from './budget';

/** Things that begin to hold at a position q, for a sweep over q. Each is a number and an integer. */
export class Agenda {
  /** First item of each position, -1 if none; `next` chains the others. */
  readonly head: Int32Array;
  next: Int32Array;
  keys: Float64Array;
  codes: Int32Array;
  count = 0;

  constructor(
    private readonly budget: Budget,
    private readonly positions: number,
  ) {
    this.head = budget.none(positions);
    this.next = budget.int32(64);
    this.keys = budget.float64(64);
    this.codes = budget.int32(64);
  }

  clear(): void {
    this.head.fill(-1);
    this.count = 0;
  }

  /** Past the last position nothing ever holds. */
  add(position: number, key: number, code: number): void {
    if (position >= this.positions) return;
    if (this.count === this.next.length) this.grow();
    const item = this.count++;
    this.next[item] = this.head[position]!;
    this.head[position] = item;
    this.keys[item] = key;
    this.codes[item] = code;
  }

  private grow(): void {
    const { budget, next, keys, codes } = this;
    this.next = budget.int32(next.length * 2);
    this.keys = budget.float64(next.length * 2);
    this.codes = budget.int32(next.length * 2);
    this.next.set(next);
    this.keys.set(keys);
    this.codes.set(codes);
    for (const old of [next, keys, codes]) budget.release(old);
  }
}
