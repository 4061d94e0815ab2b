import type { Budget } from './budget';

/** A growing list of integers: columns laid end to end. */
export class IntPool {
  /** Entries 0..length-1 are in use; the array is replaced when it grows. */
  data: Int32Array;
  length = 0;

  constructor(
    private readonly budget: Budget,
    capacity = 1024,
  ) {
    this.data = budget.int32(capacity);
  }

  /** Makes room for `extra` more entries. */
  reserve(extra: number): void {
    if (this.length + extra <= this.data.length) return;
    const old = this.data;
    this.data = this.budget.int32(Math.max(this.length + extra, old.length * 2));
    this.data.set(old);
    this.budget.release(old);
  }

  push(value: number): void {
    if (this.length === this.data.length) this.reserve(1);
    this.data[this.length++] = value;
  }
}
