import type { MatrixBlock } from '#contract/matrixBytes';

/** Two arrival positions, p < q. */
export interface Pair {
  readonly p: number;
  readonly q: number;
}

/** Number of pairs of n nodes. */
export const pairsOf = (nodeCount: number): number => (nodeCount * (nodeCount - 1)) / 2;

/** @returns the index of pair (p, q), p < q: rows p one after the other, q ascending within a row. */
export const pairIndex = (nodeCount: number, p: number, q: number): number =>
  (p * (2 * nodeCount - p - 1)) / 2 + q - p - 1;

/** The pair at an index; the inverse of `pairIndex`. O(1), exact for n up to 10^7. */
export function pairAt(nodeCount: number, index: number): Pair {
  const m = 2 * nodeCount - 1;
  let p = Math.floor((m - Math.sqrt(m * m - 8 * index)) / 2);
  while (pairIndex(nodeCount, p, p + 1) > index) p -= 1;
  while (p < nodeCount - 2 && pairIndex(nodeCount, p + 1, p + 2) <= index) p += 1;
  return { p, q: p + 1 + index - pairIndex(nodeCount, p, p + 1) };
}

/**
 * All pairs of a run by arrival position, filled block by block as they land. Plain typed arrays:
 * never make it deeply reactive.
 */
export class SwapMatrix {
  readonly pairCount: number;
  /** Bottleneck distance of dimension k, pair i, at k * pairCount + i, in the unit of the scale. */
  readonly distances: Float64Array;
  /** Largest Betti-curve gap (bars), the same layout. */
  readonly bettiGaps: Int32Array;
  /** 1 where the pair has landed. */
  readonly known: Uint8Array;
  knownCount = 0;
  /** Pairs that the run covers. */
  readonly coveredCount: number;

  /**
   * @param dimensionCount dimensions 0..dimensionCount - 1 are stored.
   * @param covered 1 by pair index where the run covers the pair; null where it covers every pair.
   */
  constructor(
    readonly nodeCount: number,
    readonly dimensionCount: number,
    private readonly covered: Uint8Array | null = null,
  ) {
    this.pairCount = pairsOf(nodeCount);
    this.coveredCount = covered?.reduce((sum, one) => sum + one, 0) ?? this.pairCount;
    this.distances = new Float64Array(dimensionCount * this.pairCount);
    this.bettiGaps = new Int32Array(dimensionCount * this.pairCount);
    this.known = new Uint8Array(this.pairCount);
  }

  /**
   * Copies a block in. Placing the same block again changes nothing.
   * @throws RangeError if the block belongs to another matrix.
   */
  place(block: MatrixBlock): void {
    const { nodeCount, pairCount } = this;
    const stored = block.pairCount === 0 ? 0 : block.distances.length / block.pairCount;
    if (block.nodeCount !== nodeCount || stored > this.dimensionCount) {
      throw new RangeError(
        `A block of ${block.nodeCount} nodes and ${stored} dimensions does not belong to a matrix of ` +
          `${nodeCount} nodes and ${this.dimensionCount} dimensions.`,
      );
    }
    if (block.choice !== null) return this.#placeChosen(block, block.choice, stored);
    let read = 0;
    for (const p of block.rows) {
      const width = nodeCount - 1 - p;
      const write = pairIndex(nodeCount, p, p + 1);
      for (let k = 0; k < stored; k += 1) {
        const from = k * block.pairCount + read;
        this.distances.set(block.distances.subarray(from, from + width), k * pairCount + write);
        this.bettiGaps.set(block.bettiGaps.subarray(from, from + width), k * pairCount + write);
      }
      for (let i = write; i < write + width; i += 1) this.#know(i);
      read += width;
    }
  }

  #placeChosen(
    { rows, pairCount, distances, bettiGaps }: MatrixBlock,
    { starts, partners }: NonNullable<MatrixBlock['choice']>,
    stored: number,
  ): void {
    for (const [i, p] of rows.entries()) {
      const end = starts[i + 1] ?? 0;
      for (let read = starts[i] ?? 0; read < end; read += 1) {
        const write = pairIndex(this.nodeCount, p, partners[read] ?? 0);
        for (let k = 0; k < stored; k += 1) {
          this.distances[k * this.pairCount + write] = distances[k * pairCount + read] ?? 0;
          this.bettiGaps[k * this.pairCount + write] = bettiGaps[k * pairCount + read] ?? 0;
        }
        this.#know(write);
      }
    }
  }

  #know(index: number): void {
    if (this.known[index] === 0) this.knownCount += 1;
    this.known[index] = 1;
  }

  /** Whether the run covers the pair: it is known then, or will be. */
  covers(index: number): boolean {
    return this.covered === null || this.covered[index] === 1;
  }

  isKnown(p: number, q: number): boolean {
    return this.known[pairIndex(this.nodeCount, p, q)] === 1;
  }

  /** Bottleneck distance of one dimension; 0 for a dimension that was not computed. */
  distance(dimension: number, index: number): number {
    return this.distances[dimension * this.pairCount + index] ?? 0;
  }

  bettiGap(dimension: number, index: number): number {
    return this.bettiGaps[dimension * this.pairCount + index] ?? 0;
  }

  /** Largest distance over some dimensions. */
  largestDistance(dimensions: readonly number[], index: number): number {
    let largest = 0;
    for (const k of dimensions) largest = Math.max(largest, this.distance(k, index));
    return largest;
  }

  largestBettiGap(dimensions: readonly number[], index: number): number {
    let largest = 0;
    for (const k of dimensions) largest = Math.max(largest, this.bettiGap(k, index));
    return largest;
  }

  /** Swap-safe: every chosen distance is exactly 0. False for a pair that has not landed. */
  isSafe(dimensions: readonly number[], p: number, q: number): boolean {
    const index = p < q ? pairIndex(this.nodeCount, p, q) : pairIndex(this.nodeCount, q, p);
    return this.known[index] === 1 && this.largestDistance(dimensions, index) === 0;
  }
}
