import { RowSet } from './bitset';
import type { Pulse } from './pulse';
import { mateOfColumn, type Recorded } from './recorded';
import { eachClass, eachPair } from './recorded-bars';
import type { Scale } from './scale';
import type { Complex } from './tables';

/** A bar of one dimension k with what tells its cycle. */
interface BarSource {
  readonly birth: number;
  /** Rank of f; one above the highest for a bar that never dies. */
  readonly death: number;
  /** The column that kills it, or the simplex that gives birth to a bar that never dies. */
  readonly source: number;
}

/** Steps of work until a cycle is given up. */
const MOST_WORK = 4_000_000;

/**
 * Representative cycles of the bars of a reduced complex, one of many for each bar. A bar that dies
 * is represented by its reduced column, which is a sum of boundaries with the bar's birth simplex
 * last (Edelsbrunner, Letscher, Zomorodian 2002): born when that simplex enters, a boundary from the
 * bar's death on and not before. One that never dies is represented by the chain that reduced its
 * birth simplex to zero: no cycle with an unpaired last simplex ever bounds.
 */
export class Cycles {
  private readonly sources: (readonly BarSource[] | undefined)[] = [];
  private readonly chain: RowSet;
  private readonly rows: RowSet;

  constructor(
    private readonly complex: Complex,
    private readonly recorded: Recorded,
    private readonly scale: Scale,
    private readonly pulse: Pulse,
  ) {
    const widest = Math.max(...complex.levels.map(({ count }) => count));
    this.chain = new RowSet(complex.budget, widest);
    this.rows = new RowSet(complex.budget, widest);
  }

  /**
   * @param k dimension 0..D
   * @param bar index into the barcode of dimension k, by (birth, death)
   * @returns the k-simplices of a cycle, k + 1 positions each; in dimension 0 the node that is born,
   * and the one it is joined to where it dies. Null where it takes too long to find.
   */
  of(k: number, bar: number): Int32Array | null {
    const { death, source } = this.sourcesOf(k)[bar]!;
    if (death === this.scale.value.length) {
      const chain = k === 0 ? Int32Array.of(source) : this.chainOf(k, source);
      return chain && this.nodesOf(k, chain);
    }
    const { store, reduced } = this.recorded;
    const from = reduced[k + 1]!.start[source]!;
    const length = reduced[k + 1]!.length[source]!;
    return this.nodesOf(k, store.data.subarray(from, from + length));
  }

  /** In the order of the barcode: by birth, then by death, then as they are found. */
  private sourcesOf(k: number): readonly BarSource[] {
    return (this.sources[k] ??= this.findSources(k));
  }

  private findSources(k: number): BarSource[] {
    const { complex, recorded } = this;
    const { rank, value } = this.scale;
    const found: BarSource[] = [];
    eachPair(complex, recorded, k + 1, (birth, death, column) => {
      if (rank[birth] === rank[death]) return;
      found.push({ birth: rank[birth]!, death: rank[death]!, source: column });
    });
    eachClass(complex, recorded, k, (birth, mate, simplex) => {
      if (mate === -1) found.push({ birth: rank[birth]!, death: value.length, source: simplex });
    });
    return found.sort((x, y) => x.birth - y.birth || x.death - y.death || x.source - y.source);
  }

  private nodesOf(k: number, simplices: Int32Array): Int32Array {
    const { nodes } = this.complex.levels[k]!;
    const width = k + 1;
    const list = new Int32Array(width * simplices.length);
    simplices.forEach((s, i) => list.set(nodes.subarray(s * width, (s + 1) * width), i * width));
    return list;
  }

  /**
   * The chain of k-simplices with `simplex` last whose boundary is zero. Instead of a reduced column
   * the simplex of that column is added: its own reduction follows by itself, row by row.
   */
  private chainOf(k: number, simplex: number): Int32Array | null {
    const { chain, rows } = this;
    const { facets } = this.complex.levels[k]!;
    const { simplex: ofColumn } = this.complex.columns[k]!;
    const mate = this.recorded.mate[k - 1]!;
    const add = (s: number) => {
      chain.toggle(s);
      rows.toggleAll(facets, s * (k + 1), (s + 1) * (k + 1));
    };
    add(simplex);
    let work = 0;
    for (let pivot = rows.top(); pivot >= 0; pivot = rows.top()) {
      const m = mate[pivot]!;
      add(m >= 0 ? m : ofColumn[mateOfColumn(m)]!);
      this.pulse.tick(k + 1);
      if (++work > MOST_WORK) {
        empty(rows);
        empty(chain);
        return null;
      }
    }
    return taken(chain);
  }
}

/** Members of a set, the largest first; leaves it empty. */
function taken(set: RowSet): Int32Array {
  const found: number[] = [];
  for (let top = set.top(); top >= 0; top = set.top()) {
    found.push(top);
    set.toggle(top);
  }
  return Int32Array.from(found);
}

function empty(set: RowSet): void {
  taken(set);
}
