import type { Diagram } from './diagram';

/** Whether two whole diagrams can be matched at a cost of at most delta, all bars equal at the start. */
export class Feasibility {
  /** Partner of each bar of the side to be covered and of the other side, -1 for none. */
  private mate = new Int32Array(64);
  private otherMate = new Int32Array(64);
  /** Bar that first reached each bar of the other side in search number `seen`. */
  private from = new Int32Array(64);
  private seen = new Int32Array(64);
  private stack = new Int32Array(64);
  private search = 0;

  /** Two searches, each from the common bars: one covers the old diagram, one the new. */
  test(before: Diagram, after: Diagram, delta: number): boolean {
    this.ensure(Math.max(before.count, after.count));
    return this.covers(before, after, delta) && this.covers(after, before, delta);
  }

  private ensure(size: number): void {
    if (size <= this.mate.length) return;
    this.mate = new Int32Array(2 * size);
    this.otherMate = new Int32Array(2 * size);
    this.from = new Int32Array(2 * size);
    this.seen = new Int32Array(2 * size);
    this.stack = new Int32Array(2 * size);
    this.search = 0;
  }

  /** True if all changed bars of `side` that are longer than 2 delta find partners. */
  private covers(side: Diagram, other: Diagram, delta: number): boolean {
    for (let i = 0; i < side.count; i++) this.mate[i] = side.same[i]!;
    for (let i = 0; i < other.count; i++) this.otherMate[i] = other.same[i]!;
    // Longest first: one that has no partner is met early.
    for (let j = 0; j < side.changedCount; j++) {
      const i = side.changed[j]!;
      if (side.half(i) <= delta) break;
      if (this.mate[i]! < 0 && !this.augment(side, other, i, delta)) return false;
    }
    return true;
  }

  /**
   * An augmenting path from a bar, depth first and from each window to the shortest bar reached, the
   * way to the diagonal. It ends at a free bar, or takes the partner of a bar no longer than 2 delta,
   * which goes to the diagonal.
   */
  private augment(side: Diagram, other: Diagram, start: number, delta: number): boolean {
    const { stack, seen, from, otherMate } = this;
    const search = ++this.search;
    let height = 0;
    stack[height++] = start;
    while (height > 0) {
      const bar = stack[--height]!;
      const birth = side.births[bar]!;
      const death = side.deaths[bar]!;
      let shortest = Infinity;
      let v = other.firstWithin(birth, delta);
      for (; v < other.count && other.births[v]! - birth <= delta; v++) {
        if (seen[v] === search || Math.abs(death - other.deaths[v]!) > delta) continue;
        seen[v] = search;
        from[v] = bar;
        const partner = otherMate[v]!;
        const half = partner < 0 ? 0 : side.half(partner);
        if (half <= delta) {
          this.flip(v, start);
          return true;
        }
        stack[height++] = partner;
        if (half < shortest) shortest = half;
        else {
          stack[height - 1] = stack[height - 2]!;
          stack[height - 2] = partner;
        }
      }
    }
    return false;
  }

  /** Exchanges the steps of the path that ends at bar v of the other side. */
  private flip(end: number, start: number): void {
    const { mate, otherMate, from } = this;
    if (otherMate[end]! >= 0) mate[otherMate[end]!] = -1;
    for (let v = end; ;) {
      const bar = from[v]!;
      const next = mate[bar]!;
      mate[bar] = v;
      otherMate[v] = bar;
      if (bar === start) return;
      v = next;
    }
  }
}
