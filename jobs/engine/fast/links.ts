import { RowSet } from './bitset';
import { IntPool } from './pool';
import type { Pulse } from './pulse';
import type { Tables } from './tables';

/**
 * What becomes of the critical columns of one dimension d >= 2 of every star when they are reduced
 * among themselves by their part in the star alone: the homology of the links. Columns as in
 * `StarColumns` (free).
 *
 * A column that survives is non-zero in every swapped complex. One that vanishes equals, up to
 * earlier columns of the star, its part outside the star: a cycle of the link, of dimension d - 1.
 *
 * A reduction that no simplex with a takes part in is the same without a, and keeps its pivot row: a
 * sum of earlier columns with that row as its latest would be one with a present, too.
 */
export interface LinkColumns {
  /** Place (of stars of dimension d - 1) of the pivot row of a column that survives, else -1. */
  readonly pivot: Int32Array;
  /** Position of the latest node of sigma of that pivot row, -1 without one. */
  readonly pivotLatest: Int32Array;
  /** The column that claims the row at each place of the stars of dimension d - 1, -1 if none. */
  readonly claimer: Int32Array;
  /**
   * Reduced column c: rows of the star by local index at start[c] .. middle[c] - 1 of items, its
   * part outside, simplices of dimension d - 1, at middle[c] .. start[c + 1] - 1.
   */
  readonly start: Int32Array;
  readonly middle: Int32Array;
  readonly items: Int32Array;
  /** Bit y of the bitset at c * words: node y is in the column or in anything added to it. */
  readonly touched: Int32Array;
  readonly words: number;
}

/** True if node y is in column c or in anything added to it. */
export function touches({ touched, words }: LinkColumns, c: number, y: number): boolean {
  return (touched[c * words + (y >>> 5)]! & (1 << (y & 31))) !== 0;
}

export function vanishes({ pivot }: LinkColumns, c: number): boolean {
  return pivot[c]! < 0;
}

/** Reduces the links in dimension d; O(sum of the links' own reductions). */
export function reduceLinks(tables: Tables, d: number, pulse: Pulse): LinkColumns {
  return new LinkReduction(tables, d, pulse).run();
}

class LinkReduction {
  /** The column under reduction: rows of the star by local index, and its cells outside the star. */
  private readonly rows: RowSet;
  private readonly cells: RowSet;
  private readonly items: IntPool;
  private readonly links: Omit<LinkColumns, 'items'>;

  constructor(
    private readonly tables: Tables,
    private readonly d: number,
    private readonly pulse: Pulse,
  ) {
    const { budget, levels, nodeCount } = tables;
    const { start, entry } = tables.stars[d - 1]!;
    let widest = 0;
    for (let x = 0; x < nodeCount; x++) widest = Math.max(widest, start[x + 1]! - start[x]!);
    this.rows = new RowSet(budget, widest);
    this.cells = new RowSet(budget, levels[d - 1]!.count);
    this.items = new IntPool(budget);
    const columnCount = tables.starColumns[d]!.free.entry.length;
    const words = (nodeCount + 31) >>> 5;
    this.links = {
      pivot: budget.none(columnCount),
      pivotLatest: budget.none(columnCount),
      claimer: budget.none(entry.length),
      start: budget.int32(columnCount + 1),
      middle: budget.int32(columnCount),
      touched: budget.int32(columnCount * words),
      words,
    };
  }

  run(): LinkColumns {
    const { tables, d, items, links, rows, cells } = this;
    const { free } = tables.starColumns[d]!;
    const star = tables.stars[d - 1]!;
    for (let x = 0; x < tables.nodeCount; x++) {
      for (let c = free.start[x]!; c < free.start[x + 1]!; c++) {
        links.start[c] = items.length;
        this.add(free.entry[c]!, c);
        const pivot = this.reduce(x, c);
        if (pivot >= 0) {
          links.pivot[c] = pivot;
          links.pivotLatest[c] = star.latest[pivot]!;
          links.claimer[pivot] = c;
        }
        rows.drain(items);
        links.middle[c] = items.length;
        cells.drain(items);
      }
    }
    links.start[free.entry.length] = items.length;
    return { ...links, items: items.data };
  }

  /** Adds the boundary of x + sigma and notes its nodes as touched by column c. */
  private add(entry: number, c: number): void {
    const { d, links } = this;
    const { nodes, facets } = this.tables.levels[d]!;
    const { local } = this.tables.stars[d - 1]!;
    const rowNodes = this.tables.levels[d - 1]!.nodes;
    const x = nodes[entry]!;
    const at = entry - (entry % (d + 1));
    for (let i = at; i <= at + d; i++) {
      const y = nodes[i]!;
      links.touched[c * links.words + (y >>> 5)]! |= 1 << (y & 31);
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

  /** The place of the pivot row if the column survives, else -1. */
  private reduce(x: number, c: number): number {
    const { rows, cells, links, items, d } = this;
    const { words, start, middle, touched } = links;
    const star = this.tables.stars[d - 1]!;
    for (;;) {
      const row = rows.top();
      if (row < 0) return -1;
      const place = star.start[x]! + row;
      const other = links.claimer[place]!;
      if (other >= 0) {
        rows.toggleAll(items.data, start[other]!, middle[other]!);
        cells.toggleAll(items.data, middle[other]!, start[other + 1]!);
        for (let w = 0; w < words; w++) touched[c * words + w]! |= touched[other * words + w]!;
        this.pulse.tick(start[other + 1]! - start[other]!);
        continue;
      }
      const union = star.firstUnion[place]!;
      if (union < 0) return place;
      this.add(union, c);
    }
  }
}
