import type { WeightChoice } from './choices';

/** Edges that a choice of weights leaves. */
export interface KeptEdges {
  /** u32[2 m] and f64[m], in the order they had. */
  readonly edges: Uint32Array;
  readonly weights: Float64Array;
  /** Edges left out because they are lighter, and because they have no weight. */
  readonly below: number;
  readonly withoutWeight: number;
  /** The least weight kept; null where all are or nothing is. */
  readonly least: number | null;
}

/**
 * The edges of weight ≥ least, or the heaviest share of all n(n−1)/2 pairs; edges tied at the cut
 * stay together, so that a share can be passed by them.
 */
export function keepHeavy(
  edges: Uint32Array,
  weights: Float64Array,
  nodeCount: number,
  choice: WeightChoice,
): KeptEdges {
  if (choice.kind === 'all') return { edges, weights, below: 0, withoutWeight: 0, least: null };
  const least =
    choice.kind === 'threshold' ? choice.least : cutOf(weights, choice.share, nodeCount);
  const rows: number[] = [];
  let withoutWeight = 0;
  for (const [at, weight] of weights.entries()) {
    if (Number.isNaN(weight)) withoutWeight++;
    else if (weight >= least) rows.push(at);
  }
  const kept = new Uint32Array(2 * rows.length);
  for (const [to, from] of rows.entries()) {
    kept[2 * to] = edges[2 * from] ?? 0;
    kept[2 * to + 1] = edges[2 * from + 1] ?? 0;
  }
  return {
    edges: kept,
    weights: Float64Array.from(rows, (at) => weights[at] ?? NaN),
    below: weights.length - rows.length - withoutWeight,
    withoutWeight,
    least: Number.isFinite(least) ? least : null,
  };
}

/** The weight of the last edge that the share has room for; Infinity where it has room for none. */
function cutOf(weights: Float64Array, share: number, nodeCount: number): number {
  const room = Math.floor(share * ((nodeCount * (nodeCount - 1)) / 2) + 1e-9);
  const known = weights.filter((weight) => !Number.isNaN(weight)).sort();
  if (room === 0 || known.length === 0) return Infinity;
  return known[Math.max(0, known.length - room)] ?? Infinity;
}
