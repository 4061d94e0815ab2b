/** Whole numbers 0..2³²−1 one after the other, in room that doubles. */
export class GrowingNumbers {
  private values = new Uint32Array(256);
  length = 0;

  push(value: number): number {
    if (this.length === this.values.length) {
      const larger = new Uint32Array(2 * this.length);
      larger.set(this.values);
      this.values = larger;
    }
    this.values[this.length] = value;
    return this.length++;
  }

  at(index: number): number {
    return this.values[index] ?? 0;
  }

  set(index: number, value: number): void {
    this.values[index] = value;
  }
}
