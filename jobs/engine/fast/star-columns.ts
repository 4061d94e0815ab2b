import type { Budget } from './budget';
import type { Level } from './levels';
import type { Pulse } from './pulse';
import { rowOfUnion, type Star, type StarOrder } from './stars';

/**
 * The simplices x + sigma of one dimension that may be critical columns of x's star: those that are
 * not paired for nothing with a row or a column of the star. Sorted by node x, then by sigma.
 */
export interface StarColumns {
  /** Those of node x lie at start[x]..start[x+1]-1. */
  readonly start: Int32Array;
  readonly entry: Int32Array;
  /** Id of sigma, the order of the columns. */
  readonly sigma: Int32Array;
  /** Position of the latest node of sigma. */
  readonly latest: Int32Array;
  /** Local index in x's star, -1 in the top dimension. */
  readonly local: Int32Array;
  /** If this is the second union of its facet: the node that the first union adds; else -1. */
  readonly elder: Int32Array;
}

export interface StarCandidates {
  /** Without a union: critical whichever node a is taken out, unless `elder` is a. */
  readonly free: StarColumns;
  /** With one union: critical only if the node it adds is taken out. */
  readonly single: StarColumns;
  /** The node that the one union of each of `single` adds; within node x sorted by it first. */
  readonly singleNode: Int32Array;
}

/** Number of unions of each place (at most 2) and the node the first one adds. */
export interface UnionSummary {
  readonly count: Uint8Array;
  readonly node: Int32Array;
}

/** Summary of stored unions. */
export function summariseUnions(
  levels: readonly Level[],
  d: number,
  star: Star,
  budget: Budget,
): UnionSummary {
  const size = star.entry.length;
  const count = budget.uint8(size);
  const node = budget.none(size);
  const upper = levels[d + 1]!;
  const { nodes } = levels[d]!;
  for (let g = 0; g < size; g++) {
    const union = star.firstUnion[g]!;
    if (union < 0) continue;
    count[g] = star.secondUnion[g]! < 0 ? 1 : 2;
    node[g] = nodes[upper.facets[union]! * (d + 1) + d]!;
  }
  return { count, node };
}

/**
 * The same in the top dimension, whose unions are not listed: x + sigma + w exists exactly if w, the
 * last node of a child of sigma, is adjacent to x.
 */
export function findTopUnions(
  levels: readonly Level[],
  d: number,
  order: StarOrder,
  neighbours: Adjacency,
  budget: Budget,
  pulse: Pulse,
): UnionSummary {
  const size = order.entry.length;
  const count = budget.uint8(size);
  const node = budget.none(size);
  const { facets, nodes } = levels[d]!;
  const { firstChild, childCount } = levels[d - 1]!;
  const nodeCount = order.start.length - 1;
  const adjacentTo = new Int32Array(nodeCount).fill(-1);
  for (let x = 0; x < nodeCount; x++) {
    for (let i = neighbours.start[x]!; i < neighbours.start[x + 1]!; i++) {
      adjacentTo[neighbours.items[i]!] = x;
    }
    for (let g = order.start[x]!; g < order.start[x + 1]!; g++) {
      const sigma = facets[order.entry[g]!]!;
      const children = childCount[sigma]!;
      let found = 0;
      let i = 0;
      for (; i < children && found < 2; i++) {
        const w = nodes[(firstChild[sigma]! + i) * (d + 1) + d]!;
        if (adjacentTo[w] !== x) continue;
        if (found++ === 0) node[g] = w;
      }
      count[g] = found;
      pulse.tick(i + 1);
    }
  }
  return { count, node };
}

/** Neighbours of node x by position: items[start[x]..start[x+1]-1], ascending. */
export interface Adjacency {
  readonly start: Int32Array;
  readonly items: Int32Array;
}

/**
 * Sorts out the candidates of dimension d >= 1. In dimension 1 the rule for first unions is left to
 * the pair, since it depends on where x stands (see `overlay.ts`).
 */
export function starCandidates(
  levels: readonly Level[],
  d: number,
  order: StarOrder,
  unions: UnionSummary,
  below: { star: Star; unions: UnionSummary },
  budget: Budget,
): StarCandidates {
  const kinds: number[][] = [[], []];
  const elders: number[][] = [[], []];
  const belowNodes = levels[d - 1]!.nodes;
  for (let g = 0; g < order.entry.length; g++) {
    const kind = unions.count[g]!;
    if (kind === 2) continue;
    let elder = -1;
    if (d > 1) {
      const union = order.entry[g]!;
      const row = rowOfUnion(levels, d - 1, union);
      const place = below.star.start[belowNodes[row]!]! + below.star.local[row]!;
      if (below.star.firstUnion[place] === union) continue;
      if (below.star.secondUnion[place] === union) elder = below.unions.node[place]!;
    }
    kinds[kind]!.push(g);
    elders[kind]!.push(elder);
  }
  const build = (kind: number, ranks: Int32Array): StarColumns =>
    gather(levels, d, order, { places: kinds[kind]!, elders: elders[kind]!, ranks }, budget);
  const single = kinds[1]!;
  const { nodes } = levels[d]!;
  const ranks = Int32Array.from({ length: single.length }, (_, i) => i);
  const owner = (i: number) => nodes[order.entry[single[i]!]!]!;
  const added = (i: number) => unions.node[single[i]!]!;
  ranks.sort((i, j) => owner(i) - owner(j) || added(i) - added(j) || i - j);
  const singleNode = budget.int32(single.length);
  ranks.forEach((i, k) => (singleNode[k] = added(i)));
  const identity = Int32Array.from({ length: kinds[0]!.length }, (_, i) => i);
  return { free: build(0, identity), single: build(1, ranks), singleNode };
}

function gather(
  levels: readonly Level[],
  d: number,
  order: StarOrder,
  chosen: { places: readonly number[]; elders: readonly number[]; ranks: Int32Array },
  budget: Budget,
): StarColumns {
  const { nodes, facets } = levels[d]!;
  const count = chosen.ranks.length;
  const nodeCount = order.start.length - 1;
  const start = budget.int32(nodeCount + 1);
  const entry = budget.int32(count);
  const sigma = budget.int32(count);
  const latest = budget.int32(count);
  const local = budget.none(count);
  const elder = budget.int32(count);
  for (let k = 0; k < count; k++) {
    const i = chosen.ranks[k]!;
    const g = chosen.places[i]!;
    const x = nodes[order.entry[g]!]!;
    start[x + 1]!++;
    entry[k] = order.entry[g]!;
    sigma[k] = facets[entry[k]!]!;
    latest[k] = order.latest[g]!;
    local[k] = g - order.start[x]!;
    elder[k] = chosen.elders[i]!;
  }
  for (let x = 0; x < nodeCount; x++) start[x + 1]! += start[x]!;
  return { start, entry, sigma, latest, local, elder };
}
