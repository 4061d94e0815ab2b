import type { Annotation } from './annotation';
import type { LinkColumns } from './links';
import type { OverlayColumn } from './overlay-column';
import type { IntPool } from './pool';
import type { Tables } from './tables';
import type { ZeroTests } from './zero-policy';
import { ZeroTest } from './zero-test';

/** What is known of a star's column before it is reduced. */
export const Verdict = {
  Unknown: 0,
  /** Zero in the swapped complex. */
  Zero: 1,
  /** Not zero, and the same as its cycle. */
  Cycle: 2,
} as const;

/**
 * The zero test for the columns of one dimension of both stars. Whether annotating M pays is judged
 * by counted work: what zero columns have cost where they were reduced, times how many of them a
 * pair met in the last row. All counts repeat on every machine, and no result depends on them.
 */
export class StarZeros {
  private ready = false;
  private readonly test: ZeroTest;
  private readonly words: number;
  /** Zero columns met in this row. */
  private zeros = 0;
  /** Zero columns per pair met in the last row, -1 before the first. */
  private zerosPerPair = -1;
  private pairs = 0;
  /** Vanishing columns that had to be reduced until they were zero, and the work it took. */
  private reduced = 0;
  private work = 0;

  constructor(
    private readonly links: LinkColumns,
    private readonly annotation: Annotation,
    private readonly tables: Tables,
    private readonly tests: ZeroTests,
  ) {
    this.test = new ZeroTest(annotation, tables.budget);
    this.words = (tables.nodeCount + 31) >>> 5;
  }

  /** Once per row p, after M has been reduced: annotates M if that costs less than it saves. */
  prepare(p: number, unclaimed: IntPool): void {
    if (this.pairs > 0) this.zerosPerPair = this.zeros / this.pairs;
    this.pairs = this.tables.nodeCount - 1 - p;
    this.zeros = 0;
    this.ready = false;
    const saving =
      this.tests === 'always'
        ? Infinity
        : (this.pairs * this.zerosPerPair * this.work) / Math.max(1, this.reduced);
    if (saving > 0) this.ready = this.annotation.prepare(saving, unclaimed);
  }

  /** Column c was zero; `work` units were spent on it if it had to be reduced. */
  met(c: number, work: number): void {
    if (this.links.vanishes[c] === 0) return;
    this.zeros++;
    if (work === 0) return;
    this.reduced++;
    this.work += work;
  }

  /** Before the columns of a star, which then come in order. */
  begin(): void {
    if (this.ready) this.test.begin();
  }

  /** @param without node that is taken out (position), -1 if none; `time`: position of the column */
  judge(c: number, without: number, time: number): number {
    const { links, words } = this;
    if (!this.ready || links.vanishes[c] === 0) return Verdict.Unknown;
    if (without >= 0) {
      const word = links.touched[c * words + (without >>> 5)]!;
      if ((word & (1 << (without & 31))) !== 0) return Verdict.Unknown;
    }
    const dead = this.annotation.deadAt[time]!;
    return this.test.isZero(links.cells, links.start[c]!, links.start[c + 1]!, dead)
      ? Verdict.Zero
      : Verdict.Cycle;
  }

  /** Starts from the cycle of column c. */
  addTo(column: OverlayColumn, c: number): void {
    const { cells, start } = this.links;
    column.addCycle(cells, start[c]!, start[c + 1]!);
  }

  /** True if column c of M is zero at its turn. */
  endsCombination(c: number): boolean {
    return this.ready && this.test.endsCombination(c);
  }
}
