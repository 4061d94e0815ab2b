import type { Annotation } from './annotation';
import type { LinkColumns } from './links';
import type { OverlayColumn } from './overlay-column';
import type { IntPool } from './pool';
import type { Tables } from './tables';
import { ZeroTest } from './zero-test';

/** What is known of a star's column before it is reduced. */
export const Verdict = {
  Unknown: 0,
  /** Zero in the swapped complex. */
  Zero: 1,
  /** Not zero, and the same as its cycle. */
  Cycle: 2,
} as const;

/** Widest annotation, in words, that is worth making. */
export const MOST_WORDS = 64;

/** The zero test for the columns of one dimension of both stars. */
export class StarZeros {
  private ready = false;
  private readonly test: ZeroTest;
  private readonly words: number;

  constructor(
    private readonly links: LinkColumns,
    private readonly annotation: Annotation,
    tables: Tables,
  ) {
    this.test = new ZeroTest(annotation, tables.budget);
    this.words = (tables.nodeCount + 31) >>> 5;
  }

  /** Once per row, after M has been reduced. */
  prepare(unclaimed: IntPool): void {
    this.ready = this.annotation.prepare(MOST_WORDS, unclaimed);
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
