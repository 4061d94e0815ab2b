import type { BarIndex } from './bar-index';
import type { Budget } from './budget';
import { Frontier } from './frontier';
import type { Pulse } from './pulse';
import { otherSide, type Side, type TwoBarcodes } from './two-barcodes';

/**
 * Augmenting paths between two barcodes at a cost delta that rises only when there is no path. A path
 * may end at a free bar, or by taking the partner of a bar no longer than 2 delta, which then goes to
 * the diagonal.
 */
export class AugmentingSearch {
  delta = 0;
  private side: Side = 0;
  /** By bar of the other side that is reached in this search: from which bar. */
  private readonly from: Int32Array;
  /** Value `search` at the added bars (less the number of recorded ones) reached in this search. */
  private readonly seen: Int32Array;
  private search = 0;
  /** Bars of the searching side reached in this search. */
  private readonly frontier: Frontier;
  /**
   * Per place of the frontier a lower bound of the distance to any bar not reached; it is the
   * distance itself if `nearBar` says to which bar and that one has not been reached since. -1: a
   * bound only.
   */
  private readonly near: Float64Array;
  private readonly nearBar: Int32Array;
  private nearest = -1;

  constructor(
    private readonly barcodes: TwoBarcodes,
    private readonly index: BarIndex,
    budget: Budget,
    private readonly pulse: Pulse,
  ) {
    const capacity = barcodes.count + barcodes.mostAdded;
    this.from = budget.int32(capacity);
    this.seen = budget.int32(barcodes.mostAdded);
    this.frontier = new Frontier(budget, capacity);
    this.near = budget.float64(capacity);
    this.nearBar = budget.int32(capacity);
  }

  release(budget: Budget): void {
    this.frontier.release(budget);
    for (const array of [this.from, this.seen, this.near, this.nearBar]) budget.release(array);
  }

  /** Before `nearestOf` for bars of one side: nothing on the other side has been reached. */
  begin(side: Side): void {
    const { barcodes, index } = this;
    this.side = side;
    this.search++;
    index.openAll();
    if (side === 1) return;
    for (let i = 0; i < barcodes.removedCount; i++) index.take(barcodes.removedBars[i]!);
  }

  /** Smaller of `best` and the distance from `bar` to the nearest bar of the other side. */
  nearestOf(bar: number, best: number): number {
    return this.nearestOpen(bar, best);
  }

  /** Makes sure that `root` is matched or no longer than 2 delta, raising delta as far as that takes. */
  cover(side: Side, root: number): void {
    const half = this.barcodes.half(root);
    if (half <= this.delta) return;
    this.begin(side);
    const { frontier } = this;
    frontier.clear();
    this.reach(root, half);
    for (;;) {
      for (let at = frontier.takeShortest(); at >= 0; at = frontier.takeShortest()) {
        if (this.expand(at)) return;
      }
      this.raise();
      if (this.giveShortAway() || this.expandNear()) return;
    }
  }

  private reach(bar: number, half: number): void {
    const at = this.frontier.reach(bar, half);
    this.near[at] = 0;
    this.nearBar[at] = -1;
  }

  /** Visits the bars of the other side within delta of a reached one; true if that completed a path. */
  private expand(at: number): boolean {
    const { barcodes, index, delta } = this;
    const bar = this.frontier.bars[at]!;
    const birth = barcodes.birth(bar);
    const death = barcodes.death(bar);
    this.near[at] = delta;
    this.nearBar[at] = -1;
    if (this.side === 0 && this.visitAdded(bar, birth, death)) return true;
    index.setReach(delta);
    const first = index.bornAt[index.lowestWithin(this.birthRank(bar))]!;
    const end = index.bornAt[index.highest + 1]!;
    if (first === end) return false;
    const lowest = index.levelBelow(index.lowestWithin(this.deathRank(bar)));
    const highest = index.levelAbove(index.highest);
    const lastWord = (end - 1) >> 5;
    for (let word = first >> 5; word <= lastWord; word++) {
      let bits = index.candidates(word, lowest, highest);
      if (word === first >> 5) bits &= -1 << (first & 31);
      if (word === lastWord) bits &= -1 >>> (31 - ((end - 1) & 31));
      for (; bits !== 0; bits &= bits - 1) {
        const other = (word << 5) | (31 - Math.clz32(bits & -bits));
        if (Math.abs(index.deaths[other]! - death) > delta) continue;
        index.take(other);
        if (this.visit(other, bar)) return true;
      }
    }
    this.pulse.tick(lastWord - (first >> 5) + 6);
    return false;
  }

  private visitAdded(bar: number, birth: number, death: number): boolean {
    const { delta, seen, search, barcodes } = this;
    const { addedBirths, addedDeaths, count } = barcodes;
    for (let i = 0; i < barcodes.addedCount; i++) {
      if (Math.abs(addedBirths[i]! - birth) > delta) continue;
      if (Math.abs(addedDeaths[i]! - death) > delta || seen[i] === search) continue;
      seen[i] = search;
      if (this.visit(count + i, bar)) return true;
    }
    return false;
  }

  private birthRank(bar: number): number {
    const { count, addedBirthRanks } = this.barcodes;
    return bar < count ? this.index.birthRank[bar]! : addedBirthRanks[bar - count]!;
  }

  private deathRank(bar: number): number {
    const { count, addedDeathRanks } = this.barcodes;
    return bar < count ? this.index.deathRank[bar]! : addedDeathRanks[bar - count]!;
  }

  /** Reaches `other` from `bar`; true if a path ends there. */
  private visit(other: number, bar: number): boolean {
    const { barcodes, side } = this;
    this.from[other] = bar;
    const partner = barcodes.mate(otherSide(side), other);
    if (partner < 0) {
      this.augment(other);
      return true;
    }
    const half = barcodes.half(partner);
    if (half <= this.delta) {
      barcodes.setMate(side, partner, -1);
      this.augment(other);
      return true;
    }
    this.reach(partner, half);
    return false;
  }

  /** Swaps matched and unmatched edges from `other` back to the root of the search. */
  private augment(other: number): void {
    const { barcodes, side } = this;
    for (let target = other; target >= 0;) {
      const bar = this.from[target]!;
      const next = barcodes.mate(side, bar);
      barcodes.join(side, bar, target);
      target = next;
    }
  }

  /** Raises delta to the smallest at which the search gets further. */
  private raise(): void {
    const { near, nearBar } = this;
    const { bars, halves, reached } = this.frontier;
    let best = Infinity;
    for (let i = 0; i < reached; i++) best = Math.min(best, halves[i]!);
    for (let i = 0; i < reached; i++) {
      if (near[i]! >= best) continue;
      if (!this.isUnreached(nearBar[i]!)) {
        near[i] = this.nearestOpen(bars[i]!, best);
        nearBar[i] = this.nearest;
      }
      best = Math.min(best, near[i]!);
    }
    this.delta = best;
  }

  private isUnreached(bar: number): boolean {
    const { count } = this.barcodes;
    if (bar < 0) return false;
    return bar < count ? this.index.isOpen(bar) : this.seen[bar - count] !== this.search;
  }

  /** A bar reached in this search that is short now gives its partner away: a path ends there. */
  private giveShortAway(): boolean {
    const { barcodes, side, frontier } = this;
    for (let i = 0; i < frontier.reached; i++) {
      if (frontier.halves[i]! > this.delta) continue;
      const bar = frontier.bars[i]!;
      const other = barcodes.mate(side, bar);
      if (other >= 0) {
        barcodes.setMate(side, bar, -1);
        this.augment(other);
      }
      return true;
    }
    return false;
  }

  /** After delta has risen: only bars with another one that near lead further. */
  private expandNear(): boolean {
    const { reached } = this.frontier;
    for (let i = 0; i < reached; i++) {
      if (this.near[i]! <= this.delta && this.expand(i)) return true;
    }
    return false;
  }

  /**
   * Smaller of `best` and the distance from `bar` to the nearest bar not reached, which is left in
   * `nearest` (-1 if none is nearer than `best`).
   */
  private nearestOpen(bar: number, best: number): number {
    const { barcodes } = this;
    const birth = barcodes.birth(bar);
    const death = barcodes.death(bar);
    this.nearest = -1;
    let found = best;
    if (this.side === 0) found = this.nearestAdded(birth, death, found);
    const { index } = this;
    const middle = index.bornAt[this.birthRank(bar)]!;
    index.setReach(found);
    const lowest = index.levelBelow(index.lowestWithin(this.deathRank(bar)));
    const highest = index.levelAbove(index.highest);
    const firstWord = middle >> 5;
    const split = -1 << (middle & 31);
    for (let word = firstWord; word < index.words; word++) {
      if (word > firstWord && index.births[word << 5]! - birth >= found) break;
      const bits = index.candidates(word, lowest, highest);
      found = this.nearestOfWord(
        word,
        word === firstWord ? bits & split : bits,
        birth,
        death,
        found,
      );
    }
    for (let word = Math.min(firstWord, index.words - 1); word >= 0; word--) {
      if (word < firstWord && birth - index.births[(word << 5) | 31]! >= found) break;
      const bits = index.candidates(word, lowest, highest);
      found = this.nearestOfWord(
        word,
        word === firstWord ? bits & ~split : bits,
        birth,
        death,
        found,
      );
    }
    this.pulse.tick(8);
    return found;
  }

  private nearestAdded(birth: number, death: number, best: number): number {
    const { barcodes, seen, search } = this;
    const { addedBirths, addedDeaths } = barcodes;
    let found = best;
    for (let i = 0; i < barcodes.addedCount; i++) {
      const apart = Math.abs(addedBirths[i]! - birth);
      const gap = Math.max(apart, Math.abs(addedDeaths[i]! - death));
      if (gap >= found || seen[i] === search) continue;
      found = gap;
      this.nearest = barcodes.count + i;
    }
    return found;
  }

  private nearestOfWord(
    word: number,
    candidates: number,
    birth: number,
    death: number,
    best: number,
  ): number {
    const { births, deaths } = this.index;
    let found = best;
    for (let bits = candidates; bits !== 0; bits &= bits - 1) {
      const i = (word << 5) | (31 - Math.clz32(bits & -bits));
      const gap = Math.max(Math.abs(births[i]! - birth), Math.abs(deaths[i]! - death));
      if (gap >= found) continue;
      found = gap;
      this.nearest = i;
    }
    return found;
  }
}
