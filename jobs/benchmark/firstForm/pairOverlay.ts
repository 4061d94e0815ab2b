import { ColumnHeap } from '../../engine/fast/heap';
import type { RowComplex } from '../../engine/fast/row';
import type { StarColumns } from '../../engine/fast/star-columns';
import type { Tables } from '../../engine/fast/tables';
import type { PairColumn } from './pairColumn';
import { Part } from './pairColumn';
import type { SuffixList } from './suffixList';

/** Receives what the overlay finds in one dimension of classes; positions in the swapped order. */
export interface BarReceiver {
  finite(k: number, birth: number, death: number): void;
  infinite(k: number, birth: number): void;
}

/**
 * The pairs of the swapped order with a row or a column in one of the two stars, evicted columns of
 * M, and every column of K after q whose pivot row lies in the block, each reduced explicitly.
 */
export class PairOverlay {
  readonly column: PairColumn;
  private readonly evicted: ColumnHeap;

  constructor(
    private readonly tables: Tables,
    private readonly row: RowComplex,
    /** By dimension 1..D+1 (index 0 unused), advanced to q. */
    private readonly suffix: readonly SuffixList[],
    column: PairColumn,
    private readonly bars: BarReceiver,
  ) {
    this.column = column;
    this.evicted = new ColumnHeap(tables.budget, 64);
  }

  swap(p: number, q: number): void {
    const { column, tables, bars } = this;
    column.beginPair(p, q);
    this.pairNodes(p, q);
    for (let d = tables.top; d >= 1; d--) {
      column.beginDimension(d);
      this.reduceStarOfB(d);
      this.reduceStarOfA(d);
      this.reduceSuffix(d);
    }
    if (column.unionOfB < 0 && column.claimB[0]![0]! < column.base) bars.infinite(0, p);
    if (column.unionOfA < 0 && column.claimA[0]![0]! < column.base) bars.infinite(0, q);
  }

  /**
   * b, standing at p, is paired for nothing if its earliest neighbour other than a stands before p;
   * a, standing at q, if it has a neighbour up to q, b included.
   */
  private pairNodes(p: number, q: number): void {
    const { neighbours } = this.tables;
    const star = this.tables.stars[0]!;
    const first = neighbours.start[q]!;
    const ofB = neighbours.items[first] === p ? first + 1 : first;
    const paired = ofB < neighbours.start[q + 1]! && neighbours.items[ofB]! < p;
    const unionOfB = ofB === first ? star.firstUnion[q]! : star.secondUnion[q]!;
    this.column.unionOfB = paired ? unionOfB : -1;
    const ofA = neighbours.start[p]!;
    const hasOne = ofA < neighbours.start[p + 1]! && neighbours.items[ofA]! <= q;
    this.column.unionOfA = hasOne ? star.firstUnion[p]! : -1;
  }

  /** (i) Critical columns of b's star, in key order with the columns of M they evict. */
  private reduceStarOfB(d: number): void {
    const { column, tables, evicted } = this;
    const { p, q } = column;
    const { position } = tables.columns[d]!;
    const { free, single, singleNode } = tables.starColumns[d]!;
    let i = free.start[q]!;
    const iEnd = free.start[q + 1]!;
    let j = single.start[q]!;
    const jEnd = single.start[q + 1]!;
    while (j < jEnd && singleNode[j]! < p) j++;
    for (;;) {
      const hasFree = i < iEnd && free.latest[i]! < q;
      const hasSingle = j < jEnd && singleNode[j] === p && single.latest[j]! < q;
      const takeSingle = hasSingle && (!hasFree || single.sigma[j]! < free.sigma[i]!);
      const list = takeSingle ? single : free;
      const k = takeSingle ? j : i;
      const time = hasFree || hasSingle ? Math.max(p, list.latest[k]!) : q;
      const m = evicted.peek();
      if (m >= 0 && position[m]! <= time) this.reduceEvicted(d, evicted.take());
      else if (hasFree || hasSingle) {
        this.reduceOfB(d, list, k, time);
        if (takeSingle) j++;
        else i++;
      } else return;
    }
  }

  private reduceOfB(d: number, list: StarColumns, k: number, time: number): void {
    const { column, tables, bars } = this;
    const { p } = column;
    const entry = list.entry[k]!;
    // Without a it is the first union of its facet, hence paired for nothing.
    if (list.elder[k] === p || (d === 1 && entry === column.unionOfB)) return;
    if (this.contains(d, entry, p)) return;
    if (d < tables.top && column.claimB[d]![list.local[k]!]! >= column.base) return;
    column.addStarB(entry);
    if (column.reduce(time, this.row.start[d]!.length)) this.settle(d, time);
    else if (d < tables.top) bars.infinite(d, time);
  }

  /** True if node x is in the simplex of an entry of dimension d. */
  private contains(d: number, entry: number, x: number): boolean {
    const { nodes } = this.tables.levels[d]!;
    const at = entry - (entry % (d + 1));
    for (let i = at; i <= at + d; i++) if (nodes[i] === x) return true;
    return false;
  }

  /** A column of M that lost its pivot row starts again from its reduced form. */
  private reduceEvicted(d: number, c: number): void {
    const { column, tables, bars } = this;
    const { simplex, position } = tables.columns[d]!;
    if (d < tables.top && column.claimM[d]![simplex[c]!]! >= column.base) return;
    column.addReducedOfM(c);
    if (column.reduce(column.q, c)) this.settle(d, position[c]!);
    else if (d < tables.top) bars.infinite(d, position[c]!);
  }

  /** (ii) Critical columns of a's star, b allowed in sigma. All of M before q comes first. */
  private reduceStarOfA(d: number): void {
    const { column, tables, bars } = this;
    const { p, q } = column;
    const { free } = tables.starColumns[d]!;
    for (let i = free.start[p]!; i < free.start[p + 1]! && free.latest[i]! <= q; i++) {
      const entry = free.entry[i]!;
      if (d === 1 && entry === column.unionOfA) continue;
      if (d < tables.top && column.claimA[d]![free.local[i]!]! >= column.base) continue;
      column.addStarA(entry);
      if (column.reduce(q, this.row.start[d]!.length)) this.settle(d, q);
      else if (d < tables.top) bars.infinite(d, q);
    }
  }

  /** (iii) Every column of K after q with its pivot row in [p, q]. */
  private reduceSuffix(d: number): void {
    const { column, tables } = this;
    const { position } = tables.columns[d]!;
    const { columns, count } = this.suffix[d]!;
    for (let i = 0; i < count; i++) {
      const c = columns[i]!;
      column.addSuffix(c);
      if (!column.reduce(column.q, this.row.start[d]!.length)) {
        throw new Error('A column after the swapped block became zero.');
      }
      this.settle(d, position[c]!);
    }
  }

  /** The column reduced last claims its row: a bar from the row's time to the column's. */
  private settle(d: number, time: number): void {
    const { column, tables } = this;
    const { part, row, p, q } = column;
    let birth = q;
    if (part === Part.StarOfB) {
      const { latest, start } = tables.stars[d - 1]!;
      birth = Math.max(p, latest[start[q]! + row]!);
    } else if (part === Part.Rest) {
      birth = tables.levels[d - 1]!.nodes[row * d]!;
      const holder = column.holderOfRow();
      if (holder >= 0) this.evicted.insert(holder);
    }
    this.bars.finite(d - 1, birth, time);
    column.claim();
  }
}
