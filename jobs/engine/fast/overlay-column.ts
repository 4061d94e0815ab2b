import { RowSet } from './bitset';
import { ColumnHeap } from './heap';
import { touches, type LinkColumns } from './links';
import { IntPool } from './pool';
import type { Pulse } from './pulse';
import { mateOfColumn, type Recorded } from './recorded';
import type { RowComplex } from './row';
import type { Tables } from './tables';

/** Which part of the swapped complex a row belongs to. */
export const Part = { Rest: 0, StarOfB: 1, StarOfA: 2 } as const;

/** Ints per reduced column in the heads: start, end of M's rows, end of b's, end of a's. */
const HEAD = 4;

/**
 * One column of the swapped complex while it is reduced, and what the reduced ones have claimed.
 * A column has three parts: rows of M by id, rows of b's star and of a's star by local index. All
 * arrays live as long as the matrix; claims carry a running number, so that those of earlier pairs
 * are told by being smaller and nothing is cleared between pairs.
 */
export class OverlayColumn {
  /** Dimension of the column; its rows have one less. */
  dimension = 0;
  /** Positions: a goes out at p and comes in at q, where b goes out. */
  p = 0;
  q = 0;
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

  private readonly rest: RowSet;
  private readonly starB: RowSet;
  private readonly starA: RowSet;
  private readonly heads: IntPool;
  private readonly pool: IntPool;

  constructor(
    private readonly tables: Tables,
    private readonly recorded: Recorded,
    private readonly rowComplex: RowComplex,
    private readonly links: readonly (LinkColumns | undefined)[],
    private readonly pulse: Pulse,
  ) {
    const { budget, levels, stars, top, columns } = tables;
    const starSizes = stars.map(({ start }) => {
      let size = 0;
      for (let x = 0; x + 1 < start.length; x++) size = Math.max(size, start[x + 1]! - start[x]!);
      return size;
    });
    this.claimM = levels.slice(0, top).map(({ count }) => budget.int32(count));
    this.claimB = starSizes.map((size) => budget.int32(size));
    this.claimA = starSizes.map((size) => budget.int32(size));
    this.queued = columns.map(({ count }) => budget.int32(count));
    const widest = Math.max(...levels.slice(0, top).map((level) => level.count));
    this.rest = new RowSet(budget, widest);
    this.starB = new RowSet(budget, Math.max(...starSizes));
    this.starA = new RowSet(budget, Math.max(...starSizes));
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

  /** Adds the boundary of b + sigma (`entry` in dimension d). */
  addStarB(entry: number): void {
    const d = this.dimension;
    const { nodes, facets } = this.tables.levels[d]!;
    const local = this.tables.stars[d - 1]!.local;
    const slot = entry % (d + 1);
    const at = entry - slot;
    for (let i = 0; i <= d; i++) {
      if (i === slot) this.rest.toggle(facets[at + i]!);
      else this.starB.toggle(local[this.entryInFacet(facets[at + i]!, i, slot, nodes[entry]!)]!);
    }
    this.pulse.tick(2 * d);
  }

  /** Adds the boundary of a + sigma, where sigma may contain b. */
  addStarA(entry: number): void {
    const d = this.dimension;
    const { nodes, facets } = this.tables.levels[d]!;
    const local = this.tables.stars[d - 1]!.local;
    const slot = entry % (d + 1);
    const at = entry - slot;
    for (let i = 0; i <= d; i++) {
      if (i === slot) this.toggleWithoutA(facets[at + i]!);
      else this.starA.toggle(local[this.entryInFacet(facets[at + i]!, i, slot, nodes[entry]!)]!);
    }
    this.pulse.tick(2 * d);
  }

  /** Adds column c of a star, reduced in its link: of a's star, or of b's and not touched by a. */
  addLinkColumn(links: LinkColumns, c: number): void {
    const { items, start, middle } = links;
    const from = start[c]!;
    const end = start[c + 1]!;
    const rowsEnd = middle[c]!;
    const ofA =
      this.tables.levels[this.dimension]!.nodes[
        this.tables.starColumns[this.dimension]!.free.entry[c]!
      ] === this.p;
    if (ofA) {
      this.starA.toggleAll(items, from, rowsEnd);
      for (let i = rowsEnd; i < end; i++) this.toggleWithoutA(items[i]!);
    } else {
      this.starB.toggleAll(items, from, rowsEnd);
      this.rest.toggleAll(items, rowsEnd, end);
    }
    this.pulse.tick(end - from);
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

  /** Starts from the reduced column of M. */
  addReducedOfM(c: number): void {
    const start = this.rowComplex.start[this.dimension]![c]!;
    const length = this.rowComplex.length[this.dimension]![c]!;
    this.rest.toggleAll(this.recorded.store.data, start, start + length);
    this.pulse.tick(length);
  }

  /** Adds K's reduced column c, of position > q, its rows rewritten for the swapped order. */
  addLaterColumn(c: number): void {
    const d = this.dimension;
    const reduced = this.recorded.reduced[d]!;
    const { data } = this.recorded.store;
    const { nodes } = this.tables.levels[d - 1]!;
    const local = this.tables.stars[d - 1]!.local;
    const from = reduced.start[c]!;
    const to = from + reduced.length[c]!;
    for (let i = from; i < to; i++) {
      const row = data[i]!;
      let slot = 0;
      while (slot < d && nodes[row * d + slot] !== this.p) slot++;
      if (slot < d) this.starA.toggle(local[row * d + slot]!);
      else this.toggleWithoutA(row);
    }
    this.pulse.tick(2 * (to - from));
  }

  /** Reduces the part in b's star alone; true if nothing is left of it, the column a cycle of M. */
  reduceWithinB(): boolean {
    for (let b = this.starB.top(); b >= 0; b = this.starB.top()) {
      if (this.stepStarB(b)) return false;
    }
    return true;
  }

  /** Moves a column that has no row in either star into `cells`. */
  takeCycle(cells: IntPool): void {
    this.rest.drain(cells);
  }

  addCycle(cells: IntPool): void {
    this.rest.toggleAll(cells.data, 0, cells.length);
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
    const { start, length } = this.recorded.reduced[this.dimension]!;
    this.rest.toggleAll(this.recorded.store.data, start[holder]!, start[holder]! + length[holder]!);
    this.pulse.tick(length[holder]!);
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

  /** A row without a: of b's star if its latest node is b, else of M. */
  private toggleWithoutA(row: number): void {
    const d = this.dimension;
    if (this.tables.levels[d - 1]!.nodes[row * d] === this.q) {
      this.starB.toggle(this.tables.stars[d - 1]!.local[row * d]!);
    } else this.rest.toggle(row);
  }

  /**
   * Entry of x in the facet without slot i, where x has slot `slot`. Without slot 0 another node
   * becomes the latest and moves to the front, so that x is looked for.
   */
  private entryInFacet(facet: number, i: number, slot: number, x: number): number {
    const d = this.dimension;
    if (i > 0) return facet * d + (slot < i ? slot : slot - 1);
    const { nodes } = this.tables.levels[d - 1]!;
    let entry = facet * d;
    while (nodes[entry] !== x) entry++;
    return entry;
  }
}
