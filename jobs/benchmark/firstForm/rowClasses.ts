import { barKey, type RowComplex } from '../../engine/fast/row';
import { mateOfColumn, type Recorded } from '../../engine/fast/recorded';
import type { Scale } from '../../engine/fast/scale';
import type { Tables } from '../../engine/fast/tables';

/** What M, the recorded complex without node a, has in one dimension of classes, by position. */
export class RowClasses {
  /** Bars of positive length by `barKey`: pivot row, key and position of the column. */
  readonly pairRow: Int32Array;
  readonly pairKey: Float64Array;
  readonly pairPosition: Int32Array;
  pairCount = 0;
  /** Critical simplices that give birth: id, position, position of death (n if none), ascending. */
  readonly bornSimplex: Int32Array;
  readonly bornPosition: Int32Array;
  readonly bornDeath: Int32Array;
  bornCount = 0;

  constructor(
    private readonly tables: Tables,
    private readonly recorded: Recorded,
    private readonly row: RowComplex,
    private readonly scale: Scale,
    /** Dimension 0..D. */
    private readonly k: number,
  ) {
    const pairs = tables.columns[k + 1]!.count;
    const born = k === 0 ? tables.nodeCount : tables.columns[k]!.count;
    this.pairRow = new Int32Array(pairs);
    this.pairKey = new Float64Array(pairs);
    this.pairPosition = new Int32Array(pairs);
    this.bornSimplex = new Int32Array(born);
    this.bornPosition = new Int32Array(born);
    this.bornDeath = new Int32Array(born);
  }

  /** After M of node `a` has been reduced. */
  read(a: number): void {
    this.readPairs();
    this.bornCount = 0;
    if (this.k === 0) this.readNodes(a);
    else this.readCritical();
  }

  private readPairs(): void {
    const { k, tables, row, scale } = this;
    const { count, position } = tables.columns[k + 1]!;
    const { data } = this.recorded.store;
    const { nodes } = tables.levels[k]!;
    const start = row.start[k + 1]!;
    const mate = row.mate[k]!;
    const { rank, value } = scale;
    const found: { pivot: number; key: number; at: number }[] = [];
    for (let c = 0; c < count; c++) {
      const pivot = data[start[c]!]!;
      if (mate[pivot] !== mateOfColumn(c)) continue;
      const birth = rank[nodes[pivot * (k + 1)]!]!;
      const death = rank[position[c]!]!;
      if (birth === death) continue;
      found.push({ pivot, key: barKey(birth, death, value.length), at: position[c]! });
    }
    found.sort((one, other) => one.key - other.key || one.at - other.at);
    this.pairCount = found.length;
    found.forEach(({ pivot, key, at }, i) => {
      this.pairRow[i] = pivot;
      this.pairKey[i] = key;
      this.pairPosition[i] = at;
    });
  }

  private readNodes(a: number): void {
    const { nodeCount, levels, neighbours } = this.tables;
    const { childCount } = levels[0]!;
    for (let v = 0; v < nodeCount; v++) {
      const only = childCount[v] === 1 && neighbours.items[neighbours.start[v]!] === a;
      if (v !== a && (childCount[v] === 0 || only)) this.addBorn(v, v);
    }
  }

  /** Those that are claimed one dimension up, and those that nothing claims: both come by id. */
  private readCritical(): void {
    const { k, row } = this;
    const { count, simplex, position } = this.tables.columns[k]!;
    const mate = row.mate[k]!;
    const open = row.unclaimed[k]!;
    let next = 0;
    for (let c = 0; c < count; c++) {
      const s = simplex[c]!;
      const unclaimed = next < open.length && open.data[next] === s;
      if (unclaimed) next++;
      if (unclaimed || (mate[s]! <= -2 && !row.contains(k, s))) this.addBorn(s, position[c]!);
    }
  }

  private addBorn(simplex: number, position: number): void {
    const code = this.row.mate[this.k]![simplex]!;
    const death =
      code <= -2
        ? this.tables.columns[this.k + 1]!.position[mateOfColumn(code)]!
        : this.tables.nodeCount;
    this.bornSimplex[this.bornCount] = simplex;
    this.bornPosition[this.bornCount] = position;
    this.bornDeath[this.bornCount++] = death;
  }
}
