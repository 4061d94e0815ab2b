/** The finite bars of one dimension, by (birth, death). */
export class Diagram {
  births: Float64Array;
  deaths: Float64Array;
  /** Index of the same bar on the other side, as a multiset; -1 where this bar has changed. */
  same: Int32Array;
  count = 0;
  /** The changed bars, longest first once they are sorted. */
  changed: Int32Array;
  changedCount = 0;

  constructor(capacity: number) {
    this.births = new Float64Array(capacity);
    this.deaths = new Float64Array(capacity);
    this.same = new Int32Array(capacity);
    this.changed = new Int32Array(capacity);
  }

  /** Makes room for `capacity` bars; what was held is lost. */
  ensure(capacity: number): void {
    if (capacity <= this.births.length) return;
    this.births = new Float64Array(2 * capacity);
    this.deaths = new Float64Array(2 * capacity);
    this.same = new Int32Array(2 * capacity);
    this.changed = new Int32Array(2 * capacity);
  }

  /** Collects the changed bars, longest first. */
  sortChanged(): void {
    const { changed } = this;
    this.changedCount = 0;
    for (let i = 0; i < this.count; i++) if (this.same[i]! < 0) changed[this.changedCount++] = i;
    changed
      .subarray(0, this.changedCount)
      .sort((one, other) => this.half(other) - this.half(one) || one - other);
  }

  /** Cost of the diagonal. */
  half(bar: number): number {
    return (this.deaths[bar]! - this.births[bar]!) / 2;
  }

  /** Index of the first bar born at most `delta` before `birth`; one subtraction decides. */
  firstWithin(birth: number, delta: number): number {
    const { births } = this;
    let [low, high] = [0, this.count];
    while (low < high) {
      const middle = (low + high) >>> 1;
      if (birth - births[middle]! > delta) low = middle + 1;
      else high = middle;
    }
    return low;
  }
}

/** L-infinity between bar x of one side and bar y of the other. */
export function costOf(one: Diagram, x: number, other: Diagram, y: number): number {
  return Math.max(
    Math.abs(one.births[x]! - other.births[y]!),
    Math.abs(one.deaths[x]! - other.deaths[y]!),
  );
}
