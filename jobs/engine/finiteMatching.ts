import type { BarMatch, Bars } from './types';

const NONE = -1;

/** One of the two barcodes, and how its bars are matched. */
interface Side {
  readonly bars: Bars;
  /** Index of the partner on the other side, or -1: to the diagonal. */
  readonly partner: Int32Array;
}

/**
 * Bottleneck matching of finite bars as one monotone sweep. All equal bars start matched with each
 * other; every other bar longer than 2δ must be covered, longest first. An augmenting path ends at
 * a free bar or takes the partner of a bar no longer than 2δ, which goes to the diagonal. Where a
 * bar has none, δ rises to the least value that gives it one, and what is matched stays. Then the
 * other side is covered from the same matching: an augmenting path never uncovers the first side
 * (Mendelsohn, Dulmage, Some generalizations of the problem of distinct representatives, 1958).
 */
export class FiniteMatching {
  private readonly before: Side;
  private readonly after: Side;
  /** Matches found equal at the start: bar of `after` for each bar of `before`, or -1. */
  private readonly equal: Int32Array;
  private delta: number;

  /** @param floor a cost that is reached elsewhere, from which δ may start; 0 for none */
  constructor(before: Bars, after: Bars, floor: number) {
    this.before = { bars: before, partner: new Int32Array(before.births.length).fill(NONE) };
    this.after = { bars: after, partner: new Int32Array(after.births.length).fill(NONE) };
    this.equal = new Int32Array(before.births.length).fill(NONE);
    this.delta = floor;
    this.matchEqualBars();
  }

  /** The matches and the largest of their costs, which is the distance wherever it exceeds the floor. */
  solve(): { distance: number; matches: BarMatch[] } {
    this.cover(this.before, this.after);
    this.cover(this.after, this.before);
    this.restoreEqualBars();
    const matches: BarMatch[] = [];
    this.before.partner.forEach((swapped, recorded) => {
      const cost =
        swapped === NONE ? half(this.before.bars, recorded) : this.cost(recorded, swapped);
      matches.push({ recorded, swapped, cost });
    });
    this.after.partner.forEach((recorded, swapped) => {
      if (recorded === NONE)
        matches.push({ recorded, swapped, cost: half(this.after.bars, swapped) });
    });
    return { distance: matches.reduce((most, match) => Math.max(most, match.cost), 0), matches };
  }

  private cost(recorded: number, swapped: number): number {
    return distanceOf(this.before.bars, recorded, this.after.bars, swapped);
  }

  private link(recorded: number, swapped: number): void {
    this.before.partner[recorded] = swapped;
    this.after.partner[swapped] = recorded;
  }

  /** Both sides are taken in the order of (birth, death), so that equal bars meet as a multiset. */
  private matchEqualBars(): void {
    const left = order(this.before.bars);
    const right = order(this.after.bars);
    let [x, y] = [0, 0];
    while (x < left.length && y < right.length) {
      const [u, v] = [left[x]!, right[y]!];
      const [p, q] = [this.before.bars, this.after.bars];
      const difference = p.births[u]! - q.births[v]! || p.deaths[u]! - q.deaths[v]!;
      if (difference === 0) {
        this.link(u, v);
        this.equal[u] = v;
      }
      if (difference <= 0) x++;
      if (difference >= 0) y++;
    }
  }

  private cover(side: Side, other: Side): void {
    const uncovered = [...side.partner.keys()].filter((k) => side.partner[k] === NONE);
    uncovered.sort((x, y) => half(side.bars, y) - half(side.bars, x) || x - y);
    for (const bar of uncovered) {
      if (half(side.bars, bar) <= this.delta) break;
      if (side.partner[bar] === NONE) this.augment(side, other, bar);
    }
  }

  /**
   * Covers `start`, raising δ as little as possible: Prim's search for a path whose dearest step is
   * cheapest, over bars of `side`. `reach[v]` is the cheapest known way to bar v of the other side.
   * O(|side| |other|).
   */
  private augment(side: Side, other: Side, start: number): void {
    const size = other.bars.births.length;
    const reach = new Float64Array(size).fill(Infinity);
    const from = new Int32Array(size).fill(NONE);
    const settled = new Uint8Array(size);
    let [bar, end] = [start, NONE];
    // The bar among those reached that is cheapest to send to the diagonal.
    let dropped = start;
    for (;;) {
      if (half(side.bars, bar) < half(side.bars, dropped)) dropped = bar;
      if (half(side.bars, dropped) <= this.delta) break;
      end = NONE;
      for (let v = 0; v < size; v++) {
        if (settled[v] === 1) continue;
        const cost = distanceOf(side.bars, bar, other.bars, v);
        if (cost < reach[v]!) {
          reach[v] = cost;
          from[v] = bar;
        }
        if (end === NONE || reach[v]! < reach[end]!) end = v;
      }
      const step = end === NONE ? Infinity : reach[end]!;
      this.delta = Math.max(this.delta, Math.min(step, half(side.bars, dropped)));
      if (half(side.bars, dropped) <= this.delta) break;
      settled[end] = 1;
      if (other.partner[end] === NONE) break;
      bar = other.partner[end]!;
      end = NONE;
    }
    this.flip(side, other, start, from, end, dropped);
  }

  /** Exchanges matched and unmatched steps back to `start`, from a free bar `end` or a bar dropped. */
  private flip(
    side: Side,
    other: Side,
    start: number,
    from: Int32Array,
    end: number,
    dropped: number,
  ): void {
    const free = end !== NONE && other.partner[end] === NONE && from[end] !== NONE;
    let v = free && half(side.bars, dropped) > this.delta ? end : NONE;
    if (v === NONE) {
      v = side.partner[dropped]!;
      side.partner[dropped] = NONE;
      if (dropped === start) return;
    }
    for (;;) {
      const bar = from[v]!;
      const next = side.partner[bar]!;
      side.partner[bar] = v;
      other.partner[v] = bar;
      if (bar === start) return;
      v = next;
    }
  }

  /** Matches equal bars with each other again wherever their present partners can do without them at δ. */
  private restoreEqualBars(): void {
    for (let changed = true; changed;) {
      changed = false;
      this.equal.forEach((swapped, recorded) => {
        if (swapped === NONE || this.before.partner[recorded] === swapped) return;
        const left = this.after.partner[swapped]!;
        const right = this.before.partner[recorded]!;
        if (!this.canPair(left, right)) return;
        if (left !== NONE) this.before.partner[left] = right;
        if (right !== NONE) this.after.partner[right] = left;
        this.link(recorded, swapped);
        changed = true;
      });
    }
  }

  /** Whether bars left and right (or the diagonal) may be matched at δ. */
  private canPair(left: number, right: number): boolean {
    if (left === NONE) return right === NONE || half(this.after.bars, right) <= this.delta;
    if (right === NONE) return half(this.before.bars, left) <= this.delta;
    return this.cost(left, right) <= this.delta;
  }
}

function half(bars: Bars, k: number): number {
  return (bars.deaths[k]! - bars.births[k]!) / 2;
}

function distanceOf(left: Bars, x: number, right: Bars, y: number): number {
  return Math.max(
    Math.abs(left.births[x]! - right.births[y]!),
    Math.abs(left.deaths[x]! - right.deaths[y]!),
  );
}

function order(bars: Bars): number[] {
  return [...bars.births.keys()].sort(
    (x, y) => bars.births[x]! - bars.births[y]! || bars.deaths[x]! - bars.deaths[y]! || x - y,
  );
}
