/** Undirected edges, each once, with what was folded into them. */
export interface FoldedEdges {
  /** u32[2 m]: lower row first, edges ascending. */
  readonly edges: Uint32Array;
  /** f64[m]: the largest weight of the folded rows, NaN where none has one. */
  readonly weights: Float64Array;
  /** Rows that repeat an edge in the direction of a row before them, or against all before them. */
  readonly duplicateEdges: number;
  readonly reversedEdges: number;
  /** Edges whose rows have different weights. */
  readonly differingWeights: number;
}

/** Directed rows as they are read, folded to undirected edges at the end. */
export class EdgeFold {
  private lows = new Uint32Array(1024);
  private highs = new Uint32Array(1024);
  /** 1 where the row was written from the higher to the lower node row. */
  private backwards = new Uint8Array(1024);
  private weights = new Float64Array(1024);
  private count = 0;

  /** @param weight NaN for none */
  add(a: number, b: number, weight: number): void {
    if (this.count === this.lows.length) this.grow();
    const at = this.count++;
    this.lows[at] = Math.min(a, b);
    this.highs[at] = Math.max(a, b);
    this.backwards[at] = a < b ? 0 : 1;
    this.weights[at] = weight;
  }

  private grow(): void {
    const size = 2 * this.count;
    const larger = <T extends Uint32Array | Uint8Array | Float64Array>(from: T, to: T): T => {
      to.set(from);
      return to;
    };
    this.lows = larger(this.lows, new Uint32Array(size));
    this.highs = larger(this.highs, new Uint32Array(size));
    this.backwards = larger(this.backwards, new Uint8Array(size));
    this.weights = larger(this.weights, new Float64Array(size));
  }

  /** @param nodeCount number of nodes; nodeCount² · 2 · rows stays below 2⁵³ within the limits */
  fold(nodeCount: number): FoldedEdges {
    const order = this.sortedKeys(nodeCount);
    const edges = new Uint32Array(2 * this.count);
    const weights = new Float64Array(this.count);
    const folded = { duplicateEdges: 0, reversedEdges: 0, differingWeights: 0 };
    let kept = -1;
    let differs = false;
    let direction = -1;
    for (const key of order) {
      const row = key % Math.max(1, this.count);
      const [low, high] = [this.lows[row] ?? 0, this.highs[row] ?? 0];
      const weight = this.weights[row] ?? NaN;
      const backwards = this.backwards[row] ?? 0;
      if (kept < 0 || edges[2 * kept] !== low || edges[2 * kept + 1] !== high) {
        kept++;
        edges[2 * kept] = low;
        edges[2 * kept + 1] = high;
        weights[kept] = weight;
        differs = false;
      } else {
        if (backwards === direction) folded.duplicateEdges++;
        else folded.reversedEdges++;
        const earlier = weights[kept] ?? NaN;
        if (!Object.is(earlier, weight) && !differs) {
          differs = true;
          folded.differingWeights++;
        }
        if (Number.isNaN(earlier) || weight > earlier) weights[kept] = weight;
      }
      direction = backwards;
    }
    return {
      edges: edges.slice(0, 2 * (kept + 1)),
      weights: weights.slice(0, kept + 1),
      ...folded,
    };
  }

  /** (((low · n + high) · 2 + backwards) · rows + row), ascending. */
  private sortedKeys(nodeCount: number): Float64Array {
    const keys = new Float64Array(this.count);
    for (let row = 0; row < this.count; row++) {
      const pair = (this.lows[row] ?? 0) * nodeCount + (this.highs[row] ?? 0);
      keys[row] = (pair * 2 + (this.backwards[row] ?? 0)) * this.count + row;
    }
    return keys.sort();
  }
}
