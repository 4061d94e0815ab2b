import type { IntPool } from './pool';
import type { Pulse } from './pulse';
import { mateOfColumn, type Recorded } from './recorded';
import type { RowComplex } from './row';
import type { Tables } from './tables';

/**
 * Annotations of the simplices of one dimension e of M: bits such that the sum over a cycle tells
 * its class. There is a bit per bar of M with a length (in positions), sorted by (death, column),
 * the infinite ones last; a cycle bounds at t exactly if all its bits of bars dying after t vanish.
 * (After Busaryev, Cabello, Chen, Dey, Wang 2012, annotations of simplices; here for all t at once.)
 */
export class Annotation {
  /** Words of a simplex: bits[r * words] .. bits[r * words + words - 1]. */
  bits: Int32Array;
  words = 0;
  /** Number of bits whose bar dies at a position <= t: they come first. */
  readonly deadAt: Int32Array;
  /** Bit of the bar that column c of dimension e + 1 ends, -1 if none. */
  readonly bitOfColumn: Int32Array;

  constructor(
    private readonly tables: Tables,
    private readonly recorded: Recorded,
    private readonly row: RowComplex,
    private readonly e: number,
    private readonly pulse: Pulse,
  ) {
    const { budget, nodeCount } = tables;
    this.bits = budget.int32(0);
    this.deadAt = budget.int32(nodeCount + 1);
    this.bitOfColumn = budget.none(tables.columns[e + 1]!.count);
  }

  /**
   * Annotates M; false (and nothing is done) if that takes more than `mostWork` units of work.
   * @param unclaimed the simplices whose classes never die; negative ones may be among them
   */
  prepare(mostWork: number, unclaimed: IntPool): boolean {
    const { budget, levels } = this.tables;
    const finite = this.numberFiniteBars();
    const total = finite + unclaimed.length;
    this.words = (total + 31) >>> 5;
    if (this.words * levels[this.e]!.count * (this.e + 1) > mostWork) return false;
    const needed = this.words * levels[this.e]!.count;
    if (this.bits.length < needed) {
      budget.release(this.bits);
      this.bits = budget.int32(needed);
    } else this.bits.fill(0, 0, needed);
    for (let i = 0; i < unclaimed.length; i++) this.flip(unclaimed.data[i]!, finite + i);
    this.pass();
    return true;
  }

  /** Columns are in the order of their position, so that a bit's number is its rank by death. */
  private numberFiniteBars(): number {
    const { tables, row, e, bitOfColumn, deadAt } = this;
    const { count, position } = tables.columns[e + 1]!;
    const { nodes, count: rowCount } = tables.levels[e]!;
    const mate = row.mate[e]!;
    bitOfColumn.fill(-1);
    for (let r = 0; r < rowCount; r++) {
      if (mate[r]! > -2) continue;
      const c = mateOfColumn(mate[r]!);
      if (position[c]! > nodes[r * (e + 1)]!) bitOfColumn[c] = 0;
    }
    deadAt.fill(0);
    let bit = 0;
    for (let c = 0; c < count; c++) {
      if (bitOfColumn[c]! < 0) continue;
      bitOfColumn[c] = bit++;
      deadAt[position[c]!] = bit;
    }
    for (let t = 1; t < deadAt.length; t++) deadAt[t] = Math.max(deadAt[t]!, deadAt[t - 1]!);
    this.pulse.tick(2 * count + rowCount);
    return bit;
  }

  /**
   * One ascending pass: a simplex whose mate is its first child c is the sum of c's other facets;
   * one claimed by column j is the sum of the rest of R_j plus j's own bit; a class that never dies
   * has its own bit; all others have none.
   */
  private pass(): void {
    const { tables, recorded, row, e, words } = this;
    const { facets } = tables.levels[e + 1]!;
    const { data } = recorded.store;
    const mate = row.mate[e]!;
    const start = row.start[e + 1]!;
    const length = row.length[e + 1]!;
    for (let r = 0; r < mate.length; r++) {
      const m = mate[r]!;
      if (m === -1) continue;
      if (m >= 0) {
        for (let i = m * (e + 2); i < (m + 1) * (e + 2); i++) {
          if (facets[i] !== r) this.addTo(r, facets[i]!);
        }
        this.pulse.tick(words * (e + 1));
        continue;
      }
      const c = mateOfColumn(m);
      for (let i = start[c]! + 1; i < start[c]! + length[c]!; i++) this.addTo(r, data[i]!);
      if (this.bitOfColumn[c]! >= 0) this.flip(r, this.bitOfColumn[c]!);
      this.pulse.tick(words * length[c]!);
    }
  }

  private flip(r: number, bit: number): void {
    this.bits[r * this.words + (bit >>> 5)]! ^= 1 << (bit & 31);
  }

  private addTo(r: number, other: number): void {
    const { bits, words } = this;
    for (let w = 0; w < words; w++) bits[r * words + w]! ^= bits[other * words + w]!;
  }
}
