import type { Network } from '../engine/types';

/** Seeded generator of numbers in [0, 1): xorshift32 (Marsaglia 2003). */
export function seeded(seed: number): () => number {
  let state = (seed * 2_654_435_769) | 1;
  const next = () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) / 4_294_967_296;
  };
  for (let i = 0; i < 8; i++) next();
  return next;
}

function network(nodeCount: number, edges: number[]): Network {
  const values = Float64Array.from({ length: nodeCount }, (_, v) => v);
  return { nodeCount, edges: Uint32Array.from(edges), values };
}

/** A: every pair is joined with the same probability (Gilbert 1959). */
export function constantProbability(nodeCount: number, probability: number, seed: number): Network {
  const random = seeded(seed);
  const edges: number[] = [];
  for (let j = 0; j < nodeCount; j++) {
    for (let i = 0; i < j; i++) if (random() < probability) edges.push(i, j);
  }
  return network(nodeCount, edges);
}

/** B: node i joins each earlier node with probability i / n. */
export function growingProbability(nodeCount: number, seed: number): Network {
  const random = seeded(seed);
  const edges: number[] = [];
  for (let j = 0; j < nodeCount; j++) {
    for (let i = 0; i < j; i++) if (random() < j / nodeCount) edges.push(i, j);
  }
  return network(nodeCount, edges);
}

/**
 * C: preferential attachment (Barabasi, Albert 1999), `links` links per new node, entries in order
 * of attachment, or in a random order that has nothing to do with it.
 */
export function preferentialAttachment(
  nodeCount: number,
  links: number,
  seed: number,
  order: 'attachment' | 'random' = 'attachment',
): Network {
  const random = seeded(seed);
  const edges: number[] = [];
  const ends: number[] = [];
  let targets = Array.from({ length: Math.min(links, nodeCount) }, (_, i) => i);
  for (let v = links; v < nodeCount; v++) {
    for (const u of targets) {
      edges.push(u, v);
      ends.push(u, v);
    }
    const chosen = new Set<number>();
    while (chosen.size < links) chosen.add(ends[Math.floor(random() * ends.length)]!);
    targets = [...chosen];
  }
  if (order === 'attachment') return network(nodeCount, edges);
  const place = Array.from({ length: nodeCount }, (_, v) => v);
  for (let i = nodeCount - 1; i > 0; i--) {
    const k = Math.floor(random() * (i + 1));
    [place[i], place[k]] = [place[k]!, place[i]!];
  }
  return network(
    nodeCount,
    edges.map((v) => place[v]!),
  );
}

/** D: points of the unit square, joined if closer than the radius. */
export function randomGeometric(nodeCount: number, radius: number, seed: number): Network {
  const random = seeded(seed);
  const points = Array.from({ length: nodeCount }, () => [random(), random()] as const);
  const edges: number[] = [];
  for (let j = 0; j < nodeCount; j++) {
    for (let i = 0; i < j; i++) {
      const distance = Math.hypot(points[i]![0] - points[j]![0], points[i]![1] - points[j]![1]);
      if (distance < radius) edges.push(i, j);
    }
  }
  return network(nodeCount, edges);
}

export interface BenchGraph {
  readonly name: string;
  readonly network: () => Network;
}

/** The graphs of the comparison, in the order of the table. */
export const benchGraphs: readonly BenchGraph[] = [
  { name: 'A n=70 p=.4', network: () => constantProbability(70, 0.4, 1) },
  { name: 'B n=70', network: () => growingProbability(70, 1) },
  { name: 'C n=70', network: () => preferentialAttachment(70, 10, 1) },
  { name: 'D n=100 r=.25', network: () => randomGeometric(100, 0.25, 1) },
  { name: 'C n=200', network: () => preferentialAttachment(200, 10, 1) },
  { name: 'A n=200 p=.2', network: () => constantProbability(200, 0.2, 1) },
  { name: 'A n=300 p=.2', network: () => constantProbability(300, 0.2, 1) },
  { name: 'C n=500', network: () => preferentialAttachment(500, 10, 1) },
  { name: 'C n=1000', network: () => preferentialAttachment(1000, 10, 1) },
  { name: 'A n=500 p=.1', network: () => constantProbability(500, 0.1, 1) },
  { name: 'C n=2000', network: () => preferentialAttachment(2000, 10, 1) },
];
