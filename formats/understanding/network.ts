import type { NetworkNode } from '../types';
import type { DraftNode, NodeTimes } from './draft';

/** Nodes that stay, with their windows, and the new row of every old one (-1 for those left out). */
export interface KeptNodes {
  readonly nodes: readonly NetworkNode[];
  readonly rowOf: Int32Array;
  /** Nodes whose window comes from the tolerance. */
  readonly tolerant: number;
}

/** Joins nodes and times; a tolerance gives a window to every node that has none. */
export function keptNodes(
  drafts: readonly DraftNode[],
  times: readonly (NodeTimes | null)[],
  tolerance: number | null,
): KeptNodes {
  const nodes: NetworkNode[] = [];
  const rowOf = new Int32Array(drafts.length).fill(-1);
  let tolerant = 0;
  for (const [row, draft] of drafts.entries()) {
    const own = times[row];
    if (!own || own.entry === null) continue;
    const { id, label } = draft;
    const open = tolerance !== null && own.earliest === null && own.latest === null;
    if (open) tolerant++;
    rowOf[row] = nodes.length;
    nodes.push({
      id,
      label,
      ...own,
      entry: own.entry,
      ...(open ? { earliest: own.entry - tolerance, latest: own.entry + tolerance } : {}),
    });
  }
  return { nodes, rowOf, tolerant };
}

/** Edges between nodes that stay, by their new rows; the order stays ascending. */
export function keptEdges(
  edges: Uint32Array,
  weights: Float64Array,
  rowOf: Int32Array,
): { edges: Uint32Array; weights: Float64Array; gone: number } {
  if (!rowOf.includes(-1)) return { edges, weights, gone: 0 };
  const kept = new Uint32Array(edges.length);
  const keptWeights = new Float64Array(weights.length);
  let count = 0;
  for (let at = 0; at < weights.length; at++) {
    const a = rowOf[edges[2 * at] ?? 0] ?? -1;
    const b = rowOf[edges[2 * at + 1] ?? 0] ?? -1;
    if (a < 0 || b < 0) continue;
    kept[2 * count] = a;
    kept[2 * count + 1] = b;
    keptWeights[count] = weights[at] ?? NaN;
    count++;
  }
  return {
    edges: kept.slice(0, 2 * count),
    weights: keptWeights.slice(0, count),
    gone: weights.length - count,
  };
}
