import { RowSet } from './bitset';
import { IntPool } from './pool';
import type { Pulse } from './pulse';
import type { Complex } from './tables';

/** What the reduction of K found for a column. */
export const Status = {
  /** Has a child, so it is no critical column of K. */
  Paired: 0,
  /** Reduced to a non-zero column: it kills its pivot row. */
  Negative: 1,
  /** Reduced to zero. */
  Zero: 2,
  /** Claimed as a pivot row one dimension up, hence zero without reduction (clearing). */
  Cleared: 3,
} as const;

/** The reduced boundary matrix of K in one dimension d of columns, by column index. */
export interface ReducedColumns {
  readonly status: Uint8Array;
  /** The reduced column lies in the store at start[c] .. start[c] + length[c] - 1, pivot row first. */
  readonly start: Int32Array;
  readonly length: Int32Array;
  /** Bit x of the bitset at c * words: node x is in the column or in anything added to it. */
  readonly touched: Int32Array;
}

/** Persistent homology of the recorded order. */
export interface Recorded {
  /**
   * Per dimension of rows 0..D, what row r is paired with: the id of its first child if >= 0 (for
   * nothing), column -2 - mate[r] if <= -2, nothing if -1.
   */
  readonly mate: readonly Int32Array[];
  /** Dimensions 1..D+1 (index 0 unused). */
  readonly reduced: readonly ReducedColumns[];
  /** Reduced columns laid end to end; those of K first, what a row of the matrix needs behind. */
  readonly store: IntPool;
  /** Per dimension 1..D+1, units of work that a column took on average until it was zero. */
  readonly zeroCost: readonly number[];
  /** Words per touched bitset. */
  readonly words: number;
}

/** Code of a column in `mate`; its own inverse. */
export function mateOfColumn(column: number): number {
  return -2 - column;
}

/**
 * Reduces K's critical columns (Edelsbrunner, Letscher, Zomorodian 2002) from dimension D + 1 down
 * to 1 with clearing (Chen, Kerber 2011). A row with a first child is an apparent pair (Bauer 2021):
 * the boundary of that child is already reduced and is added as it is.
 */
export function reduceRecorded(tables: Complex, pulse: Pulse): Recorded {
  const { levels, columns, top, budget, nodeCount } = tables;
  const words = (nodeCount + 31) >>> 5;
  const mate = levels.slice(0, top).map((level) => {
    const copy = budget.int32(level.count);
    copy.set(level.firstChild);
    return copy;
  });
  const reduced = columns.map(({ count }): ReducedColumns => ({
    status: budget.uint8(count),
    start: budget.int32(count),
    length: budget.int32(count),
    touched: budget.int32(count * words),
  }));
  const zeroCost = new Array<number>(top + 1).fill(0);
  const recorded: Recorded = {
    mate,
    reduced,
    store: new IntPool(budget, 1 << 12),
    zeroCost,
    words,
  };
  const widest = Math.max(...levels.slice(0, top).map((level) => level.count));
  const rows = new RowSet(budget, widest);
  for (let d = top; d >= 1; d--) zeroCost[d] = reduceDimension(tables, recorded, d, rows, pulse);
  return recorded;
}

/** Returns the work that a zero column took on average. */
function reduceDimension(
  tables: Complex,
  recorded: Recorded,
  d: number,
  rows: RowSet,
  pulse: Pulse,
): number {
  const { levels, columns, top } = tables;
  const { facets } = levels[d]!;
  const { count, simplex, onlyChild } = columns[d]!;
  const { status, start, length } = recorded.reduced[d]!;
  const { store } = recorded;
  const mate = recorded.mate[d - 1]!;
  let zeros = 0;
  let zeroWork = 0;
  for (let c = 0; c < count; c++) {
    const s = simplex[c]!;
    if (onlyChild[c]! >= 0) continue;
    if (d < top && recorded.mate[d]![s]! <= -2) {
      status[c] = Status.Cleared;
      continue;
    }
    rows.toggleAll(facets, s * (d + 1), (s + 1) * (d + 1));
    touchSimplex(tables, recorded, d, c, s);
    const before = pulse.work;
    const pivot = reduceColumn(tables, recorded, d, c, rows, pulse);
    if (pivot < 0) {
      zeros++;
      zeroWork += pulse.work - before;
      status[c] = Status.Zero;
      continue;
    }
    status[c] = Status.Negative;
    mate[pivot] = mateOfColumn(c);
    start[c] = store.length;
    rows.drain(store);
    length[c] = store.length - start[c]!;
  }
  return zeros === 0 ? 0 : zeroWork / zeros;
}

/** Adds until the pivot row is free; returns it, or -1 if the column became zero. */
function reduceColumn(
  tables: Complex,
  recorded: Recorded,
  d: number,
  column: number,
  rows: RowSet,
  pulse: Pulse,
): number {
  const { facets } = tables.levels[d]!;
  const { start, length, touched } = recorded.reduced[d]!;
  const { store, words } = recorded;
  const mate = recorded.mate[d - 1]!;
  for (;;) {
    const pivot = rows.top();
    if (pivot < 0 || mate[pivot] === -1) return pivot;
    const m = mate[pivot]!;
    if (m >= 0) {
      rows.toggleAll(facets, m * (d + 1), (m + 1) * (d + 1));
      touchSimplex(tables, recorded, d, column, m);
      pulse.tick(d + 1);
    } else {
      const other = mateOfColumn(m);
      rows.toggleAll(store.data, start[other]!, start[other]! + length[other]!);
      for (let w = 0; w < words; w++) touched[column * words + w]! |= touched[other * words + w]!;
      pulse.tick(length[other]! + words);
    }
  }
}

function touchSimplex(tables: Complex, recorded: Recorded, d: number, column: number, s: number) {
  const { nodes } = tables.levels[d]!;
  const { touched } = recorded.reduced[d]!;
  const base = column * recorded.words;
  for (let i = s * (d + 1); i < (s + 1) * (d + 1); i++) {
    const x = nodes[i]!;
    touched[base + (x >>> 5)]! |= 1 << (x & 31);
  }
}
