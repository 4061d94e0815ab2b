import { IntPool } from './pool';

/** Smallest column first: the columns that wait for their turn. */
export class ColumnHeap extends IntPool {
  /** The smallest, -1 if the heap is empty. */
  peek(): number {
    return this.length === 0 ? -1 : this.data[0]!;
  }

  insert(column: number): void {
    this.push(column);
    const { data } = this;
    let i = this.length - 1;
    while (i > 0) {
      const up = (i - 1) >>> 1;
      if (data[up]! <= column) break;
      data[i] = data[up]!;
      i = up;
    }
    data[i] = column;
  }

  take(): number {
    const { data } = this;
    const smallest = data[0]!;
    const last = data[--this.length]!;
    const size = this.length;
    let i = 0;
    for (;;) {
      let child = 2 * i + 1;
      if (child >= size) break;
      if (child + 1 < size && data[child + 1]! < data[child]!) child++;
      if (data[child]! >= last) break;
      data[i] = data[child]!;
      i = child;
    }
    if (size > 0) data[i] = last;
    return smallest;
  }
}
