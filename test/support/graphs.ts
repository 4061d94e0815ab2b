import { uniformFloat64 } from 'pure-rand/distribution/uniformFloat64';
import { uniformInt } from 'pure-rand/distribution/uniformInt';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import type { Network } from '../../jobs/engine/types';

/** A seeded source of numbers; the same seed gives the same sequence on every machine. */
export interface Source {
  /** Uniform in [0, 1). */
  real(): number;
  /** Uniform integer in [from, to], both included. */
  integer(from: number, to: number): number;
}

export function seeded(seed: number): Source {
  const generator = xoroshiro128plus(seed);
  return {
    real: () => uniformFloat64(generator),
    integer: (from, to) => uniformInt(generator, from, to),
  };
}

/** A network from edges given as pairs of rows; values default to the rows themselves. */
export function networkOf(
  nodeCount: number,
  edges: readonly (readonly [number, number])[],
  values: readonly number[] = Array.from({ length: nodeCount }, (_, row) => row),
): Network {
  return {
    nodeCount,
    edges: Uint32Array.from(edges.flat()),
    values: Float64Array.from(values),
  };
}

/** Edges (j, i), j < i, kept where `joined(j, i)`; rows in ascending (i, j). */
function edgesWhere(nodeCount: number, joined: (j: number, i: number) => boolean) {
  const edges: [number, number][] = [];
  for (let i = 1; i < nodeCount; i++)
    for (let j = 0; j < i; j++) if (joined(j, i)) edges.push([j, i]);
  return edges;
}

/** Model A, G(n, p): every pair with probability p (Gilbert 1959). Entries 0..n-1. */
export function constantProbability(nodeCount: number, p: number, seed: number): Network {
  const source = seeded(seed);
  return networkOf(
    nodeCount,
    edgesWhere(nodeCount, () => source.real() < p),
  );
}

/** Model B: node i joins each earlier node with probability i / n. Entries 0..n-1. */
export function risingProbability(nodeCount: number, seed: number): Network {
  const source = seeded(seed);
  return networkOf(
    nodeCount,
    edgesWhere(nodeCount, (_, i) => source.real() < i / nodeCount),
  );
}

/**
 * Model C, preferential attachment (Barabási, Albert 1999): node i > 0 links to min(i, links)
 * distinct earlier nodes, each drawn with probability proportional to its degree (plus one while a
 * node has none). Entries 0..n-1.
 */
export function preferentialAttachment(nodeCount: number, links: number, seed: number): Network {
  const source = seeded(seed);
  const edges: [number, number][] = [];
  const urn: number[] = nodeCount > 0 ? [0] : [];
  for (let i = 1; i < nodeCount; i++) {
    const targets = new Set<number>();
    const wanted = Math.min(i, links);
    if (wanted === i) for (let j = 0; j < i; j++) targets.add(j);
    while (targets.size < wanted) targets.add(urn[source.integer(0, urn.length - 1)] ?? 0);
    for (const j of [...targets].sort((x, y) => x - y)) {
      edges.push([j, i]);
      urn.push(j, i);
    }
    if (wanted === 0) urn.push(i);
  }
  return networkOf(nodeCount, edges);
}

/** Model D, random geometric graph: points in the unit square, joined within `radius`. Entries 0..n-1. */
export function randomGeometric(nodeCount: number, radius: number, seed: number): Network {
  const source = seeded(seed);
  const points = Array.from({ length: nodeCount }, () => [source.real(), source.real()] as const);
  return networkOf(
    nodeCount,
    edgesWhere(nodeCount, (j, i) => {
      const [from, to] = [points[j], points[i]];
      return (
        from !== undefined &&
        to !== undefined &&
        Math.hypot(from[0] - to[0], from[1] - to[1]) <= radius
      );
    }),
  );
}

/** Model names, for test tables. */
export const MODELS = ['constant', 'rising', 'preferential', 'geometric'] as const;
export type Model = (typeof MODELS)[number];

/** A graph of the named model with parameters drawn from the seed; entries 0..n-1 (ties: see `withEntries`). */
export function randomNetwork(model: Model, nodeCount: number, seed: number): Network {
  const source = seeded(seed ^ 0x5eed);
  switch (model) {
    case 'constant':
      return constantProbability(nodeCount, 0.15 + 0.6 * source.real(), seed);
    case 'rising':
      return risingProbability(nodeCount, seed);
    case 'preferential':
      return preferentialAttachment(nodeCount, source.integer(1, 6), seed);
    case 'geometric':
      return randomGeometric(nodeCount, 0.15 + 0.4 * source.real(), seed);
  }
}

/** How entries are drawn: a permutation, few integers with ties, reals of both signs, or reals with ties. */
export const ENTRY_KINDS = ['ordered', 'shuffled', 'tied', 'real', 'realTied'] as const;
export type EntryKind = (typeof ENTRY_KINDS)[number];

/** The same graph with entries of the named kind. */
export function withEntries(network: Network, kind: EntryKind, seed: number): Network {
  const source = seeded(seed ^ 0x7a1e);
  const n = network.nodeCount;
  const values = Float64Array.from({ length: n }, (_, row) => row);
  if (kind === 'shuffled') {
    for (let i = n - 1; i > 0; i--) {
      const j = source.integer(0, i);
      [values[i], values[j]] = [values[j] ?? 0, values[i] ?? 0];
    }
  }
  if (kind === 'tied')
    for (let i = 0; i < n; i++) values[i] = source.integer(-2, Math.max(0, n >> 1));
  if (kind === 'real') for (let i = 0; i < n; i++) values[i] = 20 * source.real() - 10;
  if (kind === 'realTied') {
    const levels = Array.from({ length: (n >> 1) + 1 }, () => 6 * source.real() - 3);
    for (let i = 0; i < n; i++) values[i] = levels[source.integer(0, levels.length - 1)] ?? 0;
  }
  return { ...network, values };
}
