import type { Budget } from './budget';

/**
 * The graph as the clique walk reads it. Nodes are arrival positions 0..n-1; every node also has a
 * label 0..n-1, its priority in the matching of simplices (0 is tried first).
 */
export interface Labelled {
  readonly nodeCount: number;
  readonly labelOf: Int32Array;
  readonly nodeOf: Int32Array;
  /** Labels of the earlier neighbours of node v, ascending: earlier[earlierStart[v]..earlierStart[v+1]-1]. */
  readonly earlierStart: Int32Array;
  readonly earlier: Int32Array;
  /** Labels below l of the neighbours of the node labelled l, ascending, in the same layout. */
  readonly lowerStart: Int32Array;
  readonly lower: Int32Array;
}

/** Label 0 for the highest degree, equal degrees by position. */
export function labelsByDegree(nodeCount: number, ends: Int32Array): Int32Array {
  const degree = new Int32Array(nodeCount);
  for (const v of ends) degree[v]!++;
  const order = Int32Array.from({ length: nodeCount }, (_, v) => v);
  order.sort((u, v) => degree[v]! - degree[u]! || u - v);
  const labelOf = new Int32Array(nodeCount);
  order.forEach((v, label) => (labelOf[v] = label));
  return labelOf;
}

/** Label = position. */
export function labelsByPosition(nodeCount: number): Int32Array {
  return Int32Array.from({ length: nodeCount }, (_, v) => v);
}

/** Keys 0..n-1 and values: the values of each key, ascending, laid end to end. Linear by counting. */
function lists(
  budget: Budget,
  keyCount: number,
  keys: Int32Array,
  values: Int32Array,
): { start: Int32Array; items: Int32Array } {
  const start = budget.int32(keyCount + 1);
  for (const k of keys) start[k + 1]!++;
  for (let k = 0; k < keyCount; k++) start[k + 1]! += start[k]!;
  const next = start.slice();
  const items = budget.int32(keys.length);
  keys.forEach((k, i) => (items[next[k]!++] = values[i]!));
  for (let k = 0; k < keyCount; k++) items.subarray(start[k], start[k + 1]).sort();
  return { start, items };
}

/** `ends`: two positions per edge. O(m log m). */
export function labelGraph(
  budget: Budget,
  nodeCount: number,
  ends: Int32Array,
  labelOf: Int32Array,
): Labelled {
  const nodeOf = budget.int32(nodeCount);
  labelOf.forEach((label, v) => (nodeOf[label] = v));
  const edgeCount = ends.length / 2;
  const [later, earlierLabel] = [new Int32Array(edgeCount), new Int32Array(edgeCount)];
  const [higher, lowerLabel] = [new Int32Array(edgeCount), new Int32Array(edgeCount)];
  for (let e = 0; e < edgeCount; e++) {
    const u = Math.min(ends[2 * e]!, ends[2 * e + 1]!);
    const v = Math.max(ends[2 * e]!, ends[2 * e + 1]!);
    later[e] = v;
    earlierLabel[e] = labelOf[u]!;
    higher[e] = Math.max(labelOf[u]!, labelOf[v]!);
    lowerLabel[e] = Math.min(labelOf[u]!, labelOf[v]!);
  }
  const early = lists(budget, nodeCount, later, earlierLabel);
  const low = lists(budget, nodeCount, higher, lowerLabel);
  return {
    nodeCount,
    labelOf,
    nodeOf,
    earlierStart: early.start,
    earlier: early.items,
    lowerStart: low.start,
    lower: low.items,
  };
}
