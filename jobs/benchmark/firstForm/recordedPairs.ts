import { barKey } from '../../engine/fast/row';
import { Status, type Recorded } from '../../engine/fast/recorded';
import type { Scale } from '../../engine/fast/scale';
import type { Tables } from '../../engine/fast/tables';

/** The recorded barcode of one dimension with the positions at which its bars begin and end. */
export interface RecordedPairs {
  /** Finite bars of positive length by (birth, death): positions, `barKey`, and values of f. */
  readonly birthPosition: Int32Array;
  readonly deathPosition: Int32Array;
  readonly keys: Float64Array;
  readonly births: Float64Array;
  readonly deaths: Float64Array;
  /** Positions at which the infinite bars are born, ascending. */
  readonly infinite: Int32Array;
}

/** Columns of one dimension by the position of their pivot row, if they come later than it. */
export interface SuffixColumns {
  /** columns[start[x]..start[x+1]-1] have their pivot row at position x, ascending. */
  readonly start: Int32Array;
  readonly columns: Int32Array;
}

/** Dimension k of classes, 0..D. */
export function readRecordedPairs(
  tables: Tables,
  recorded: Recorded,
  scale: Scale,
  k: number,
): RecordedPairs {
  const { rank, value } = scale;
  const found: { birth: number; death: number; key: number }[] = [];
  eachPair(tables, recorded, k + 1, (birth, death) => {
    if (rank[birth] === rank[death]) return;
    found.push({ birth, death, key: barKey(rank[birth]!, rank[death]!, value.length) });
  });
  found.sort((one, other) => one.key - other.key || one.birth - other.birth);
  return {
    birthPosition: Int32Array.from(found, ({ birth }) => birth),
    deathPosition: Int32Array.from(found, ({ death }) => death),
    keys: Float64Array.from(found, ({ key }) => key),
    births: Float64Array.from(found, ({ birth }) => value[rank[birth]!]!),
    deaths: Float64Array.from(found, ({ death }) => value[rank[death]!]!),
    infinite: infiniteBirths(tables, recorded, k),
  };
}

/** Dimension d of columns, 1..D+1. */
export function readSuffixColumns(tables: Tables, recorded: Recorded, d: number): SuffixColumns {
  const byPivot: number[][] = Array.from({ length: tables.nodeCount }, () => []);
  eachPair(tables, recorded, d, (birth, death, column) => {
    if (birth !== death) byPivot[birth]!.push(column);
  });
  const start = new Int32Array(tables.nodeCount + 1);
  byPivot.forEach((columns, x) => (start[x + 1] = start[x]! + columns.length));
  return { start, columns: Int32Array.from(byPivot.flat()) };
}

function eachPair(
  tables: Tables,
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

function infiniteBirths(tables: Tables, recorded: Recorded, k: number): Int32Array {
  const mate = recorded.mate[k]!;
  const births: number[] = [];
  if (k === 0) {
    const { childCount } = tables.levels[0]!;
    for (let v = 0; v < tables.nodeCount; v++) {
      if (childCount[v] === 0 && mate[v] === -1) births.push(v);
    }
  } else {
    const { count, simplex, position } = tables.columns[k]!;
    const { status } = recorded.reduced[k]!;
    for (let c = 0; c < count; c++) {
      if (status[c] === Status.Zero && mate[simplex[c]!] === -1) births.push(position[c]!);
    }
  }
  return Int32Array.from(births).sort();
}
