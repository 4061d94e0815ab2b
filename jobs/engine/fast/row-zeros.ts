import { Annotation } from './annotation';
import { IntPool } from './pool';
import type { Pulse } from './pulse';
import { mateOfColumn, Status, type Recorded } from './recorded';
import type { RowComplex } from './row';
import type { Tables } from './tables';
import type { ZeroTests } from './zero-policy';
import { ZeroTest } from './zero-test';

/** What is known of a column of M before it is reduced. */
export const Forecast = { Unknown: 0, Zero: 1 } as const;

/**
 * Tells columns of M (K without a) of one dimension d that are zero. Nearly all columns that are zero
 * in K stay so, but most of them are touched by a. So they are presumed zero, the negative ones are
 * reduced, and M is annotated with the result. A column whose boundary then is a sum of reduced
 * columns before it is zero whatever the presumption was worth; the others are left to the reduction.
 */
export class RowZeros {
  /** `Forecast` by column. */
  readonly forecast: Uint8Array;
  /** Work that a column spares if it is known to be zero: what it took in K on average. */
  private readonly saving: number;
  private readonly annotation: Annotation;
  private readonly test: ZeroTest;
  private readonly own: IntPool;
  private readonly cells: IntPool;
  /** Columns that are presumed zero, and the pivots claimed meanwhile. */
  private readonly presumed: IntPool;
  private readonly pivots: IntPool;

  constructor(
    private readonly tables: Tables,
    private readonly recorded: Recorded,
    private readonly row: RowComplex,
    private readonly d: number,
    private readonly pulse: Pulse,
    zeroTests: ZeroTests,
  ) {
    const { budget, columns } = tables;
    this.saving = zeroTests === 'always' ? Infinity : recorded.zeroCost[d]!;
    this.forecast = budget.uint8(columns[d]!.count);
    this.annotation = new Annotation(tables, recorded, row, d - 1, pulse);
    this.test = new ZeroTest(this.annotation, budget);
    this.own = new IntPool(budget, 64);
    this.cells = new IntPool(budget, 64);
    this.presumed = new IntPool(budget, 64);
    this.pivots = new IntPool(budget, 64);
  }

  /** Fills `forecast` for node a; leaves M as it was. */
  foresee(): void {
    const { presumed, pivots, row, recorded, d } = this;
    this.forecast.fill(Forecast.Unknown);
    this.collect();
    if (presumed.length === 0) return;
    const mostWork = presumed.length * this.saving;
    if (mostWork < this.tables.levels[d - 1]!.count * d) return;
    const { status } = recorded.reduced[d]!;
    const { length } = recorded.store;
    const mate = row.mate[d - 1]!;
    pivots.length = 0;
    const { count } = this.tables.columns[d]!;
    for (let c = 0; c < count; c++) {
      if (status[c] !== Status.Negative || !row.isTouched(d, c) || !row.isOpen(d, c)) continue;
      const pivot = row.reduceColumn(d, c);
      if (pivot >= 0) pivots.push(pivot);
    }
    this.collectOwn();
    if (this.annotation.prepare(mostWork, this.own)) this.testAll();
    for (let i = 0; i < pivots.length; i++) mate[pivots.data[i]!] = -1;
    recorded.store.length = length;
  }

  /** Columns to be reduced that are not negative in K. */
  private collect(): void {
    const { presumed, recorded, row, d } = this;
    const { status } = recorded.reduced[d]!;
    const { count } = this.tables.columns[d]!;
    presumed.length = 0;
    for (let c = 0; c < count; c++) {
      if (status[c] === Status.Negative) continue;
      if (status[c] === Status.Zero && !row.isTouched(d, c)) continue;
      if (row.isOpen(d, c)) presumed.push(c);
    }
  }

  /** Rows that nothing claims and that are not known to be negative have a bit of their own. */
  private collectOwn(): void {
    const { own, row, recorded, d } = this;
    const e = d - 1;
    const { count, simplex } = this.tables.columns[e]!;
    const { status } = recorded.reduced[e]!;
    own.length = 0;
    for (let c = 0; c < count; c++) {
      if (row.mate[e]![simplex[c]!] !== -1) continue;
      if (status[c] === Status.Negative && !row.isTouched(e, c)) continue;
      if (!row.contains(e, simplex[c]!)) own.push(simplex[c]!);
    }
  }

  private testAll(): void {
    const { presumed, forecast, annotation, test, cells } = this;
    test.begin();
    let next = 0;
    let dead = 0;
    for (let i = 0; i < presumed.length; i++) {
      const c = presumed.data[i]!;
      for (; next < c; next++) {
        if (annotation.bitOfColumn[next]! >= 0) dead = annotation.bitOfColumn[next]! + 1;
      }
      if (!this.reduceToEarlier(c)) continue;
      if (test.isZero(cells.data, 0, cells.length, dead)) forecast[c] = Forecast.Zero;
    }
    for (let c = 0; c < forecast.length; c++) {
      if (test.endsCombination(c)) forecast[c] = Forecast.Zero;
    }
  }

  /**
   * Reduces column c until all its rows are earlier than itself, and leaves them in `cells`. False if
   * that would take a later column or a free row at c's own position.
   */
  private reduceToEarlier(c: number): boolean {
    const { row, recorded, tables, d, cells } = this;
    const { facets } = tables.levels[d]!;
    const { nodes } = tables.levels[d - 1]!;
    const { simplex, position } = tables.columns[d]!;
    const { rows } = row;
    const mate = row.mate[d - 1]!;
    const time = position[c]!;
    const width = d + 1;
    cells.length = 0;
    rows.toggleAll(facets, simplex[c]! * width, (simplex[c]! + 1) * width);
    let earlier = true;
    for (let r = rows.top(); r >= 0 && nodes[r * d] === time; r = rows.top()) {
      const m = mate[r]!;
      const other = mateOfColumn(m);
      earlier = m >= 0 || (m !== -1 && other < c);
      if (!earlier) break;
      if (m >= 0) rows.toggleAll(facets, m * width, (m + 1) * width);
      else {
        const start = row.start[d]![other]!;
        rows.toggleAll(recorded.store.data, start, start + row.length[d]![other]!);
        this.pulse.tick(row.length[d]![other]!);
      }
      this.pulse.tick(width);
    }
    rows.drain(cells);
    return earlier;
  }
}
