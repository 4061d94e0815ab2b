import type { Annotation } from './annotation';
import type { Budget } from './budget';

/**
 * Decides which columns of a star are zero in the swapped complex without reducing them: a column
 * that vanishes in its link is zero exactly if the annotation of its cycle lies in the span of those
 * of the earlier non-zero ones and of the bars that are dead by then.
 */
export class ZeroTest {
  /** Echelon basis: `words` words per element, all with different highest bits. */
  private basis: Int32Array;
  private size = 0;
  private words = 0;
  /** Per bit, 1 + the element with this highest bit if it is above `base`, a running number. */
  private leaders: Int32Array;
  private base = 0;
  private next = 0;

  constructor(
    private readonly annotation: Annotation,
    private readonly budget: Budget,
  ) {
    this.basis = budget.int32(1024);
    this.leaders = budget.int32(1024);
  }

  begin(): void {
    this.words = this.annotation.words;
    this.size = 0;
    this.base = this.next;
    if (this.leaders.length < this.words * 32) {
      this.budget.release(this.leaders);
      this.leaders = this.budget.int32(this.words * 64);
      this.base = this.next = 0;
    } else if (this.next > 1 << 30) {
      this.leaders.fill(0);
      this.base = this.next = 0;
    }
  }

  /**
   * True if the cycle cells[from..to-1] bounds once the first `dead` bits have died, up to earlier
   * cycles; if not it joins the basis. `dead` must not fall from call to call.
   */
  isZero(cells: Int32Array, from: number, to: number, dead: number): boolean {
    const { words, annotation, leaders, base } = this;
    const { bits } = annotation;
    const lowest = dead >>> 5;
    if ((this.size + 1) * words > this.basis.length) this.grow();
    const { basis } = this;
    const at = this.size * words;
    for (let w = 0; w < words; w++) basis[at + w] = 0;
    for (let i = from; i < to; i++) {
      const cell = cells[i]! * words;
      for (let w = lowest; w < words; w++) basis[at + w]! ^= bits[cell + w]!;
    }
    for (let w = words - 1; w >= lowest;) {
      const value = basis[at + w]!;
      if (value === 0) {
        w--;
        continue;
      }
      const bit = (w << 5) | (31 - Math.clz32(value));
      if (bit < dead) return true;
      const leader = leaders[bit]! - base;
      if (leader <= 0) {
        leaders[bit] = base + ++this.size;
        this.next = base + this.size;
        return false;
      }
      const other = (leader - 1) * words;
      for (let v = lowest; v <= w; v++) basis[at + v]! ^= basis[other + v]!;
    }
    return true;
  }

  /** True if column c of M, at its turn, has become zero: its bar ends a combination of cycles. */
  endsCombination(column: number): boolean {
    const bit = this.annotation.bitOfColumn[column]!;
    return bit >= 0 && this.leaders[bit]! > this.base;
  }

  private grow(): void {
    const { basis } = this;
    this.basis = this.budget.int32(basis.length * 2 + this.words);
    this.basis.set(basis);
    this.budget.release(basis);
  }
}
