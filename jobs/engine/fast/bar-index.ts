import type { Budget } from './budget';
import type { RankedBars } from './recorded-bars';

/** Most levels of death that have a bitset. */
const LEVELS = 512;
/** Stamps until they are used again. */
const STAMPS = 2 ** 30;

/**
 * The recorded bars of one dimension for questions like "which are within delta of this one and not
 * taken yet": bars lie by birth, so that a window of births is a range of bits, and for levels of
 * death there is a bitset of the bars that die before. A few words answer for dozens of bars.
 */
export class BarIndex {
  readonly births: Float64Array;
  readonly deaths: Float64Array;
  readonly count: number;
  /** Words of a bitset. */
  readonly words: number;
  /** Bit i & 31 of open[i >> 5]: bar i has not been taken. */
  readonly open: Int32Array;
  /** Birth and death rank of each bar. */
  readonly birthRank: Int32Array;
  readonly deathRank: Int32Array;
  /** First bar born at each rank or later, and behind the last rank the number of bars. */
  readonly bornAt: Int32Array;
  /** See `lowestWithin`. */
  highest = 0;
  private reach = -1;
  /** Per rank, valid where the stamp is the present one: the ranks whose values are within reach. */
  private readonly low: Int32Array;
  private readonly high: Int32Array;
  private readonly stamps: Int32Array;
  private stamp = 0;
  /** Death ranks per level. */
  private readonly width: number;
  private readonly levels: number;
  /** Bitset l at l * words: the bars whose death rank is below l * width. */
  private readonly below: Int32Array;

  /** @param value f by rank, ascending */
  constructor(
    { births, deaths, keys }: RankedBars,
    private readonly value: Float64Array,
    budget: Budget,
  ) {
    this.births = births;
    this.deaths = deaths;
    this.count = births.length;
    this.words = (this.count + 31) >>> 5;
    this.open = budget.int32(this.words);
    this.width = Math.ceil(value.length / LEVELS);
    this.levels = Math.ceil(value.length / this.width) + 1;
    this.below = budget.int32(this.levels * this.words);
    const ranks = value.length;
    this.birthRank = budget.int32(this.count);
    this.deathRank = budget.int32(this.count);
    this.bornAt = budget.int32(ranks + 1);
    this.low = budget.int32(ranks);
    this.high = budget.int32(ranks);
    this.stamps = budget.int32(ranks);
    for (let i = 0; i < this.count; i++) {
      const rank = keys[i]! % ranks;
      this.deathRank[i] = rank;
      this.birthRank[i] = Math.floor(keys[i]! / ranks);
      this.bornAt[this.birthRank[i]! + 1]!++;
      const first = Math.floor(rank / this.width) + 1;
      for (let l = first; l < this.levels; l++) {
        this.below[l * this.words + (i >>> 5)]! |= 1 << (i & 31);
      }
    }
    for (let r = 0; r < ranks; r++) this.bornAt[r + 1]! += this.bornAt[r]!;
  }

  release(budget: Budget): void {
    const { open, below, birthRank, deathRank, bornAt, low, high, stamps } = this;
    for (const array of [open, below, birthRank, deathRank, bornAt, low, high, stamps]) {
      budget.release(array);
    }
  }

  openAll(): void {
    this.open.fill(-1);
    if ((this.count & 31) !== 0) this.open[this.words - 1] = (1 << (this.count & 31)) - 1;
  }

  take(i: number): void {
    this.open[i >>> 5]! &= ~(1 << (i & 31));
  }

  isOpen(i: number): boolean {
    return (this.open[i >>> 5]! & (1 << (i & 31))) !== 0;
  }

  /** Open bars of a word whose death lies between two levels, and perhaps a few more. */
  candidates(word: number, lowest: number, highest: number): number {
    const { below, words } = this;
    return this.open[word]! & below[highest * words + word]! & ~below[lowest * words + word]!;
  }

  /** Asks for the values within `reach` of others from now on. */
  setReach(reach: number): void {
    if (reach === this.reach) return;
    this.reach = reach;
    if (this.stamp === STAMPS) this.stamps.fill(0);
    this.stamp = (this.stamp % STAMPS) + 1;
  }

  /** The lowest rank whose value is within reach of that of `rank`; `highest` is the highest then. */
  lowestWithin(rank: number): number {
    if (this.stamps[rank] !== this.stamp) this.look(rank);
    this.highest = this.high[rank]!;
    return this.low[rank]!;
  }

  private look(rank: number): void {
    const { value, reach } = this;
    this.stamps[rank] = this.stamp;
    this.low[rank] = firstWithin(value, rank, reach);
    this.high[rank] = lastWithin(value, rank, reach);
  }

  /** The level whose bitset holds no bar that dies at `rank` or later. */
  levelBelow(rank: number): number {
    return Math.floor(rank / this.width);
  }

  /** The level whose bitset holds every bar that dies at `rank` or before. */
  levelAbove(rank: number): number {
    return Math.floor(rank / this.width) + 1;
  }
}

/** First rank whose value is at most `reach` below that of `rank`; by doubling steps, then bisection. */
function firstWithin(value: Float64Array, rank: number, reach: number): number {
  const from = value[rank]!;
  let step = 1;
  while (rank - step >= 0 && from - value[rank - step]! <= reach) step *= 2;
  let low = Math.max(-1, rank - step);
  let high = rank - (step >> 1);
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (from - value[middle]! <= reach) high = middle;
    else low = middle;
  }
  return high;
}

/** Last rank whose value is at most `reach` above that of `rank`. */
function lastWithin(value: Float64Array, rank: number, reach: number): number {
  const from = value[rank]!;
  let step = 1;
  while (rank + step < value.length && value[rank + step]! - from <= reach) step *= 2;
  let low = rank + (step >> 1);
  let high = Math.min(value.length, rank + step);
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (value[middle]! - from <= reach) low = middle;
    else high = middle;
  }
  return low;
}
