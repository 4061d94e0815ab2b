import type { Budget } from './budget';
import type { Level } from './levels';
import type { Pulse } from './pulse';

/**
 * The simplices x + sigma of one dimension d, for every node x, ordered by sigma. Those of node x
 * take the places start[x]..start[x+1]-1; a place less start[x] is the *local index* of the simplex.
 * An *entry* is s * (d + 1) + slot: simplex s with the slot of x in it, so that `nodes[entry]` is x
 * and `facets[entry]` is sigma.
 */
export interface Star {
  readonly start: Int32Array;
  /** Entry at each place. */
  readonly entry: Int32Array;
  /** Position of the latest node of sigma at each place, -1 if sigma is empty. */
  readonly latest: Int32Array;
  /** Local index of each entry, the inverse of `entry`. */
  readonly local: Int32Array;
  /**
   * At each place the entry, one dimension up, of x + sigma + w for the first and the second child
   * sigma + w of sigma whose last node w is adjacent to x; -1 if there is none. The children of the
   * empty simplex are the nodes by position. x + sigma as a row is paired with its first union.
   */
  readonly firstUnion: Int32Array;
  readonly secondUnion: Int32Array;
}

/** The stars' order alone: what the top dimension, which has no rows, needs. */
export type StarOrder = Pick<Star, 'start' | 'entry' | 'latest'>;

/**
 * Stable counting sort of `items` (all 0..n-1 if omitted) by key[item] in 0..keyCount-1.
 * @returns where each key begins in `out`
 */
export function sortBy(
  keyCount: number,
  keys: Int32Array,
  items: Int32Array | undefined,
  out: Int32Array,
): Int32Array {
  const start = new Int32Array(keyCount + 1);
  for (let i = 0; i < keys.length; i++) start[keys[i]! + 1]!++;
  for (let k = 0; k < keyCount; k++) start[k + 1]! += start[k]!;
  const next = start.slice();
  for (let i = 0; i < keys.length; i++) {
    const item = items === undefined ? i : items[i]!;
    out[next[keys[item]!]!++] = item;
  }
  return start;
}

/** O(entries) by two counting sorts: by sigma, then stably by node. */
export function orderStars(
  levels: readonly Level[],
  d: number,
  nodeCount: number,
  budget: Budget,
  pulse: Pulse,
): StarOrder {
  const { nodes, facets } = levels[d]!;
  const entry = budget.int32(nodes.length);
  const latest = budget.none(nodes.length);
  pulse.tick(nodes.length);
  if (d === 0) {
    const start = Int32Array.from({ length: nodeCount + 1 }, (_, v) => v);
    for (let v = 0; v < nodeCount; v++) entry[v] = v;
    return { start, entry, latest };
  }
  const bySigma = budget.int32(nodes.length);
  sortBy(levels[d - 1]!.count, facets, undefined, bySigma);
  pulse.tick(nodes.length);
  const start = sortBy(nodeCount, nodes, bySigma, entry);
  budget.release(bySigma);
  const below = levels[d - 1]!.nodes;
  for (let g = 0; g < entry.length; g++) latest[g] = below[facets[entry[g]!]! * d]!;
  pulse.tick(nodes.length);
  return { start, entry, latest };
}

/** Adds local indices and unions; `above` is the order of the stars one dimension up. */
export function completeStar(
  levels: readonly Level[],
  d: number,
  order: StarOrder,
  above: StarOrder,
  budget: Budget,
  pulse: Pulse,
): Star {
  const size = order.entry.length;
  const local = budget.int32(size);
  const firstUnion = budget.none(size);
  const secondUnion = budget.none(size);
  const { nodes } = levels[d]!;
  for (let g = 0; g < size; g++) {
    const e = order.entry[g]!;
    local[e] = g - order.start[nodes[e]!]!;
  }
  for (let g = 0; g < above.entry.length; g++) {
    const union = above.entry[g]!;
    const row = rowOfUnion(levels, d, union);
    const place = order.start[nodes[row]!]! + local[row]!;
    if (firstUnion[place]! < 0) firstUnion[place] = union;
    else if (secondUnion[place]! < 0) secondUnion[place] = union;
  }
  pulse.tick(4 * above.entry.length);
  return { ...order, local, firstUnion, secondUnion };
}

/** The entry of x + sigma for an entry of x + sigma + w one dimension up, w last in sigma + w. */
export function rowOfUnion(levels: readonly Level[], d: number, union: number): number {
  const upper = levels[d + 1]!;
  const x = upper.nodes[union]!;
  const sigmaW = upper.facets[union]!;
  const { nodes } = levels[d]!;
  const last = nodes[sigmaW * (d + 1) + d]!;
  const at = union - (union % (d + 2));
  let i = 0;
  while (upper.nodes[at + i] !== last) i++;
  const row = upper.facets[at + i]! * (d + 1);
  let slot = 0;
  while (nodes[row + slot] !== x) slot++;
  return row + slot;
}

/** Most rows that a node's star has. */
export function widestStar({ start }: Star): number {
  let size = 0;
  for (let x = 0; x + 1 < start.length; x++) size = Math.max(size, start[x + 1]! - start[x]!);
  return size;
}
