import type { Agenda } from './agenda';
import type { DimensionChanges } from './changes';
import type { RecordedEvents } from './recorded-bars';
import { barKey } from './row';
import type { Scale } from './scale';

/**
 * What every pair (a, q) of one row has in common in one dimension, swept with q: M's bars that are
 * dead before q and its classes that are alive at q, as a difference to K's.
 */
export class RowSweep {
  /** Keys and signs of the bars that differ; opposite ones have been taken out. */
  private readonly keys: number[] = [];
  private readonly signs: number[] = [];
  /** Difference of the number of classes alive by birth rank; the ranks where it may not be zero. */
  private readonly alive: Int32Array;
  private readonly ranks: number[] = [];

  constructor(
    private readonly scale: Scale,
    private readonly events: RecordedEvents,
    private readonly finiteAgenda: Agenda,
    private readonly aliveAgenda: Agenda,
  ) {
    this.alive = new Int32Array(scale.value.length);
  }

  begin(): void {
    this.keys.length = this.signs.length = 0;
    for (const rank of this.ranks) this.alive[rank] = 0;
    this.ranks.length = 0;
  }

  /** Takes in what begins to hold at q. */
  advance(q: number): void {
    const { finiteAgenda: bars, aliveAgenda: classes, alive, ranks } = this;
    for (let i = bars.head[q]!; i >= 0; i = bars.next[i]!)
      this.addBar(bars.keys[i]!, bars.codes[i]!);
    for (let i = classes.head[q]!; i >= 0; i = classes.next[i]!) {
      const rank = classes.keys[i]!;
      if (alive[rank] === 0 && !ranks.includes(rank)) ranks.push(rank);
      alive[rank]! += classes.codes[i]!;
    }
  }

  /** Hands the differences at q to the pair. */
  contribute(q: number, changes: DimensionChanges): void {
    const { keys, signs, alive, ranks, scale, events } = this;
    for (let i = 0; i < keys.length; i++) changes.finite(keys[i]!, signs[i]!);
    let kept = 0;
    for (let i = 0; i < ranks.length; i++) {
      const rank = ranks[i]!;
      if (alive[rank] === 0) continue;
      changes.infinite(rank, alive[rank]!);
      ranks[kept++] = rank;
    }
    ranks.length = kept;
    const death = scale.rank[q]!;
    for (let i = events.diedStart[q]!; i < events.diedStart[q + 1]!; i++) {
      const birth = events.diedBirth[i]!;
      changes.infinite(birth, 1);
      if (birth !== death) changes.finite(barKey(birth, death, scale.value.length), -1);
    }
    if (events.born[q] !== 0) changes.infinite(death, -events.born[q]!);
  }

  private addBar(key: number, sign: number): void {
    const { keys, signs } = this;
    for (let i = 0; i < keys.length; i++) {
      if (keys[i] !== key || signs[i] === sign) continue;
      keys[i] = keys[keys.length - 1]!;
      signs[i] = signs[signs.length - 1]!;
      keys.length = --signs.length;
      return;
    }
    keys.push(key);
    signs.push(sign);
  }
}
