import type { Budget } from './budget';
import type { DimensionChanges } from './changes';
import type { Pulse } from './pulse';
import type { RankedBars } from './recorded-bars';
import { lowerBound } from './sort';

/**
 * The finite part of the bottleneck distance between the recorded barcode of one dimension and one
 * that differs by a few bars, in one monotone sweep of delta.
 *
 * Every bar that both sides have starts matched with itself. Each removed bar longer than 2 delta
 * must be matched: an augmenting path is sought, which may end at a free bar or by taking the
 * partner of a bar no longer than 2 delta, which then goes to the diagonal. If there is none, the
 * bars reached are a Hall violator, hence delta has to rise, just until there is one; what is
 * matched stays. Then the added bars are covered in the same way from the same matching, which never
 * uncovers a removed one (Mendelsohn, Dulmage 1958). Delta rises only after a failed search, so the
 * result is exact.
 *
 * Bars of a side are numbered: index in the recorded barcode, behind them the added bars. A recorded
 * bar that is not removed is on both sides.
 */
export class BottleneckSweep {
  private readonly count: number;
  /** Value `run` at the removed recorded bars. */
  private readonly removed: Int32Array;
  /** Partner of a bar in this run if the stamp is `run`; otherwise the bar itself. -1: diagonal. */
  private readonly mates: readonly [Int32Array, Int32Array];
  private readonly mateStamps: readonly [Int32Array, Int32Array];
  /** Value `search` at the bars of the other side reached in this search, and whence. */
  private readonly seen: Int32Array;
  private readonly from: Int32Array;
  /** Bars of the searching side reached in this search. */
  private readonly frontier: Int32Array;
  /** Half the length of each. */
  private readonly halves: Float64Array;
  private readonly capacity: number;
  /** The removed and the added bars, by falling length while they are covered. */
  private readonly order: Int32Array;
  private readonly added: Int32Array;
  private run = 0;
  private search = 0;
  private delta = 0;
  /** 0 while removed bars are covered (searching from the old side), 1 while added ones are. */
  private side: 0 | 1 = 0;
  private addedBirths = new Float64Array(0);
  private addedDeaths = new Float64Array(0);
  private addedCount = 0;
  private reached = 0;

  constructor(
    private readonly bars: RankedBars,
    private readonly value: Float64Array,
    budget: Budget,
    private readonly pulse: Pulse,
    /** Most added bars; a larger set needs a larger sweep. */
    readonly mostAdded: number,
  ) {
    this.count = bars.births.length;
    this.capacity = this.count + mostAdded;
    this.removed = budget.int32(this.count);
    this.mates = [budget.int32(this.capacity), budget.int32(this.capacity)];
    this.mateStamps = [budget.int32(this.capacity), budget.int32(this.capacity)];
    this.seen = budget.int32(this.capacity);
    this.from = budget.int32(this.capacity);
    this.halves = budget.float64(this.capacity);
    this.frontier = budget.int32(this.capacity);
    this.order = budget.int32(this.capacity);
    this.added = budget.int32(mostAdded);
  }

  /** Gives its bytes back. */
  release(budget: Budget): void {
    const arrays = [this.removed, this.seen, this.from, this.frontier, this.order, this.added];
    for (const array of [...arrays, ...this.mates, ...this.mateStamps, this.halves]) {
      budget.release(array);
    }
  }

  /** @param floor a known lower bound of the whole distance: nothing smaller is looked for. */
  distance(changes: DimensionChanges, floor: number): number {
    this.run++;
    this.delta = floor;
    this.markRemoved(changes);
    this.takeAdded(changes);
    const { order, added } = this;
    this.search++;
    this.side = 0;
    this.raiseToNearest(order, changes.removedCount);
    this.side = 1;
    this.raiseToNearest(added, this.addedCount);
    this.side = 0;
    this.coverAll(order, changes.removedCount);
    this.side = 1;
    this.coverAll(added, this.addedCount);
    return this.delta;
  }

  /** Lower bound: every bar goes at least to the nearest bar of the whole other side, or half its length. */
  private raiseToNearest(bars: Int32Array, count: number): void {
    for (let i = 0; i < count; i++) {
      const half = this.half(bars[i]!);
      if (half > this.delta) this.delta = Math.max(this.delta, this.nearest(bars[i]!, half));
    }
  }

  /** Covers the given changed bars, longest first. */
  private coverAll(bars: Int32Array, count: number): void {
    for (let i = 1; i < count; i++) {
      const bar = bars[i]!;
      const half = this.half(bar);
      let j = i - 1;
      for (; j >= 0 && this.half(bars[j]!) < half; j--) bars[j + 1] = bars[j]!;
      bars[j + 1] = bar;
    }
    for (let i = 0; i < count && this.half(bars[i]!) > this.delta; i++) {
      if (this.mate(this.side, bars[i]!) < 0) this.cover(bars[i]!);
    }
  }

  /** Puts the removed bars into `order`. Equal bars lie side by side, so that repeats take the next one. */
  private markRemoved(changes: DimensionChanges): void {
    const { keys } = this.bars;
    let index = -1;
    for (let i = 0; i < changes.removedCount; i++) {
      const key = changes.removed[i]!;
      index =
        i > 0 && changes.removed[i - 1] === key ? index + 1 : lowerBound(keys, keys.length, key);
      if (keys[index] !== key) throw new Error('A swap removed a bar that was not recorded.');
      this.removed[index] = this.run;
      this.setMate(0, index, -1);
      this.order[i] = index;
    }
  }

  private takeAdded(changes: DimensionChanges): void {
    const { value, count } = this;
    this.addedCount = changes.addedCount;
    if (this.addedBirths.length < this.addedCount) {
      this.addedBirths = new Float64Array(this.addedCount * 2);
      this.addedDeaths = new Float64Array(this.addedCount * 2);
    }
    for (let i = 0; i < this.addedCount; i++) {
      const key = changes.added[i]!;
      this.addedBirths[i] = value[Math.floor(key / value.length)]!;
      this.addedDeaths[i] = value[key % value.length]!;
      this.setMate(1, count + i, -1);
      this.added[i] = count + i;
    }
  }

  /** Makes sure that `root` is matched or short, raising delta as far as that takes. */
  private cover(root: number): void {
    if (this.half(root) <= this.delta) return;
    this.search++;
    this.frontier[0] = root;
    this.halves[0] = this.half(root);
    this.reached = 1;
    for (let next = 0; ;) {
      for (; next < this.reached; next++) {
        this.bringShortest(next);
        if (this.expand(this.frontier[next]!)) return;
      }
      this.delta = this.nextDelta();
      for (let i = 0; i < this.reached; i++) {
        const bar = this.frontier[i]!;
        if (this.half(bar) > this.delta) continue;
        this.giveAway(bar);
        return;
      }
      next = 0;
    }
  }

  /** Searches on from the shortest bar first: most paths end at the diagonal. */
  private bringShortest(next: number): void {
    const { frontier, halves } = this;
    let best = next;
    for (let i = next + 1; i < this.reached; i++) if (halves[i]! < halves[best]!) best = i;
    [frontier[next], frontier[best]] = [frontier[best]!, frontier[next]!];
    [halves[next], halves[best]] = [halves[best]!, halves[next]!];
  }

  /** Visits the bars of the other side within delta of `bar`; true if that completed a path. */
  private expand(bar: number): boolean {
    const { births, deaths } = this.bars;
    const { delta, side, search, seen, removed, run } = this;
    const birth = this.birth(bar);
    const death = this.death(bar);
    if (side === 0) {
      for (let i = 0; i < this.addedCount; i++) {
        if (Math.abs(this.addedBirths[i]! - birth) > delta) continue;
        if (Math.abs(this.addedDeaths[i]! - death) > delta) continue;
        const other = this.count + i;
        if (seen[other] !== search && this.visit(other, bar)) return true;
      }
    }
    let i = lowerBound(births, this.count, birth - delta);
    const first = i;
    while (i > 0 && birth - births[i - 1]! <= delta) i--;
    for (; i < this.count && births[i]! - birth <= delta; i++) {
      if (Math.abs(deaths[i]! - death) > delta || birth - births[i]! > delta) continue;
      if (seen[i] === search || (side === 0 && removed[i] === run)) continue;
      if (this.visit(i, bar)) return true;
    }
    this.pulse.tick(i - first + 4);
    return false;
  }

  /** Reaches `other` from `bar`; true if a path ends there. */
  private visit(other: number, bar: number): boolean {
    this.seen[other] = this.search;
    this.from[other] = bar;
    const partner = this.mate(1 - this.side, other);
    if (partner < 0) {
      this.augment(other);
      return true;
    }
    const half = this.half(partner);
    if (half <= this.delta) {
      this.setMate(this.side, partner, -1);
      this.augment(other);
      return true;
    }
    this.halves[this.reached] = half;
    this.frontier[this.reached++] = partner;
    return false;
  }

  /** `bar`, reached in this search, is short now: it gives its partner away. */
  private giveAway(bar: number): void {
    const other = this.mate(this.side, bar);
    if (other < 0) return;
    this.setMate(this.side, bar, -1);
    this.augment(other);
  }

  /** Swaps matched and unmatched edges from `other` back to the root of the search. */
  private augment(other: number): void {
    for (let target = other; target >= 0;) {
      const bar = this.from[target]!;
      const next = this.mate(this.side, bar);
      this.setMate(this.side, bar, target);
      this.setMate(1 - this.side, target, bar);
      target = next;
    }
  }

  /** The smallest delta at which the search gets further. */
  private nextDelta(): number {
    let best = Infinity;
    for (let i = 0; i < this.reached; i++) {
      best = Math.min(best, this.half(this.frontier[i]!));
    }
    for (let i = 0; i < this.reached; i++) best = this.nearest(this.frontier[i]!, best);
    return best;
  }

  /** Smaller of `best` and the distance from `bar` to the nearest bar not yet reached. */
  private nearest(bar: number, best: number): number {
    const { births } = this.bars;
    const birth = this.birth(bar);
    const death = this.death(bar);
    if (this.side === 0) {
      for (let i = 0; i < this.addedCount; i++) {
        if (this.seen[this.count + i] === this.search) continue;
        const gap = Math.abs(this.addedBirths[i]! - birth);
        best = Math.min(best, Math.max(gap, Math.abs(this.addedDeaths[i]! - death)));
      }
    }
    const middle = lowerBound(births, this.count, birth);
    for (let i = middle; i < this.count && births[i]! - birth < best; i++) {
      best = this.closer(i, birth, death, best);
    }
    for (let i = middle - 1; i >= 0 && birth - births[i]! < best; i--) {
      best = this.closer(i, birth, death, best);
    }
    this.pulse.tick(8);
    return best;
  }

  private closer(i: number, birth: number, death: number, best: number): number {
    if (this.seen[i] === this.search || (this.side === 0 && this.removed[i] === this.run)) {
      return best;
    }
    const gap = Math.abs(this.bars.births[i]! - birth);
    return Math.min(best, Math.max(gap, Math.abs(this.bars.deaths[i]! - death)));
  }

  private mate(side: number, bar: number): number {
    return this.mateStamps[side]![bar] === this.run ? this.mates[side]![bar]! : bar;
  }

  private setMate(side: number, bar: number, mate: number): void {
    this.mateStamps[side]![bar] = this.run;
    this.mates[side]![bar] = mate;
  }

  private birth(bar: number): number {
    return bar < this.count ? this.bars.births[bar]! : this.addedBirths[bar - this.count]!;
  }

  private death(bar: number): number {
    return bar < this.count ? this.bars.deaths[bar]! : this.addedDeaths[bar - this.count]!;
  }

  /** Cost of the diagonal. */
  private half(bar: number): number {
    return (this.death(bar) - this.birth(bar)) / 2;
  }
}
