import { Annotation } from './annotation';
import type { Changes } from './changes';
import { touches, vanishes, type LinkColumns } from './links';
import { OverlayColumn, Part } from './overlay-column';
import { IntPool } from './pool';
import type { RecordedBars } from './recorded-bars';
import type { Recorded } from './recorded';
import type { RowComplex } from './row';
import type { Pulse } from './pulse';
import { isSettledA, isSettledB, type SettledColumns } from './settled';
import type { StarColumns } from './star-columns';
import { StarZeros } from './star-zeros';
import type { Tables } from './tables';
import type { ZeroTests } from './zero-policy';

/**
 * The barcode of the swapped order as a difference to the recorded one. Nodes a and b, recorded at
 * p < q, trade places: for p <= t < q the complex is M up to t (K without a) with b coned over its
 * lower link, afterwards it is K. So only b's star, a's star (which enters at q) and a few of K's
 * columns after q are reduced; all else is taken from K and from M.
 */
export class Overlay {
  private readonly column: OverlayColumn;
  /** Per dimension of columns, what tells zero columns of stars beforehand; absent where it costs more. */
  private readonly zeros: readonly (StarZeros | undefined)[];
  /** Columns of K that need work after q whatever b is: column and last q, per dimension. */
  private readonly active: { readonly columns: IntPool; readonly until: IntPool }[];

  constructor(
    private readonly tables: Tables,
    private readonly recorded: Recorded,
    private readonly bars: RecordedBars,
    private readonly row: RowComplex,
    private readonly changes: Changes,
    private readonly pulse: Pulse,
    private readonly links: readonly (LinkColumns | undefined)[],
    private readonly settled: readonly (SettledColumns | undefined)[],
    zeroTests: ZeroTests,
  ) {
    this.zeros = links.map((link, d) =>
      link === undefined
        ? undefined
        : new StarZeros(
            link,
            new Annotation(tables, recorded, row, d - 1, pulse),
            tables,
            zeroTests,
          ),
    );
    this.column = new OverlayColumn(tables, recorded, row, links, pulse);
    this.active = tables.levels.map(() => ({
      columns: new IntPool(tables.budget, 64),
      until: new IntPool(tables.budget, 64),
    }));
  }

  /** After M of row p has been reduced. */
  beginRow(p: number): void {
    this.zeros.forEach((zeros, d) => zeros?.prepare(p, this.row.unclaimed[d - 1]!));
    for (const { columns, until } of this.active) columns.length = until.length = 0;
  }

  /** Brings the sweep over q forward to q (each q of a row once, ascending). */
  advance(q: number): void {
    for (let d = 1; d <= this.tables.top; d++) {
      const { columns, until } = this.active[d]!;
      let kept = 0;
      for (let i = 0; i < columns.length; i++) {
        if (until.data[i]! < q) continue;
        columns.data[kept] = columns.data[i]!;
        until.data[kept++] = until.data[i]!;
      }
      columns.length = until.length = kept;
      const { head, next, keys, codes } = this.row.suffix.needed[d]!;
      for (let item = head[q]!; item >= 0; item = next[item]!) {
        columns.push(keys[item]!);
        until.push(codes[item]!);
      }
    }
  }

  /** Computes the pair (p, q) and hands what overlay and suffix change to `changes`. */
  swap(p: number, q: number): void {
    const { column, tables, changes } = this;
    column.beginPair(p, q);
    this.pairNodes(p, q);
    for (let d = tables.top; d >= 1; d--) {
      column.beginDimension(d);
      this.reduceStarOfB(d);
      this.reduceStarOfA(d);
      this.reduceLater(d);
    }
    if (column.unionOfB < 0) changes.infinite(0, p, 1);
    if (column.unionOfA < 0) changes.infinite(0, q, 1);
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
    const { column, tables } = this;
    const { p, q, evicted } = column;
    const { free, single, singleNode } = tables.starColumns[d]!;
    let i = free.start[q]!;
    const iEnd = free.start[q + 1]!;
    let j = single.start[q]!;
    const jEnd = single.start[q + 1]!;
    while (j < jEnd && singleNode[j]! < p) j++;
    this.zeros[d]?.begin();
    const settled = this.settled[d];
    for (;;) {
      if (settled !== undefined) {
        while (i < iEnd && free.latest[i]! < q && isSettledB(settled, i, p, q)) i++;
      }
      const hasFree = i < iEnd && free.latest[i]! < q;
      const hasSingle = j < jEnd && singleNode[j] === p && single.latest[j]! < q;
      const takeSingle = hasSingle && (!hasFree || single.sigma[j]! < free.sigma[i]!);
      const list = takeSingle ? single : free;
      const k = takeSingle ? j : i;
      const time = hasFree || hasSingle ? Math.max(p, list.latest[k]!) : q;
      const m = evicted.peek();
      if (m >= 0 && tables.columns[d]!.position[m]! <= time) this.reduceEvicted(d, evicted.take());
      else if (hasFree || hasSingle) {
        this.reduceStarColumn(d, list, k, time);
        if (takeSingle) j++;
        else i++;
      } else return;
    }
  }

  private reduceStarColumn(d: number, list: StarColumns, k: number, time: number): void {
    const { column, tables, changes } = this;
    const { p } = column;
    const entry = list.entry[k]!;
    // Without a it is the first union of its facet, hence paired for nothing.
    if (list.elder[k] === p || (d === 1 && entry === column.unionOfB)) return;
    if (this.contains(d, entry, p)) return;
    const claimed = d < tables.top && column.claimB[d]![list.local[k]!]! >= column.base;
    if (!claimed && this.reduceOfB(d, list, k, time)) this.settle(d, time);
    else if (d < tables.top) changes.infinite(d, time, 1);
  }

  /** True unless column k of b's star is zero, as an edge is whose ends are connected already. */
  private reduceOfB(d: number, list: StarColumns, k: number, time: number): boolean {
    const { column, tables, pulse } = this;
    if (d === 1 && column.unionOfB >= 0 && this.row.components[time] === 1) return false;
    const links = list === tables.starColumns[d]!.free ? this.links[d] : undefined;
    const known = links !== undefined && !touches(links, k, column.p);
    const zeros = known && !vanishes(links, k) ? undefined : this.zeros[d];
    const before = pulse.work;
    if (!known) column.addStarB(list.entry[k]!);
    else if (zeros?.isZero(k, time) === true) {
      zeros.met(0);
      return false;
    } else column.addLinkColumn(links, k);
    if (
      !known &&
      zeros?.ready === true &&
      column.reduceWithinB() &&
      zeros.isZeroCycle(column, time)
    ) {
      zeros.met(0);
      return false;
    }
    if (column.reduce(time, this.row.start[d]!.length, -1)) return true;
    zeros?.met(pulse.work - before);
    return false;
  }

  /** True if node x is in the simplex of an entry of dimension d. */
  private contains(d: number, entry: number, x: number): boolean {
    const { nodes } = this.tables.levels[d]!;
    const at = entry - (entry % (d + 1));
    for (let i = at; i <= at + d; i++) if (nodes[i] === x) return true;
    return false;
  }

  /** A column of M that lost its pivot row: negative in M, perhaps positive now. */
  private reduceEvicted(d: number, c: number): void {
    const { column, tables, changes } = this;
    const { simplex, position } = tables.columns[d]!;
    const claimed = d < tables.top && column.claimM[d]![simplex[c]!]! >= column.base;
    if (!claimed && this.zeros[d]?.endsCombination(c) !== true) {
      column.addReducedOfM(c);
      if (column.reduce(column.q, c, -1)) return this.settle(d, position[c]!);
    }
    if (d < tables.top) changes.infinite(d, position[c]!, 1);
  }

  /** (ii) Critical columns of a's star, b allowed in sigma. All of M before q comes first. */
  private reduceStarOfA(d: number): void {
    const { column, tables, changes } = this;
    const { p, q } = column;
    const { free } = tables.starColumns[d]!;
    this.zeros[d]?.begin();
    const settled = this.settled[d];
    for (let i = free.start[p]!; i < free.start[p + 1]! && free.latest[i]! <= q; i++) {
      if (settled !== undefined && isSettledA(settled, i, q)) continue;
      const entry = free.entry[i]!;
      if (d === 1 && entry === column.unionOfA) continue;
      const claimed = d < tables.top && column.claimA[d]![free.local[i]!]! >= column.base;
      if (!claimed && this.reduceOfA(d, i, entry)) this.settle(d, q);
      else if (d < tables.top) changes.infinite(d, q, 1);
    }
  }

  /** True unless column i of a's star is zero. One that survives in a's link has been left out. */
  private reduceOfA(d: number, i: number, entry: number): boolean {
    const { column } = this;
    if (d === 1 && column.unionOfA >= 0 && this.row.components[column.q] === 1) return false;
    const links = this.links[d];
    const zeros = this.zeros[d];
    const before = this.pulse.work;
    const isZero = zeros?.isZero(i, column.q) === true;
    if (!isZero) {
      if (links === undefined) column.addStarA(entry);
      else column.addLinkColumn(links, i);
      if (column.reduce(column.q, this.row.start[d]!.length, -1)) return true;
    }
    zeros?.met(isZero ? 0 : this.pulse.work - before);
    return false;
  }

  /**
   * (iii) Columns of K after q with their pivot in [p, q]. Only those need work whose pivot row
   * contains b, that touch a, or whose row somebody else has taken; the others stay as they are.
   */
  private reduceLater(d: number): void {
    const { column, bars, tables } = this;
    const { later, q } = column;
    const { position } = tables.columns[d]!;
    const { start, columns } = bars.laterByPivot[d]!;
    for (let i = start[q]!; i < start[q + 1]!; i++) this.queue(d, columns[i]!);
    const active = this.active[d]!.columns;
    for (let i = 0; i < active.length; i++) this.queue(d, active.data[i]!);
    while (later.peek() >= 0) {
      const c = later.take();
      column.addLaterColumn(c);
      if (!column.reduce(q, this.row.start[d]!.length, c)) {
        throw new Error('A column after the swapped block became zero.');
      }
      this.settle(d, position[c]!);
    }
  }

  /** Takes the bar of a column of K after q away, to be replaced at the column's turn. */
  private queue(d: number, c: number): void {
    const { column, changes, tables, recorded } = this;
    if (column.queued[d]![c] === column.base) return;
    column.queued[d]![c] = column.base;
    column.later.insert(c);
    const pivot = recorded.store.data[recorded.reduced[d]!.start[c]!]!;
    const birth = tables.levels[d - 1]!.nodes[pivot * d]!;
    changes.finite(d - 1, birth, tables.columns[d]!.position[c]!, -1);
    changes.infinite(d - 1, birth, 1);
  }

  /** The column reduced last claims its row: a bar from the row's time to the column's `time`. */
  private settle(d: number, time: number): void {
    const { column, tables, changes } = this;
    const { part, row, p, q } = column;
    let birth = q;
    if (part === Part.Rest) {
      birth = tables.levels[d - 1]!.nodes[row * d]!;
      const holder = column.holderOfRow();
      if (holder >= 0) {
        column.evicted.insert(holder);
        changes.finite(d - 1, birth, tables.columns[d]!.position[holder]!, -1);
      } else {
        changes.infinite(d - 1, birth, -1);
        const displaced = column.laterHolder(row);
        if (displaced >= 0) this.queue(d, displaced);
      }
    } else {
      if (part === Part.StarOfB) {
        const star = tables.stars[d - 1]!;
        birth = Math.max(p, star.latest[star.start[q]! + row]!);
      }
      changes.infinite(d - 1, birth, -1);
    }
    changes.finite(d - 1, birth, time, 1);
    column.claim();
  }
}
