import { ColumnHeap } from './heap';
import { touches, type LinkColumns } from './links';
import { IntPool } from './pool';
import type { Pulse } from './pulse';
import { mateOfColumn, type Recorded } from './recorded';
import type { RowComplex } from './row';
import { widestStar } from './stars';
import { SwappedSum } from './swapped-sum';
import type { Tables } from './tables';

/** Which part of the swapped complex a row belongs to. */
export const Part = { Rest: 0, StarOfB: 1, StarOfA: 2 } as const;

/** Ints per reduced column in the heads: start, end of M's rows, end of b's, end of a's. */
const HEAD = 4;

/**
 * One column of the swapped complex while it is reduced, and what the reduced ones have claimed. All
 * arrays live as long as the matrix; claims carry a running number, so that those of earlier pairs
 * are told by being smaller and nothing is cleared between pairs.
 */
export class OverlayColumn extends SwappedSum {
  /** Entry of the edge that b, a as rows are paired with for nothing, -1 if none. */
  unionOfB = -1;
  unionOfA = -1;
  /** The pivot row found by `reduce`: its part and its id or local index. */
  part: number = Part.Rest;
  row = -1;
  /** Columns of M that lost their pivot row and start again at their turn. */
  readonly evicted: ColumnHeap;
  /** Columns of K after q that need work. */
  readonly later: ColumnHeap;

  /** Claim number of each row, per dimension 0..D, >= base if claimed by this pair. */
  readonly claimM: readonly Int32Array[];
  readonly claimB: readonly Int32Array[];
  readonly claimA: readonly Int32Array[];
  /** First claim number of this pair, of this dimension, and the next one. */
  base = 1;
  private baseOfDimension = 1;
  private next = 1;
  /** `queued[d][c]` = base: column c of K has been put into `later` by this pair. */
  readonly queued: readonly Int32Array[];

  private readonly heads: IntPool;
  private readonly pool: IntPool;

  constructor(
    tables: Tables,
    recorded: Recorded,
    rowComplex: RowComplex,
    private readonly links: readonly (LinkColumns | undefined)[],
    pulse: Pulse,
  ) {
    super(tables, recorded, rowComplex, pulse);
    const { budget, levels, stars, top, columns } = tables;
    const starSizes = stars.map(widestStar);
    this.claimM = levels.slice(0, top).map(({ count }) => budget.int32(count));
    this.claimB = starSizes.map((size) => budget.int32(size));
    this.claimA = starSizes.map((size) => budget.int32(size));
    this.queued = columns.map(({ count }) => budget.int32(count));
    this.heads = new IntPool(budget);
    this.pool = new IntPool(budget);
    this.evicted = new ColumnHeap(budget, 64);
    this.later = new ColumnHeap(budget, 64);
  }

  beginPair(p: number, q: number): void {
    this.p = p;
    this.q = q;
    if (this.next > 1 << 30) {
      for (const arrays of [this.claimM, this.claimB, this.claimA, this.queued]) {
        for (const array of arrays) array.fill(0);
      }
      this.next = 1;
    }
    // One number is used up even by a pair without claims, since `queued` is stamped with it too.
    this.base = this.next++;
  }

  beginDimension(d: number): void {
    this.dimension = d;
    this.baseOfDimension = this.next;
    this.heads.length = 0;
    this.pool.length = 0;
  }

  /** The column of b's star that its link pairs with row `local` of the star, -1 if a or time part them. */
  private holderInB(d: number, links: LinkColumns, local: number): number {
    const { p, q } = this;
    const c = links.claimer[this.tables.stars[d - 1]!.start[q]! + local]!;
    if (c < 0) return -1;
    const latest = this.tables.starColumns[d]!.free.latest[c]!;
    if (latest >= q || (latest > p && latest !== links.pivotLatest[c])) return -1;
    return touches(links, c, p) ? -1 : c;
  }

  /** The same for a's star. */
  private holderInA(d: number, links: LinkColumns, local: number): number {
    const c = links.claimer[this.tables.stars[d - 1]!.start[this.p]! + local]!;
    return c >= 0 && this.tables.starColumns[d]!.free.latest[c]! <= this.q ? c : -1;
  }

  /** Reduces the part in b's star alone; true if nothing is left of it, the column a cycle of M. */
  reduceWithinB(): boolean {
    for (let b = this.starB.top(); b >= 0; b = this.starB.top()) {
      if (this.stepStarB(b)) return false;
    }
    return true;
  }

  /**
   * Adds reduced columns until the pivot row is free (true; see `part` and `row`) or the column is
   * zero (false). A holder of M is added if it comes before this column, that is if its position is
   * at most `holderPosition` and it is below column `holderColumn`; else it is evicted. `later` is
   * this column's index if it is one of K after q, else -1.
   */
  reduce(holderPosition: number, holderColumn: number, later: number): boolean {
    const { rest, starB, starA, rowComplex, tables, q } = this;
    const d = this.dimension;
    const star = tables.stars[d - 1]!;
    const rowNodes = tables.levels[d - 1]!.nodes;
    const { facets } = tables.levels[d]!;
    const columnPosition = tables.columns[d]!.position;
    const claimM = this.claimM[d - 1]!;
    const mate = rowComplex.mate[d - 1]!;
    const startB = star.start[q]!;
    for (;;) {
      if (starA.top() >= 0) {
        if (this.stepStarA()) return true;
        continue;
      }
      const b = starB.top();
      const m = rest.top();
      if (b >= 0) {
        const time = Math.max(this.p, star.latest[startB + b]!);
        if (m < 0 || time >= rowNodes[m * d]!) {
          if (this.stepStarB(b)) return true;
          continue;
        }
      }
      if (m < 0) return false;
      const claim = claimM[m]!;
      if (claim >= this.base) {
        this.addClaimed(claim);
        continue;
      }
      const code = mate[m]!;
      if (code >= 0) {
        rest.toggleAll(facets, code * (d + 1), (code + 1) * (d + 1));
        this.pulse.tick(d + 1);
        continue;
      }
      this.part = Part.Rest;
      this.row = m;
      if (code <= -2) {
        const holder = mateOfColumn(code);
        if (columnPosition[holder]! < q) {
          if (columnPosition[holder]! <= holderPosition && holder < holderColumn) {
            this.addReducedOfM(holder);
            continue;
          }
          return true;
        }
      }
      if (later < 0 || !this.addImplicit(m, later)) return true;
    }
  }

  /** Claims the pivot row found by `reduce` and stores the column. */
  claim(): void {
    const d = this.dimension;
    const { heads, pool } = this;
    const claims = [this.claimM, this.claimB, this.claimA][this.part]![d - 1]!;
    claims[this.row] = this.next++;
    heads.reserve(HEAD);
    heads.push(pool.length);
    this.rest.drain(pool);
    heads.push(pool.length);
    this.starB.drain(pool);
    heads.push(pool.length);
    this.starA.drain(pool);
    heads.push(pool.length);
  }

  /** Column of M with position < q that holds the row found, -1 if none. */
  holderOfRow(): number {
    if (this.part !== Part.Rest) return -1;
    const code = this.rowComplex.mate[this.dimension - 1]![this.row]!;
    if (code > -2) return -1;
    const holder = mateOfColumn(code);
    return this.tables.columns[this.dimension]!.position[holder]! < this.q ? holder : -1;
  }

  /** Column of K after q that holds row m of M in K, -1 if none. */
  laterHolder(m: number): number {
    const code = this.recorded.mate[this.dimension - 1]![m]!;
    if (code > -2) return -1;
    const holder = mateOfColumn(code);
    return this.tables.columns[this.dimension]!.position[holder]! > this.q ? holder : -1;
  }

  /**
   * A column of K after q that nothing has changed holds its row without being listed. If it comes
   * before column `later` it is added (true); one that comes after will have to look elsewhere.
   */
  private addImplicit(m: number, later: number): boolean {
    const holder = this.laterHolder(m);
    if (holder < 0 || holder > later) return false;
    if (this.queued[this.dimension]![holder] === this.base) return false;
    const { suffix } = this.rowComplex;
    const pushed = suffix.isPushed(this.dimension, holder, this.q);
    const { start, length } = this.recorded.reduced[this.dimension]!;
    const from = pushed ? suffix.startOf(this.dimension, holder) : start[holder]!;
    const end = pushed ? suffix.endOf(this.dimension, holder) : from + length[holder]!;
    this.rest.toggleAll(this.recorded.store.data, from, end);
    this.pulse.tick(end - from);
    return true;
  }

  /** One addition with a's top row as the pivot; true if that row is free. */
  private stepStarA(): boolean {
    const d = this.dimension;
    const a = this.starA.top();
    const claim = this.claimA[d - 1]![a]!;
    if (claim >= this.base) {
      this.addClaimed(claim);
      return false;
    }
    const star = this.tables.stars[d - 1]!;
    const union = d === 1 ? this.unionOfA : star.firstUnion[star.start[this.p]! + a]!;
    if (union >= 0) {
      this.addStarA(union);
      return false;
    }
    const links = this.links[d];
    const holder = links === undefined ? -1 : this.holderInA(d, links, a);
    if (holder >= 0) {
      this.addLinkColumn(links!, holder);
      return false;
    }
    this.part = Part.StarOfA;
    this.row = a;
    return true;
  }

  /** One addition with row b of b's star as the pivot; true if that row is free. */
  private stepStarB(b: number): boolean {
    const d = this.dimension;
    const claim = this.claimB[d - 1]![b]!;
    if (claim >= this.base) {
      this.addClaimed(claim);
      return false;
    }
    const union = d === 1 ? this.unionOfB : this.unionWithoutA(b);
    if (union >= 0) {
      this.addStarB(union);
      return false;
    }
    const links = this.links[d];
    const holder = links === undefined ? -1 : this.holderInB(d, links, b);
    if (holder >= 0) {
      this.addLinkColumn(links!, holder);
      return false;
    }
    this.part = Part.StarOfB;
    this.row = b;
    return true;
  }

  /** The first union of a row of b's star that does not add a. */
  private unionWithoutA(b: number): number {
    const d = this.dimension;
    const star = this.tables.stars[d - 1]!;
    const place = star.start[this.q]! + b;
    const union = star.firstUnion[place]!;
    if (union < 0) return -1;
    const sigma = this.tables.levels[d]!.facets[union]!;
    const added = this.tables.levels[d - 1]!.nodes[sigma * d + d - 1];
    return added === this.p ? star.secondUnion[place]! : union;
  }

  private addClaimed(claim: number): void {
    const { data } = this.pool;
    const at = (claim - this.baseOfDimension) * HEAD;
    const heads = this.heads.data;
    const start = heads[at]!;
    this.rest.toggleAll(data, start, heads[at + 1]!);
    this.starB.toggleAll(data, heads[at + 1]!, heads[at + 2]!);
    this.starA.toggleAll(data, heads[at + 2]!, heads[at + 3]!);
    this.pulse.tick(heads[at + 3]! - start);
  }
}
