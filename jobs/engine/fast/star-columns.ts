import type { Budget } from './budget';
import type { Level } from './levels';
import type { Pulse } from './pulse';
import { rowOfUnion, sortBy, type Star, type StarOrder } from './stars';

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
  const rule = d === 1 ? NO_RULE : firstUnionRule(levels, d, order, below);
  const placesOf = (kind: number) => placesWith(kind, unions, rule, order, budget);
  const build = (places: Int32Array) => gather(levels, d, order, { places, rule }, budget);
  const places = placesOf(0);
  const free = build(places);
  budget.release(places);
  const inOrder = placesOf(1);
  const sorted = sortByNodes(inOrder, levels[d]!, order, unions, budget);
  const singleNode = budget.int32(sorted.length);
  sorted.forEach((g, k) => (singleNode[k] = unions.node[g]!));
  const single = build(sorted);
  budget.release(inOrder);
  budget.release(sorted);
  return { free, single, singleNode };
}

/** Places with one union by (node x, node that the union adds, place): two counting sorts. */
function sortByNodes(
  places: Int32Array,
  { nodes }: Level,
  { start, entry }: StarOrder,
  unions: UnionSummary,
  budget: Budget,
): Int32Array {
  const nodeCount = start.length - 1;
  const byAdded = budget.int32(places.length);
  const sorted = budget.int32(places.length);
  sortBy(
    nodeCount,
    places.map((g) => unions.node[g]!),
    undefined,
    byAdded,
  );
  sortBy(
    nodeCount,
    places.map((g) => nodes[entry[g]!]!),
    byAdded,
    sorted,
  );
  budget.release(byAdded);
  for (let k = 0; k < sorted.length; k++) sorted[k] = places[sorted[k]!]!;
  return sorted;
}

/** `PAIRED` where x + sigma is the first union of its facet, else its `elder`. */
type FirstUnionRule = (place: number) => number;
const PAIRED = -2;
const NO_RULE: FirstUnionRule = () => -1;

function firstUnionRule(
  levels: readonly Level[],
  d: number,
  order: StarOrder,
  { star, unions }: { star: Star; unions: UnionSummary },
): FirstUnionRule {
  const { nodes } = levels[d - 1]!;
  return (g) => {
    const union = order.entry[g]!;
    const row = rowOfUnion(levels, d - 1, union);
    const place = star.start[nodes[row]!]! + star.local[row]!;
    if (star.firstUnion[place] === union) return PAIRED;
    return star.secondUnion[place] === union ? unions.node[place]! : -1;
  };
}

/** Places, ascending, with so many unions that are not paired as the first union of their facet. */
function placesWith(
  kind: number,
  unions: UnionSummary,
  rule: FirstUnionRule,
  { entry }: StarOrder,
  budget: Budget,
): Int32Array {
  const isMeant = (g: number) => unions.count[g] === kind && rule(g) !== PAIRED;
  let count = 0;
  for (let g = 0; g < entry.length; g++) if (isMeant(g)) count++;
  const places = budget.int32(count);
  count = 0;
  for (let g = 0; g < entry.length; g++) if (isMeant(g)) places[count++] = g;
  return places;
}

function gather(
  levels: readonly Level[],
  d: number,
  order: StarOrder,
  { places, rule }: { places: Int32Array; rule: FirstUnionRule },
  budget: Budget,
): StarColumns {
  const { nodes, facets } = levels[d]!;
  const count = places.length;
  const nodeCount = order.start.length - 1;
  const start = budget.int32(nodeCount + 1);
  const entry = budget.int32(count);
  const sigma = budget.int32(count);
  const latest = budget.int32(count);
  const local = budget.none(count);
  const elder = budget.int32(count);
  for (let k = 0; k < count; k++) {
    const g = places[k]!;
    const x = nodes[order.entry[g]!]!;
    start[x + 1]!++;
    entry[k] = order.entry[g]!;
    sigma[k] = facets[entry[k]!]!;
    latest[k] = order.latest[g]!;
    local[k] = g - order.start[x]!;
    elder[k] = rule(g);
  }
  for (let x = 0; x < nodeCount; x++) start[x + 1]! += start[x]!;
  return { start, entry, sigma, latest, local, elder };
}
