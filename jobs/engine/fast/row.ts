import { Agenda } from './agenda';
import { RowSet } from './bitset';
import type { LinkColumns } from './links';
import { IntPool } from './pool';
import type { Pulse } from './pulse';
import { mateOfColumn, Status, type Recorded } from './recorded';
import { RowSuffix } from './row-suffix';
import { Forecast, RowZeros } from './row-zeros';
import type { Scale } from './scale';
import type { Tables } from './tables';
import type { ZeroTests } from './zero-policy';

/** Birth and death rank of a bar as one exact number; sorts by birth, then death. */
export function barKey(birthRank: number, deathRank: number, ranks: number): number {
  return birthRank * ranks + deathRank;
}

/**
 * M: the recorded complex K without node a, reduced once per row of the matrix. Every column of K
 * that a has not touched is a column of M as it is and keeps its pivot; only the others are reduced.
 *
 * What differs between M and K is put on agendas, to be swept with q. A difference holds for a pair
 * (a, q) from the position at which it is listed.
 */
export class RowComplex {
  /** As in Recorded, for M. Entries of rows that contain a mean nothing. */
  readonly mate: readonly Int32Array[];
  /** Where the reduced columns of M lie in the store, per dimension 1..D+1. */
  readonly start: readonly Int32Array[];
  readonly length: readonly Int32Array[];
  /** Finite bars of dimension k, dead before q, that M has more (+1) or less (-1) than K. */
  readonly finite: readonly Agenda[];
  /** Changes of the number of classes of dimension k (key: birth rank) alive at q in M, not in K. */
  readonly alive: readonly Agenda[];
  /** Columns of K after q. */
  readonly suffix: RowSuffix;

  /** Number of connected components of M up to each position. */
  readonly components: Int32Array;
  /** Simplices of each dimension whose class never dies in M. */
  readonly unclaimed: readonly IntPool[];

  private node = -1;
  /** The column under reduction. */
  readonly rows: RowSet;
  /** Per dimension of columns, what foresees zero columns; absent where it costs more. */
  private readonly zeros: readonly (RowZeros | undefined)[];
  private readonly recordedLength: number;
  private readonly infinity: number;

  constructor(
    private readonly tables: Tables,
    private readonly recorded: Recorded,
    private readonly scale: Scale,
    private readonly pulse: Pulse,
    links: readonly (LinkColumns | undefined)[],
    zeroTests: ZeroTests,
  ) {
    const { budget, top, nodeCount, levels } = tables;
    // Dimension 1 is left out: its columns are edges, which cost next to nothing.
    this.zeros = levels.map((_, d) =>
      d >= 2 && zeroTests !== 'never'
        ? new RowZeros(tables, recorded, this, d, pulse, zeroTests)
        : undefined,
    );
    this.mate = recorded.mate.map((mate) => budget.int32(mate.length));
    this.start = recorded.reduced.map(({ start }) => budget.int32(start.length));
    this.length = recorded.reduced.map(({ length }) => budget.int32(length.length));
    const agendas = (count: number) =>
      Array.from({ length: count }, () => new Agenda(budget, nodeCount));
    this.finite = agendas(top);
    this.alive = agendas(top);
    this.components = budget.int32(nodeCount);
    this.unclaimed = levels.slice(0, top).map(() => new IntPool(budget, 64));
    this.rows = new RowSet(budget, Math.max(...levels.slice(0, top).map((level) => level.count)));
    this.suffix = new RowSuffix(tables, recorded, links, this, pulse);
    this.recordedLength = recorded.store.length;
    this.infinity = nodeCount;
  }

  /** Reduces K without node `a` (a position). */
  take(a: number): void {
    const { tables, recorded } = this;
    this.node = a;
    recorded.store.length = this.recordedLength;
    for (const agenda of [...this.finite, ...this.alive]) agenda.clear();
    this.suffix.begin(a);
    for (const pool of this.unclaimed) pool.length = 0;
    for (let d = 0; d < tables.top; d++) {
      this.mate[d]!.set(recorded.mate[d]!);
      this.skipFirstChildren(d);
    }
    for (let d = tables.top; d >= 1; d--) this.reduceDimension(d);
    this.compareNodes();
    this.countComponents();
  }

  /** Rows whose first child adds a are paired with their second child, if there is one. */
  private skipFirstChildren(d: number): void {
    const { start, rows } = this.tables.byFirstChild[d]!;
    const { childCount, firstChild } = this.tables.levels[d]!;
    const mate = this.mate[d]!;
    for (let i = start[this.node]!; i < start[this.node + 1]!; i++) {
      const r = rows[i]!;
      mate[r] = childCount[r]! >= 2 ? firstChild[r]! + 1 : -1;
    }
  }

  private reduceDimension(d: number): void {
    const { columns } = this.tables;
    const reduced = this.recorded.reduced[d]!;
    const { words, store } = this.recorded;
    const mate = this.mate[d - 1]!;
    this.start[d]!.set(reduced.start);
    this.length[d]!.set(reduced.length);
    const word = this.node >>> 5;
    const mask = 1 << (this.node & 31);
    const { count } = columns[d]!;
    for (let c = 0; c < count; c++) {
      if ((reduced.touched[c * words + word]! & mask) === 0) continue;
      if (reduced.status[c] === Status.Negative) mate[store.data[reduced.start[c]!]!] = -1;
    }
    this.zeros[d]?.foresee();
    for (let c = 0; c < count; c++) this.visitColumn(d, c);
    this.pulse.tick(2 * count);
  }

  /** True if a is in K's reduced column c or in anything added to it. */
  isTouched(d: number, c: number): boolean {
    const { reduced, words } = this.recorded;
    const word = reduced[d]!.touched[c * words + (this.node >>> 5)]!;
    return (word & (1 << (this.node & 31))) !== 0;
  }

  /** True if column c is critical in M and not claimed one dimension up. */
  isOpen(d: number, c: number): boolean {
    const { simplex } = this.tables.columns[d]!;
    if (!this.isCritical(d, c)) return false;
    return d === this.tables.top || this.mate[d]![simplex[c]!]! > -2;
  }

  private isCritical(d: number, c: number): boolean {
    const { simplex, onlyChild, elder } = this.tables.columns[d]!;
    const a = this.node;
    if (onlyChild[c]! >= 0 && onlyChild[c] !== a) return false;
    return elder[c] !== a && !this.contains(d, simplex[c]!);
  }

  /** Settles column c in M and notes how it differs from K. */
  private visitColumn(d: number, c: number): void {
    const { columns, top } = this.tables;
    const touched = this.isTouched(d, c);
    const s = columns[d]!.simplex[c]!;
    const status = this.recorded.reduced[d]!.status[c]!;
    const critical = this.isCritical(d, c);
    const claimed = critical && d < top && this.mate[d]![s]! <= -2;
    let positive = claimed;
    if (!touched && (status === Status.Negative || status === Status.Zero)) {
      // Reused as it is. Touched covers all columns that contain a or are no longer critical.
      positive = status === Status.Zero;
    } else if (critical && !claimed) {
      const foreseen = this.zeros[d]?.forecast[c] === Forecast.Zero;
      const pivot = foreseen ? -1 : this.reduceColumn(d, c);
      positive = pivot < 0;
      this.compareBars(d, c, status, pivot);
    } else if (status === Status.Negative) this.compareBars(d, c, status, -1);
    if (touched && status === Status.Negative) this.suffix.note(d, c);
    if (d === top) return;
    if (positive && this.mate[d]![s] === -1) this.unclaimed[d]!.push(s);
    this.compareClass(d, s, columns[d]!.position[c]!, status, positive);
  }

  /** True if a is in simplex s. */
  contains(d: number, s: number): boolean {
    const { nodes } = this.tables.levels[d]!;
    for (let i = s * (d + 1); i < (s + 1) * (d + 1); i++) if (nodes[i] === this.node) return true;
    return false;
  }

  /** Reduces column c in M, stores it and returns its pivot row, -1 if it became zero. */
  reduceColumn(d: number, c: number): number {
    const { rows, tables, recorded } = this;
    const { facets } = tables.levels[d]!;
    const { store } = recorded;
    const mate = this.mate[d - 1]!;
    const start = this.start[d]!;
    const length = this.length[d]!;
    const width = d + 1;
    const s = tables.columns[d]!.simplex[c]!;
    rows.toggleAll(facets, s * width, (s + 1) * width);
    let pivot = rows.top();
    while (pivot >= 0) {
      const m = mate[pivot]!;
      if (m === -1) break;
      if (m >= 0) {
        rows.toggleAll(facets, m * width, (m + 1) * width);
        this.pulse.tick(width);
      } else {
        const other = mateOfColumn(m);
        if (other > c) throw new Error('A reused column lost its pivot.');
        rows.toggleAll(store.data, start[other]!, start[other]! + length[other]!);
        this.pulse.tick(length[other]!);
      }
      pivot = rows.top();
    }
    if (pivot < 0) return -1;
    mate[pivot] = mateOfColumn(c);
    start[c] = store.length;
    rows.drain(store);
    length[c] = store.length - start[c];
    return pivot;
  }

  /** Column c is negative in K with one bar and in M with another (pivot -1: with none). */
  private compareBars(d: number, c: number, status: number, pivot: number): void {
    const { store, reduced } = this.recorded;
    const position = this.tables.columns[d]!.position;
    const before = status === Status.Negative ? store.data[reduced[d]!.start[c]!]! : -1;
    if (before === pivot) return;
    if (before >= 0) this.noteBar(d, before, position[c]!, -1);
    if (pivot < 0) return;
    this.noteBar(d, pivot, position[c]!, 1);
  }

  private noteBar(d: number, row: number, death: number, sign: number): void {
    const { rank, value } = this.scale;
    const birthRank = rank[this.tables.levels[d - 1]!.nodes[row * d]!]!;
    const deathRank = rank[death]!;
    if (birthRank === deathRank) return;
    this.finite[d - 1]!.add(death + 1, barKey(birthRank, deathRank, value.length), sign);
  }

  /** Position of the column that kills the class of simplex s, `infinity` if none. */
  private death(mate: readonly Int32Array[], d: number, s: number): number {
    const m = mate[d]![s]!;
    return m <= -2 ? this.tables.columns[d + 1]!.position[mateOfColumn(m)]! : this.infinity;
  }

  /** Notes where the class born with s is alive in M but not in K, or the other way round. */
  private compareClass(d: number, s: number, birth: number, status: number, positive: boolean) {
    const inK = status === Status.Zero || status === Status.Cleared;
    const deathK = inK ? this.death(this.recorded.mate, d, s) : birth;
    const deathM = positive ? this.death(this.mate, d, s) : birth;
    if (deathK === deathM) return;
    const rank = this.scale.rank[birth]!;
    const from = birth + 1;
    const agenda = this.alive[d]!;
    if (deathK > birth) {
      agenda.add(from, rank, -1);
      agenda.add(deathK + 1, rank, 1);
    }
    if (deathM > birth) {
      agenda.add(from, rank, 1);
      agenda.add(deathM + 1, rank, -1);
    }
  }

  private compareNodes(): void {
    const { nodeCount, levels, neighbours } = this.tables;
    const { childCount } = levels[0]!;
    for (let v = 0; v < nodeCount; v++) {
      const only = childCount[v] === 1 && neighbours.items[neighbours.start[v]!] === this.node;
      const positive = v !== this.node && (childCount[v] === 0 || only);
      const status = childCount[v] === 0 ? Status.Zero : Status.Paired;
      if (positive || status === Status.Zero) this.compareClass(0, v, v, status, positive);
    }
  }

  /** A node without an earlier neighbour begins a component, which ends where M pairs the node. */
  private countComponents(): void {
    const { components, tables, node } = this;
    const { position } = tables.columns[1]!;
    const mate = this.mate[0]!;
    components.fill(0);
    for (let v = 0; v < components.length; v++) {
      const m = mate[v]!;
      if (v === node || m >= 0) continue;
      components[v]!++;
      if (m <= -2) components[position[mateOfColumn(m)]!]!--;
    }
    for (let v = 1; v < components.length; v++) components[v]! += components[v - 1]!;
  }
}
