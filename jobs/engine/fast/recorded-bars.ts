import { mateOfColumn, Status, type Recorded } from './recorded';
import { barKey } from './row';
import type { Scale } from './scale';
import type { Complex } from './tables';

/** The recorded barcode of one dimension, by rank of f. */
export interface RankedBars {
  /** Finite bars of positive length by (birth, death): values of f, and the key of `barKey`. */
  readonly births: Float64Array;
  readonly deaths: Float64Array;
  readonly keys: Float64Array;
  /** Birth ranks of the infinite bars, ascending. */
  readonly infinite: Int32Array;
}

/** Pairs of one dimension k of classes, by the position at which something happens to them. */
export interface RecordedEvents {
  /** Birth ranks of the classes born before q that die at q: diedBirth[diedStart[q]..diedStart[q+1]-1]. */
  readonly diedStart: Int32Array;
  readonly diedBirth: Int32Array;
  /** Number of classes born at q that are alive after q. */
  readonly born: Int32Array;
}

/** Columns of dimension d by the position of their pivot row, if they come later than it. */
export interface LaterColumns {
  readonly start: Int32Array;
  readonly columns: Int32Array;
}

export interface RecordedBars {
  /** Dimensions 0..D. */
  readonly bars: readonly RankedBars[];
  readonly events: readonly RecordedEvents[];
  /** Dimensions 1..D+1 (index 0 unused). */
  readonly laterByPivot: readonly LaterColumns[];
}

export function readRecordedBars(tables: Complex, recorded: Recorded, scale: Scale): RecordedBars {
  const { top, budget } = tables;
  const dimensions = Array.from({ length: top }, (_, k) => k);
  return {
    bars: dimensions.map((k) => rankedBars(tables, recorded, scale, k)),
    events: dimensions.map((k) => recordedEvents(tables, recorded, scale, k)),
    laterByPivot: tables.levels.map((_, d) =>
      d === 0
        ? { start: budget.int32(0), columns: budget.int32(0) }
        : laterColumns(tables, recorded, d),
    ),
  };
}

/** Calls `visit(birth position, death position, column)` for every negative column of dimension d. */
export function eachPair(
  tables: Complex,
  recorded: Recorded,
  d: number,
  visit: (birth: number, death: number, column: number) => void,
): void {
  const { count, position } = tables.columns[d]!;
  const { status, start } = recorded.reduced[d]!;
  const { nodes } = tables.levels[d - 1]!;
  for (let c = 0; c < count; c++) {
    if (status[c] !== Status.Negative) continue;
    visit(nodes[recorded.store.data[start[c]!]! * d]!, position[c]!, c);
  }
}

/** Calls `visit(position, mate, simplex)` for every class of dimension k that K gives birth to. */
export function eachClass(
  tables: Complex,
  recorded: Recorded,
  k: number,
  visit: (birth: number, mate: number, simplex: number) => void,
): void {
  const mate = recorded.mate[k]!;
  if (k === 0) {
    const { childCount } = tables.levels[0]!;
    for (let v = 0; v < tables.nodeCount; v++) if (childCount[v] === 0) visit(v, mate[v]!, v);
    return;
  }
  const { count, simplex, position } = tables.columns[k]!;
  const { status } = recorded.reduced[k]!;
  for (let c = 0; c < count; c++) {
    if (status[c] === Status.Zero || status[c] === Status.Cleared) {
      visit(position[c]!, mate[simplex[c]!]!, simplex[c]!);
    }
  }
}

function rankedBars(tables: Complex, recorded: Recorded, scale: Scale, k: number): RankedBars {
  const { rank, value } = scale;
  const { budget } = tables;
  const found: number[] = [];
  eachPair(tables, recorded, k + 1, (birth, death) => {
    if (rank[birth] !== rank[death]) found.push(barKey(rank[birth]!, rank[death]!, value.length));
  });
  const keys = budget.float64(found.length);
  keys.set(found);
  keys.sort();
  const births = budget.float64(keys.length);
  const deaths = budget.float64(keys.length);
  for (let i = 0; i < keys.length; i++) {
    births[i] = value[Math.floor(keys[i]! / value.length)]!;
    deaths[i] = value[keys[i]! % value.length]!;
  }
  const infinite: number[] = [];
  eachClass(tables, recorded, k, (birth, mate) => {
    if (mate === -1) infinite.push(rank[birth]!);
  });
  return { births, deaths, keys, infinite: Int32Array.from(infinite).sort() };
}

function recordedEvents(
  tables: Complex,
  recorded: Recorded,
  scale: Scale,
  k: number,
): RecordedEvents {
  const { nodeCount, budget } = tables;
  const diedStart = budget.int32(nodeCount + 1);
  const died: number[] = [];
  eachPair(tables, recorded, k + 1, (birth, death) => {
    if (birth === death) return;
    diedStart[death + 1]!++;
    died.push(scale.rank[birth]!);
  });
  for (let q = 0; q < nodeCount; q++) diedStart[q + 1]! += diedStart[q]!;
  const diedBirth = budget.int32(died.length);
  diedBirth.set(died);
  const born = budget.int32(nodeCount);
  eachClass(tables, recorded, k, (birth, mate) => {
    const killer = mate <= -2 ? tables.columns[k + 1]!.position[mateOfColumn(mate)]! : nodeCount;
    if (killer > birth) born[birth]!++;
  });
  return { diedStart, diedBirth, born };
}

function laterColumns(tables: Complex, recorded: Recorded, d: number): LaterColumns {
  const { nodeCount, budget } = tables;
  const start = budget.int32(nodeCount + 1);
  let total = 0;
  eachPair(tables, recorded, d, (birth, death) => {
    if (birth === death) return;
    start[birth + 1]!++;
    total++;
  });
  for (let x = 0; x < nodeCount; x++) start[x + 1]! += start[x]!;
  const next = start.slice();
  const columns = budget.int32(total);
  eachPair(tables, recorded, d, (birth, death, column) => {
    if (birth !== death) columns[next[birth]!++] = column;
  });
  return { start, columns };
}
