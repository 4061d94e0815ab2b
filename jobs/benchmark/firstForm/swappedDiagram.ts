import type { Budget } from '../../engine/fast/budget';
import { IntPool } from '../../engine/fast/pool';
import type { Scale } from '../../engine/fast/scale';
import { lowerBound, sortNumbers } from '../../engine/fast/sort';
import { Diagram } from './diagram';
import type { RecordedPairs } from './recordedPairs';
import type { RowClasses } from './rowClasses';

/** Positions of the two nodes that change places, p < q. */
export interface Block {
  readonly p: number;
  readonly q: number;
}

/** Both whole barcodes of one dimension, the recorded one and that of the swapped order. */
export class SwappedDiagram {
  readonly before: Diagram;
  readonly after = new Diagram(64);
  /** Largest difference of the sorted births of infinite bars. */
  infinitePart = 0;
  /** Bars with an end in the block by their ranks (`barKey`): of the overlay, and all of them. */
  private readonly overlayKeys: FloatList;
  private readonly fresh: FloatList;
  /** Positions of the block where infinite bars of the overlay begin. */
  private readonly overlayBirths: IntPool;

  constructor(
    private readonly recorded: RecordedPairs,
    private readonly scale: Scale,
    budget: Budget,
  ) {
    this.overlayKeys = new FloatList(budget);
    this.fresh = new FloatList(budget);
    this.overlayBirths = new IntPool(budget, 64);
    const { births, deaths } = recorded;
    this.before = new Diagram(births.length);
    this.before.births.set(births);
    this.before.deaths.set(deaths);
    this.before.count = births.length;
  }

  begin(): void {
    this.overlayKeys.length = this.overlayBirths.length = 0;
  }

  addFinite(key: number): void {
    this.overlayKeys.push(key);
  }

  /** An infinite bar born at a position of the block. */
  addInfinite(birth: number): void {
    this.overlayBirths.push(birth);
  }

  /**
   * Puts the swapped barcode together: recorded bars with both ends outside [p, q], the overlay's,
   * and what M has inside the block that nobody claims (claims from `base` on are this pair's).
   */
  assemble(block: Block, classes: RowClasses, claims: Int32Array, base: number): void {
    this.compareInfinite(block, classes, claims, base);
    this.collectFresh(block, classes, claims, base);
    const { p, q } = block;
    const { before, after } = this;
    const { data: fresh, length: freshCount } = this.fresh;
    const { birthPosition, deathPosition, keys } = this.recorded;
    after.ensure(before.count + freshCount);
    after.count = 0;
    let next = 0;
    for (let i = 0; i < before.count; i++) {
      const key = keys[i]!;
      while (next < freshCount && fresh[next]! < key) this.append(fresh[next++]!, -1);
      const birth = birthPosition[i]!;
      const death = deathPosition[i]!;
      const kept = (birth < p || birth > q) && (death < p || death > q);
      if (kept) this.append(key, i);
      else if (next < freshCount && fresh[next] === key) {
        this.append(key, i);
        next++;
      } else before.same[i] = -1;
    }
    while (next < freshCount) this.append(fresh[next++]!, -1);
  }

  /** The overlay's bars, sorted here, and those of M, which are sorted, merged. */
  private collectFresh(block: Block, classes: RowClasses, claims: Int32Array, base: number): void {
    const { p, q } = block;
    const { overlayKeys, fresh } = this;
    const { pairRow, pairKey, pairPosition, pairCount } = classes;
    sortNumbers(overlayKeys.data, overlayKeys.length);
    fresh.length = 0;
    let next = 0;
    for (let i = 0; i < pairCount; i++) {
      const position = pairPosition[i]!;
      if (position <= p || position >= q || claims[pairRow[i]!]! >= base) continue;
      const key = pairKey[i]!;
      while (next < overlayKeys.length && overlayKeys.data[next]! < key) {
        fresh.push(overlayKeys.data[next++]!);
      }
      fresh.push(key);
    }
    while (next < overlayKeys.length) fresh.push(overlayKeys.data[next++]!);
  }

  /** @param same index of the recorded bar that this one is, -1 for none */
  private append(key: number, same: number): void {
    const { before, after } = this;
    const at = after.count++;
    if (same >= 0) {
      after.births[at] = before.births[same]!;
      after.deaths[at] = before.deaths[same]!;
      before.same[same] = at;
    } else {
      const { value } = this.scale;
      const birth = Math.floor(key / value.length);
      after.births[at] = value[birth]!;
      after.deaths[at] = value[key - birth * value.length]!;
    }
    after.same[at] = same;
  }

  /** Infinite bars of both sides that begin in the block, in the order of their births. */
  private compareInfinite(
    { p, q }: Block,
    classes: RowClasses,
    claims: Int32Array,
    base: number,
  ): void {
    const { infinite } = this.recorded;
    const { rank, value } = this.scale;
    const { data: births, length: count } = this.overlayBirths;
    const { bornSimplex, bornPosition, bornDeath, bornCount } = classes;
    sortNumbers(births, count);
    this.infinitePart = 0;
    let at = lowerBound(infinite, infinite.length, p);
    let i = lowerBound(bornPosition, bornCount, p + 1);
    let next = 0;
    for (;;) {
      // The next class of M that no column before q kills and nobody claims.
      while (
        i < bornCount &&
        bornPosition[i]! < q &&
        (bornDeath[i]! < q || claims[bornSimplex[i]!]! >= base)
      ) {
        i++;
      }
      const ofM = i < bornCount && bornPosition[i]! < q ? bornPosition[i]! : q + 1;
      const ofOverlay = next < count ? births[next]! : q + 1;
      const swapped = Math.min(ofM, ofOverlay);
      const before = at < infinite.length ? infinite[at]! : q + 1;
      if (before > q !== swapped > q)
        throw new Error('A swap changed the number of infinite bars.');
      if (swapped > q) return;
      if (ofM <= ofOverlay) i++;
      else next++;
      at++;
      if (before === swapped) continue;
      const difference = Math.abs(value[rank[before]!]! - value[rank[swapped]!]!);
      if (difference > this.infinitePart) this.infinitePart = difference;
    }
  }
}

/** A growing list of numbers. */
class FloatList {
  data: Float64Array;
  length = 0;

  constructor(private readonly budget: Budget) {
    this.data = budget.float64(64);
  }

  push(value: number): void {
    if (this.length === this.data.length) {
      const old = this.data;
      this.data = this.budget.float64(2 * old.length);
      this.data.set(old);
      this.budget.release(old);
    }
    this.data[this.length++] = value;
  }
}
