import { RowSet } from './bitset';
import type { LinkColumns } from './links';
import type { IntPool } from './pool';
import type { Pulse } from './pulse';
import type { Recorded } from './recorded';
import type { RowComplex } from './row';
import { widestStar } from './stars';
import type { Tables } from './tables';

/**
 * A sum of columns of the swapped complex, over F2. It has three parts: rows of M by id, rows of b's
 * star and of a's star by local index.
 */
export class SwappedSum {
  /** Dimension of the columns; their rows have one less. */
  dimension = 0;
  /** Positions: a goes out at p and comes in at q, where b goes out. */
  p = 0;
  q = 0;
  protected readonly rest: RowSet;
  protected readonly starB: RowSet;
  protected readonly starA: RowSet;

  constructor(
    protected readonly tables: Tables,
    protected readonly recorded: Recorded,
    protected readonly rowComplex: RowComplex,
    protected readonly pulse: Pulse,
  ) {
    const { budget, levels, stars, top } = tables;
    const widest = Math.max(...levels.slice(0, top).map(({ count }) => count));
    const widestOfStars = Math.max(...stars.map(widestStar));
    this.rest = new RowSet(budget, widest);
    this.starB = new RowSet(budget, widestOfStars);
    this.starA = new RowSet(budget, widestOfStars);
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
    const { suffix } = this.rowComplex;
    if (suffix.isPushed(d, c, this.q)) {
      const end = suffix.endOf(d, c);
      for (let i = suffix.startOf(d, c); i < end; i++) this.toggleWithoutA(data[i]!);
      this.pulse.tick(end - suffix.startOf(d, c));
      return;
    }
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

  /** Moves a column that has no row in either star into `cells`. */
  takeCycle(cells: IntPool): void {
    this.rest.drain(cells);
  }

  addCycle(cells: IntPool): void {
    this.rest.toggleAll(cells.data, 0, cells.length);
  }

  /** A row without a: of b's star if its latest node is b, else of M. */
  protected toggleWithoutA(row: number): void {
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
