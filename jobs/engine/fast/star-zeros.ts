import type { Annotation } from './annotation';
import type { LinkColumns } from './links';
import type { OverlayColumn } from './overlay-column';
import { IntPool } from './pool';
import type { Tables } from './tables';
import type { ZeroTests } from './zero-policy';
import { ZeroTest } from './zero-test';

/**
 * The zero test for the columns of one dimension of both stars. Whether annotating M pays is judged
 * by counted work: what zero columns have cost where they were reduced, times how many of them a
 * pair met in the last row. All counts repeat on every machine, and no result depends on them.
 */
export class StarZeros {
  /** True if M is annotated for this row. */
  ready = false;
  private readonly test: ZeroTest;
  private readonly cells: IntPool;
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
    this.cells = new IntPool(tables.budget, 64);
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

  /** A column that vanishes was zero; `work` units were spent on it if it had to be reduced. */
  met(work: number): void {
    this.zeros++;
    if (work === 0) return;
    this.reduced++;
    this.work += work;
  }

  /** Before the columns of a star, which then come in order. */
  begin(): void {
    if (this.ready) this.test.begin();
  }

  /** @param c a column that vanishes and that nothing taken out has touched; `time`: its position */
  isZero(c: number, time: number): boolean {
    const { links, ready, test, annotation } = this;
    if (!ready) return false;
    return test.isZero(
      links.items,
      links.middle[c]!,
      links.start[c + 1]!,
      annotation.deadAt[time]!,
    );
  }

  /** The same for a column under reduction that is a cycle of M; it is emptied if it is zero. */
  isZeroCycle(column: OverlayColumn, time: number): boolean {
    const { cells } = this;
    cells.length = 0;
    column.takeCycle(cells);
    if (this.test.isZero(cells.data, 0, cells.length, this.annotation.deadAt[time]!)) return true;
    column.addCycle(cells);
    return false;
  }

  /** True if column c of M is zero at its turn. */
  endsCombination(c: number): boolean {
    return this.ready && this.test.endsCombination(c);
  }
}
