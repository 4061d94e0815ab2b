import { RowSet } from '../../engine/fast/bitset';
import { IntPool } from '../../engine/fast/pool';
import { mateOfColumn, type Recorded } from '../../engine/fast/recorded';
import type { RowComplex } from '../../engine/fast/row';
import type { Tables } from '../../engine/fast/tables';

/** Which part of the swapped complex a row belongs to. */
export const Part = { Rest: 0, StarOfB: 1, StarOfA: 2 } as const;

/** Ints per reduced column in the heads: start, end of M's rows, end of b's, end of a's. */
const HEAD = 4;

/**
 * One column of the swapped complex while it is reduced, in three parts (rows of M by id, of the two
 * stars by local index), and what the reduced ones claim. Claims carry a running number: those of
 * earlier pairs are smaller, so that nothing is cleared between pairs.
 */
export class PairColumn {
  dimension = 0;
  p = 0;
  q = 0;
  /** Entry of the edge that b, a as rows are paired with for nothing, -1 if none. */
  unionOfB = -1;
  unionOfA = -1;
  /** The pivot row that `reduce` found. */
  part: number = Part.Rest;
  row = -1;
  /** Claim number of each row, per dimension 0..D, >= base if claimed by this pair. */
  readonly claimM: readonly Int32Array[];
  readonly claimB: readonly Int32Array[];
  readonly claimA: readonly Int32Array[];
  base = 1;

  private baseOfDimension = 1;
  private next = 1;
  private readonly rest: RowSet;
  private readonly starB: RowSet;
  private readonly starA: RowSet;
  private readonly heads: IntPool;
  private readonly pool: IntPool;

  constructor(
    private readonly tables: Tables,
    private readonly recorded: Recorded,
    private readonly rowComplex: RowComplex,
  ) {
    const { budget, levels, stars, top } = tables;
    const sizes = stars.map(({ start }) => {
      let size = 0;
      for (let x = 0; x + 1 < start.length; x++) size = Math.max(size, start[x + 1]! - start[x]!);
      return size;
    });
    this.claimM = levels.slice(0, top).map(({ count }) => budget.int32(count));
    this.claimB = sizes.map((size) => budget.int32(size));
    this.claimA = sizes.map((size) => budget.int32(size));
    this.rest = new RowSet(budget, Math.max(...levels.slice(0, top).map(({ count }) => count)));
    this.starB = new RowSet(budget, Math.max(...sizes));
    this.starA = new RowSet(budget, Math.max(...sizes));
    this.heads = new IntPool(budget);
    this.pool = new IntPool(budget);
  }

  beginPair(p: number, q: number): void {
    this.p = p;
    this.q = q;
    if (this.next > 1 << 30) {
      for (const claims of [this.claimM, this.claimB, this.claimA]) {
        for (const array of claims) array.fill(0);
      }
      this.next = 1;
    }
    this.base = this.next;
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
    const { local } = this.tables.stars[d - 1]!;
    const slot = entry % (d + 1);
    const at = entry - slot;
    for (let i = 0; i <= d; i++) {
      const facet = facets[at + i]!;
      if (i === slot) this.rest.toggle(facet);
      else this.starB.toggle(local[this.entryInFacet(facet, i, slot, nodes[entry]!)]!);
    }
  }

  /** Adds the boundary of a + sigma, where sigma may contain b. */
  addStarA(entry: number): void {
    const d = this.dimension;
    const { nodes, facets } = this.tables.levels[d]!;
    const { local } = this.tables.stars[d - 1]!;
    const slot = entry % (d + 1);
    const at = entry - slot;
    for (let i = 0; i <= d; i++) {
      const facet = facets[at + i]!;
      if (i === slot) this.toggleWithoutA(facet);
      else this.starA.toggle(local[this.entryInFacet(facet, i, slot, nodes[entry]!)]!);
    }
  }

  /** Adds the reduced column c of M. */
  addReducedOfM(c: number): void {
    const from = this.rowComplex.start[this.dimension]![c]!;
    const to = from + this.rowComplex.length[this.dimension]![c]!;
    this.rest.toggleAll(this.recorded.store.data, from, to);
  }

  /** Adds K's reduced column c, of position > q, its rows rewritten for the swapped order. */
  addSuffix(c: number): void {
    const d = this.dimension;
    const { p } = this;
    const { start, length } = this.recorded.reduced[d]!;
    const { data } = this.recorded.store;
    const { nodes } = this.tables.levels[d - 1]!;
    const { local } = this.tables.stars[d - 1]!;
    const to = start[c]! + length[c]!;
    for (let i = start[c]!; i < to; i++) {
      const from = data[i]! * d;
      let entry = from;
      while (entry < from + d && nodes[entry] !== p) entry++;
      if (entry < from + d) this.starA.toggle(local[entry]!);
      else this.toggleWithoutA(data[i]!);
    }
  }

  /**
   * Adds reduced columns until the pivot row is free (true; see `part` and `row`) or the column is
   * zero (false). A holder of M is added if its position is at most `holderPosition` and it is below
   * column `holderColumn`; otherwise it will be evicted.
   */
  reduce(holderPosition: number, holderColumn: number): boolean {
    const { rest, starB, starA, tables, q, base } = this;
    const d = this.dimension;
    const { start, latest } = tables.stars[d - 1]!;
    const rowNodes = tables.levels[d - 1]!.nodes;
    const { facets } = tables.levels[d]!;
    const { position } = tables.columns[d]!;
    const claimM = this.claimM[d - 1]!;
    const mate = this.rowComplex.mate[d - 1]!;
    for (;;) {
      const a = starA.top();
      if (a >= 0) {
        if (this.stepStarA(a)) return true;
        continue;
      }
      const b = starB.top();
      const m = rest.top();
      if (b >= 0 && (m < 0 || Math.max(this.p, latest[start[q]! + b]!) >= rowNodes[m * d]!)) {
        if (this.stepStarB(b)) return true;
        continue;
      }
      if (m < 0) return false;
      const code = mate[m]!;
      if (claimM[m]! >= base) this.addClaimed(claimM[m]!);
      else if (code >= 0) rest.toggleAll(facets, code * (d + 1), (code + 1) * (d + 1));
      else {
        const holder = code === -1 ? -1 : mateOfColumn(code);
        const first = holder >= 0 && position[holder]! < q && position[holder]! <= holderPosition;
        if (!first || holder >= holderColumn) {
          this.part = Part.Rest;
          this.row = m;
          return true;
        }
        this.addReducedOfM(holder);
      }
    }
  }

  /** Claims the pivot row that `reduce` found and stores the column. */
  claim(): void {
    const { heads, pool } = this;
    const claims = [this.claimM, this.claimB, this.claimA][this.part]![this.dimension - 1]!;
    claims[this.row] = this.next++;
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

  /** One addition with a's top row as the pivot; true if that row is free. */
  private stepStarA(a: number): boolean {
    const d = this.dimension;
    const claim = this.claimA[d - 1]![a]!;
    const star = this.tables.stars[d - 1]!;
    if (claim >= this.base) this.addClaimed(claim);
    else {
      const union = d === 1 ? this.unionOfA : star.firstUnion[star.start[this.p]! + a]!;
      if (union < 0) {
        this.part = Part.StarOfA;
        this.row = a;
        return true;
      }
      this.addStarA(union);
    }
    return false;
  }

  /** One addition with row b of b's star as the pivot; true if that row is free. */
  private stepStarB(b: number): boolean {
    const d = this.dimension;
    const claim = this.claimB[d - 1]![b]!;
    if (claim >= this.base) this.addClaimed(claim);
    else {
      const union = d === 1 ? this.unionOfB : this.unionWithoutA(b);
      if (union < 0) {
        this.part = Part.StarOfB;
        this.row = b;
        return true;
      }
      this.addStarB(union);
    }
    return false;
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
    const heads = this.heads.data;
    const at = (claim - this.baseOfDimension) * HEAD;
    this.rest.toggleAll(data, heads[at]!, heads[at + 1]!);
    this.starB.toggleAll(data, heads[at + 1]!, heads[at + 2]!);
    this.starA.toggleAll(data, heads[at + 2]!, heads[at + 3]!);
  }

  /** A row without a: of b's star if its latest node is b, else of M. */
  private toggleWithoutA(row: number): void {
    const d = this.dimension;
    if (this.tables.levels[d - 1]!.nodes[row * d] === this.q) {
      this.starB.toggle(this.tables.stars[d - 1]!.local[row * d]!);
    } else this.rest.toggle(row);
  }

  /** Entry of x, at `slot` of a simplex, in the facet without slot i; without slot 0 it is looked for. */
  private entryInFacet(facet: number, i: number, slot: number, x: number): number {
    const d = this.dimension;
    if (i > 0) return facet * d + (slot < i ? slot : slot - 1);
    const { nodes } = this.tables.levels[d - 1]!;
    let entry = facet * d;
    while (nodes[entry] !== x) entry++;
    return entry;
  }
}
