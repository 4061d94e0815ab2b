import { Agenda } from './agenda';
import { RowSet } from './bitset';
import type { LinkColumns } from './links';
import type { Pulse } from './pulse';
import { mateOfColumn, type Recorded } from './recorded';
import type { RowComplex } from './row';
import { widestStar } from './stars';
import type { Tables } from './tables';

/**
 * Columns of K of one row of the matrix, read after q: those that touch a, which enters at q, need
 * work in every pair. Unless they can be pushed off a's star: with columns of the star, all of which
 * are there by q, the part in the star is taken away, and if the pivot row stays what it is the
 * column holds it in the swapped complex as it does in K.
 *
 * A column without a never loses its pivot row r to M before q: what M reduces to r by then is a
 * boundary in K too, so r would have died in K by then.
 */
export class RowSuffix {
  /** Columns of K (key) that need work after q, from this position to the one in `codes`. */
  readonly needed: readonly Agenda[];
  /** Per dimension and column: where it lies in the store once pushed off, and from which q on. */
  private readonly start: readonly Int32Array[];
  private readonly length: readonly Int32Array[];
  private readonly from: readonly Int32Array[];
  /** The row in which that was. */
  private readonly rowOf: readonly Int32Array[];
  private serial = 0;
  private node = -1;
  private readonly inStar: RowSet;
  /** Empty between columns; shared with the reduction of the row. */
  private readonly outside: RowSet;

  constructor(
    private readonly tables: Tables,
    private readonly recorded: Recorded,
    private readonly links: readonly (LinkColumns | undefined)[],
    private readonly row: RowComplex,
    private readonly pulse: Pulse,
  ) {
    this.outside = row.rows;
    const { budget, columns, nodeCount, stars } = tables;
    const perColumn = () => columns.map(({ count }) => budget.int32(count));
    this.needed = columns.map(() => new Agenda(budget, nodeCount));
    this.start = perColumn();
    this.length = perColumn();
    this.from = perColumn();
    this.rowOf = perColumn();
    this.inStar = new RowSet(budget, Math.max(...stars.map(widestStar)));
  }

  begin(node: number): void {
    this.node = node;
    this.serial++;
    for (const agenda of this.needed) agenda.clear();
  }

  /** True if column c of dimension d has been pushed off a's star and may be read so after q. */
  isPushed(d: number, c: number, q: number): boolean {
    return this.rowOf[d]![c] === this.serial && this.from[d]![c]! <= q;
  }

  /** Where it lies in the store then. */
  startOf(d: number, c: number): number {
    return this.start[d]![c]!;
  }

  endOf(d: number, c: number): number {
    return this.start[d]![c]! + this.length[d]![c]!;
  }

  /** Column c of K has a pivot row and has been touched by a. */
  note(d: number, c: number): void {
    const { tables, recorded, node } = this;
    const { store, reduced } = recorded;
    const position = tables.columns[d]!.position[c]!;
    const start = reduced[d]!.start[c]!;
    const end = start + reduced[d]!.length[c]!;
    const from = Math.max(tables.levels[d - 1]!.nodes[store.data[start]! * d]!, node + 1);
    if (from >= position) return;
    let first = start;
    while (first < end && !this.contains(d - 1, store.data[first]!)) first++;
    if (first === end) return;
    const links = this.links[d];
    // At its own position the pivot row may contain b, so that the column needs work in any case.
    const known = links !== undefined && first > start ? this.push(d, c, links) : position;
    const until = Math.min(position, Math.max(known, from + 1));
    if (until > from) this.needed[d]!.add(from, c, until - 1);
  }

  private contains(d: number, s: number): boolean {
    const { nodes } = this.tables.levels[d]!;
    for (let i = s * (d + 1); i < (s + 1) * (d + 1); i++) if (nodes[i] === this.node) return true;
    return false;
  }

  /** Pushes column c off a's star. @returns from which q on that holds, the column's position if never */
  private push(d: number, c: number, links: LinkColumns): number {
    const { recorded, outside, tables } = this;
    const position = tables.columns[d]!.position[c]!;
    const { store, reduced } = recorded;
    const start = reduced[d]!.start[c]!;
    const pivot = store.data[start]!;
    this.split(d, start, start + reduced[d]!.length[c]!);
    const cleared = this.clearStar(d, links, position);
    const from = cleared < position ? this.lowerTo(d, pivot, cleared, position) : position;
    const at = store.length;
    if (from < position && outside.top() === pivot) {
      outside.drain(store);
      this.start[d]![c] = at;
      this.length[d]![c] = store.length - at;
      this.from[d]![c] = from;
      this.rowOf[d]![c] = this.serial;
      return from;
    }
    outside.drain(store);
    this.inStar.drain(store);
    store.length = at;
    return position;
  }

  /** Rows of the store by whether a is in them. */
  private split(d: number, from: number, to: number): void {
    const { data } = this.recorded.store;
    const { nodes } = this.tables.levels[d - 1]!;
    const { local } = this.tables.stars[d - 1]!;
    for (let i = from; i < to; i++) {
      const row = data[i]!;
      let slot = 0;
      while (slot < d && nodes[row * d + slot] !== this.node) slot++;
      if (slot < d) this.inStar.toggle(local[row * d + slot]!);
      else this.outside.toggle(row);
    }
    this.pulse.tick(2 * (to - from));
  }

  /** Adds columns of a's star until nothing is left in it. @returns the latest node used, `never` if that fails */
  private clearStar(d: number, links: LinkColumns, never: number): number {
    const { inStar, outside, tables } = this;
    const star = tables.stars[d - 1]!;
    const { latest } = tables.starColumns[d]!.free;
    let used = this.node + 1;
    for (let row = inStar.top(); row >= 0; row = inStar.top()) {
      const place = star.start[this.node]! + row;
      const claimer = links.claimer[place]!;
      const union = claimer < 0 ? star.firstUnion[place]! : -1;
      if (claimer < 0 && union < 0) return never;
      used = Math.max(used, claimer < 0 ? star.latest[place]! : latest[claimer]!);
      if (used >= never) return never;
      if (claimer < 0) this.addUnion(d, union);
      else {
        inStar.toggleAll(links.items, links.start[claimer]!, links.middle[claimer]!);
        outside.toggleAll(links.items, links.middle[claimer]!, links.start[claimer + 1]!);
        this.pulse.tick(links.start[claimer + 1]! - links.start[claimer]!);
      }
    }
    return used;
  }

  /**
   * Adds columns of M until no row is later than `pivot`. @returns from which q on they are all there,
   * `never` if that fails
   */
  private lowerTo(d: number, pivot: number, from: number, never: number): number {
    const { outside, tables, row } = this;
    const { facets } = tables.levels[d]!;
    const { nodes } = tables.levels[d - 1]!;
    const { position } = tables.columns[d]!;
    const { data } = this.recorded.store;
    let used = from;
    for (let top = outside.top(); top > pivot; top = outside.top()) {
      const code = row.mate[d - 1]![top]!;
      if (code === -1) return never;
      if (code >= 0) {
        used = Math.max(used, nodes[top * d]!);
        outside.toggleAll(facets, code * (d + 1), (code + 1) * (d + 1));
        this.pulse.tick(d + 1);
      } else {
        const holder = mateOfColumn(code);
        used = Math.max(used, position[holder]! + 1);
        const start = row.start[d]![holder]!;
        const length = row.length[d]![holder]!;
        outside.toggleAll(data, start, start + length);
        this.pulse.tick(length);
      }
      if (used >= never) return never;
    }
    return used;
  }

  /** Adds the boundary of an entry of a's star. */
  private addUnion(d: number, entry: number): void {
    const { nodes, facets } = this.tables.levels[d]!;
    const { local } = this.tables.stars[d - 1]!;
    const rowNodes = this.tables.levels[d - 1]!.nodes;
    const at = entry - (entry % (d + 1));
    for (let i = at; i <= at + d; i++) {
      if (i === entry) this.outside.toggle(facets[i]!);
      else {
        let row = facets[i]! * d;
        while (rowNodes[row] !== nodes[entry]) row++;
        this.inStar.toggle(local[row]!);
      }
    }
    this.pulse.tick(2 * d);
  }
}
