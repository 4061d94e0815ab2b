import type { Tables } from '../../engine/fast/tables';
import type { SuffixColumns } from './recordedPairs';

/**
 * K's columns of one dimension that every pair of a row works out anew: position after q and pivot
 * row in [p, q], by id. Kept by merging while q moves on.
 */
export class SuffixList {
  columns: Int32Array;
  count = 0;
  private spare: Int32Array;

  constructor(
    private readonly tables: Tables,
    private readonly d: number,
    private readonly suffix: SuffixColumns,
  ) {
    this.columns = new Int32Array(suffix.columns.length);
    this.spare = new Int32Array(suffix.columns.length);
  }

  begin(p: number): void {
    const { start, columns } = this.suffix;
    const own = columns.subarray(start[p], start[p + 1]);
    this.columns.set(own);
    this.count = own.length;
  }

  /** From q - 1 to q. Ids ascend with positions, so that those that are over stand in front. */
  advance(q: number): void {
    const { start, columns: fresh } = this.suffix;
    const { columns, spare, count } = this;
    const { position } = this.tables.columns[this.d]!;
    let i = 0;
    while (i < count && position[columns[i]!]! <= q) i++;
    let j = start[q]!;
    const end = start[q + 1]!;
    let merged = 0;
    while (i < count && j < end) {
      spare[merged++] = columns[i]! < fresh[j]! ? columns[i++]! : fresh[j++]!;
    }
    while (i < count) spare[merged++] = columns[i++]!;
    while (j < end) spare[merged++] = fresh[j++]!;
    this.columns = spare;
    this.spare = columns;
    this.count = merged;
  }
}
