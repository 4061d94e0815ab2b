/**
 * What goes into the engine and what comes out. Everything here is plain data, so that it can be
 * posted to a thread as it is.
 */

/** A simple undirected graph whose nodes arrive one by one. */
export interface Network {
  /** Number of nodes n; nodes are the rows 0..n-1. */
  readonly nodeCount: number;
  /** Two node rows per edge, no self loops, every undirected edge once. Length 2 m. */
  readonly edges: Uint32Array;
  /** f(v), the filtration value of every node row: finite, in the unit of the scale. Length n. */
  readonly values: Float64Array;
}

/** The bars of one dimension, sorted by (birth, death). `deaths[k]` is Infinity for a bar that never dies. */
export interface Bars {
  readonly births: Float64Array;
  readonly deaths: Float64Array;
}

/** Bars by dimension: `barcode[k]` for k = 0..maxDimension. */
export type Barcode = readonly Bars[];

/** What the engine may use. A run that needs more fails with an EngineLimitError that says the number. */
export interface Limits {
  /** Most simplices (cliques of 1..D+2 nodes) that may be listed. */
  readonly simplices: number;
  /** Most bytes of typed arrays that may be held. */
  readonly bytes: number;
}

/** Checked at least every 50 ms while the engine computes. */
export interface Control {
  shouldStop(): boolean;
  /** Pairs finished since the computation of these rows began. */
  onProgress(pairsDone: number): void;
}

/** Pairs (p, q) of arrival positions 0..n-1 (sorted by value, ties by node row), row by row. */
export interface PairChoice {
  /** Positions p of the rows, in any order; one position may stand in several rows. */
  readonly rows: Uint32Array;
  /** Partners of row i are partners[starts[i]] .. partners[starts[i + 1] - 1]. Length rows + 1. */
  readonly starts: Uint32Array;
  /** Positions q, each later than its row's p and ascending within the row. Length P. */
  readonly partners: Uint32Array;
}

/** Which pairs of arrival positions a run covers. */
export type Part =
  | { readonly kind: 'whole' }
  /** |p - q| is at most so many positions. */
  | { readonly kind: 'within'; readonly positions: number }
  /** The intervals [starts[p], ends[p]] by arrival position, in the unit of the entries, overlap. */
  | { readonly kind: 'overlapping'; readonly starts: Float64Array; readonly ends: Float64Array }
  | {
      readonly kind: 'chosen';
      /** First and last position of a stretch whose pairs are all taken. */
      readonly windows: readonly (readonly [number, number])[];
      /** Positions of which every pair is taken. */
      readonly nodes: readonly number[];
      readonly pairs: readonly (readonly [number, number])[];
    };

/** Results of chosen pairs, in the order of the choice. */
export interface PairResults {
  /** Number of pairs P. */
  readonly pairCount: number;
  /** Exact bottleneck distances in the unit of f: dimension k of pair i at [k * P + i]. Length (D + 1) P. */
  readonly distances: Float64Array;
  /** Largest absolute differences of the Betti curves (bars): the same layout. */
  readonly bettiGaps: Int32Array;
}

/**
 * Results of all pairs (p, q), q > p, of some rows p, in the order of the rows given and, within a
 * row, q ascending: P = sum over rows of (n - 1 - p).
 */
export interface RowResults extends PairResults {
  /** Arrival positions p, as asked for. */
  readonly rows: Uint32Array;
}

/** One bar of each side, or one side only where the bar goes to the diagonal (index -1). */
export interface BarMatch {
  /** Index into `recorded[k]`, or -1. */
  readonly recorded: number;
  /** Index into `swapped[k]`, or -1. */
  readonly swapped: number;
  /** What this match costs, in the unit of f. */
  readonly cost: number;
}

/** A cycle that stands for a bar, one of many. */
export interface BarCycle {
  /** Index into the barcode of its side and dimension k. */
  readonly bar: number;
  /**
   * Its k-simplices as arrival positions of the recorded order, k + 1 each; in dimension 0 the node
   * that is born and the one it is joined to. Null where it is too long to find or to show.
   */
  readonly simplices: Int32Array | null;
}

/** Cycles of the moved bars of one dimension, those that cost most first. */
export interface MovedCycles {
  readonly recorded: readonly BarCycle[];
  readonly swapped: readonly BarCycle[];
}

/** Everything about one swap, for the reader who clicked on it. */
export interface PairDetail {
  /** Arrival positions, p < q. */
  readonly p: number;
  readonly q: number;
  readonly bound: number;
  readonly distances: readonly number[];
  readonly bettiGaps: readonly number[];
  readonly recorded: Barcode;
  readonly swapped: Barcode;
  /** Per dimension an optimal bottleneck matching of the two barcodes; equal bars are matched with themselves wherever that is optimal. */
  readonly matchings: readonly (readonly BarMatch[])[];
  /** Per dimension the index in `matchings[k]` of a match whose cost is the distance, or -1 if the distance is 0. */
  readonly realising: readonly number[];
  /** Per dimension. */
  readonly cycles: readonly MovedCycles[];
}

/** What the matrix of a part would need, counted before it is run. */
export interface Estimate {
  /** Number of cliques with 1, 2, .. D + 2 nodes; counting stops at the cap. */
  readonly cliques: readonly number[];
  /** False if the cap was reached: the counts are then lower bounds. */
  readonly exact: boolean;
  readonly pairs: number;
  /** Peak bytes of typed arrays of one thread. */
  readonly bytes: number;
  /** Seconds of one thread that has worked before, on an ordinary machine; a rule of thumb. */
  readonly seconds: number;
}

/** What a run may need at most. */
export interface Budget extends Limits {
  /** Seconds of one thread, by the estimate before and by the clock of whoever runs it. */
  readonly seconds: number;
}

/** What would fit where an estimate is over the budget; each alone, and only what does fit. */
export interface Ways {
  /** The highest lower D whose same pairs fit. */
  readonly dimension: number | null;
  /** The most arrival positions within which all pairs fit; null also where cliques are the limit. */
  readonly within: number | null;
  /** The pairs of overlapping intervals; null also where cliques are the limit. */
  readonly overlapping: { readonly pairs: number; readonly seconds: number } | null;
}

export class EngineInputError extends Error {
  override readonly name = 'EngineInputError';
}

/** A limit was passed. The message is a plain sentence with the number that broke it. */
export class EngineLimitError extends Error {
  override readonly name = 'EngineLimitError';
  constructor(
    readonly limit: keyof Limits,
    readonly needed: number,
    readonly allowed: number,
    message: string,
  ) {
    super(message);
  }
}

/** `shouldStop` answered true. */
export class EngineStopped extends Error {
  override readonly name = 'EngineStopped';
}
