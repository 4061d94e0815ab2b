import { RowSet } from './bitset';
import { IntPool } from './pool';
import type { Pulse } from './pulse';
import type { Tables } from './tables';

/**
 * What becomes of the critical columns of one dimension d >= 2 of every star when they are reduced
 * among themselves by their part in the star alone: the homology of the links. Index as in
 * `StarColumns` (free).
 *
 * A column that survives is non-zero in every swapped complex. One that vanishes equals, up to
 * earlier columns of the star, its part outside the star: a cycle of the link, of dimension d - 1.
 */
export interface LinkColumns {
  readonly vanishes: Uint8Array;
  /** The cycle of column c: simplices of dimension d - 1 at start[c] .. start[c + 1] - 1 of cells. */
  readonly start: Int32Array;
  readonly cells: Int32Array;
  /** Bit y of the bitset at c * words: node y is in the column or in anything added to it. */
  readonly touched: Int32Array;
}

/** Reduces the links in dimension d; O(sum of the links' own reductions). */
export function reduceLinks(tables: Tables, d: number, pulse: Pulse): LinkColumns {
  return new LinkReduction(tables, d, pulse).run();
}

class LinkReduction {
  /** The column under reduction: rows of the star by local index, and its cells outside the star. */
  private readonly rows: RowSet;
  private readonly cells: RowSet;
  /** Survivors of one star: rows and cells laid end to end. */
  private readonly survivors: IntPool;
  /** Per row (local index) 1 + the index of the survivor that claims it, 0 if none. */
  private readonly claims: Int32Array;
  /** Per survivor: start of its rows, of its cells, end, and its column. */
  private readonly heads: number[] = [];
  private readonly words: number;
  private readonly found: IntPool;

  constructor(
    private readonly tables: Tables,
    private readonly d: number,
    private readonly pulse: Pulse,
  ) {
    const { budget, levels, nodeCount } = tables;
    const { start } = tables.stars[d - 1]!;
    let widest = 0;
    for (let x = 0; x < nodeCount; x++) widest = Math.max(widest, start[x + 1]! - start[x]!);
    this.rows = new RowSet(budget, widest);
    this.cells = new RowSet(budget, levels[d - 1]!.count);
    this.survivors = new IntPool(budget);
    this.claims = budget.int32(widest);
    this.words = (nodeCount + 31) >>> 5;
    this.found = new IntPool(budget);
  }

  run(): LinkColumns {
    const { tables, d, found } = this;
    const { free } = tables.starColumns[d]!;
    const count = free.entry.length;
    const result: LinkColumns = {
      vanishes: tables.budget.uint8(count),
      start: tables.budget.int32(count + 1),
      cells: found.data,
      touched: tables.budget.int32(count * this.words),
    };
    for (let x = 0; x < tables.nodeCount; x++) {
      this.claims.fill(0);
      this.heads.length = 0;
      this.survivors.length = 0;
      for (let c = free.start[x]!; c < free.start[x + 1]!; c++) {
        result.start[c] = found.length;
        this.add(free.entry[c]!, c, result.touched);
        if (this.reduce(x, c, result.touched)) this.keep(c);
        else {
          result.vanishes[c] = 1;
          this.cells.drain(found);
        }
      }
    }
    result.start[count] = found.length;
    return { ...result, cells: found.data };
  }

  /** Adds the boundary of x + sigma and notes its nodes as touched by column c. */
  private add(entry: number, c: number, touched: Int32Array): void {
    const { d } = this;
    const { nodes, facets } = this.tables.levels[d]!;
    const { local } = this.tables.stars[d - 1]!;
    const rowNodes = this.tables.levels[d - 1]!.nodes;
    const x = nodes[entry]!;
    const at = entry - (entry % (d + 1));
    for (let i = at; i <= at + d; i++) {
      const y = nodes[i]!;
      touched[c * this.words + (y >>> 5)]! |= 1 << (y & 31);
      if (i === entry) {
        this.cells.toggle(facets[i]!);
        continue;
      }
      let row = facets[i]! * d;
      while (rowNodes[row] !== x) row++;
      this.rows.toggle(local[row]!);
    }
    this.pulse.tick(2 * d);
  }

  /** True if the column survives; its pivot row is then the top of `rows`. */
  private reduce(x: number, c: number, touched: Int32Array): boolean {
    const { rows, cells, heads, words, survivors, d } = this;
    const star = this.tables.stars[d - 1]!;
    for (;;) {
      const row = rows.top();
      if (row < 0) return false;
      const claim = this.claims[row]!;
      if (claim > 0) {
        const at = (claim - 1) * 4;
        rows.toggleAll(survivors.data, heads[at]!, heads[at + 1]!);
        cells.toggleAll(survivors.data, heads[at + 1]!, heads[at + 2]!);
        const other = heads[at + 3]!;
        for (let w = 0; w < words; w++) touched[c * words + w]! |= touched[other * words + w]!;
        this.pulse.tick(heads[at + 2]! - heads[at]!);
        continue;
      }
      const union = star.firstUnion[star.start[x]! + row]!;
      if (union < 0) return true;
      this.add(union, c, touched);
    }
  }

  private keep(c: number): void {
    const { rows, cells, heads, survivors } = this;
    this.claims[rows.top()] = heads.length / 4 + 1;
    heads.push(survivors.length);
    rows.drain(survivors);
    heads.push(survivors.length);
    cells.drain(survivors);
    heads.push(survivors.length, c);
  }
}
