/** The same swaps by outside programs, a sample at a time: GUDHI from Python, and ripser. */
import { execFileSync } from 'node:child_process';
import { performance } from 'node:perf_hooks';
import { join } from 'node:path';
import type { Network } from '../engine/types';
import { seeded } from './graphs';

const secondsSince = (start: number): number => (performance.now() - start) / 1000;

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((x, y) => x - y);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}

/** Pairs of node rows drawn uniformly, the same for the same seed. */
export function sampleSwaps(nodeCount: number, count: number): [number, number][] {
  const random = seeded(7);
  return Array.from({ length: count }, () => {
    const u = Math.floor(random() * nodeCount);
    const v = (u + 1 + Math.floor(random() * (nodeCount - 1))) % nodeCount;
    return [u, v];
  });
}

function edgesOf({ edges }: Network): [number, number][] {
  return Array.from({ length: edges.length / 2 }, (_, e) => [edges[2 * e]!, edges[2 * e + 1]!]);
}

/** Seconds of each swap in a loop over GUDHI, its own bottleneck distance included. */
export function gudhiSeconds(
  network: Network,
  top: number,
  swaps: readonly [number, number][],
): number[] {
  const input = {
    n: network.nodeCount,
    edges: edgesOf(network),
    values: [...network.values],
    top,
    swaps,
  };
  const output = execFileSync('/usr/bin/python3', [join('jobs', 'benchmark', 'gudhiLoop.py')], {
    input: JSON.stringify(input),
    encoding: 'utf8',
    maxBuffer: 2 ** 26,
  });
  const seconds: unknown = JSON.parse(output);
  if (!Array.isArray(seconds)) throw new Error('The loop over GUDHI gave no list of seconds.');
  return seconds.map(Number);
}

/** Seconds of ripser for each swap, its start (measured on one edge) taken off; barcodes only. */
export function ripserSeconds(
  network: Network,
  top: number,
  swaps: readonly [number, number][],
): number[] {
  const start = Math.min(...Array.from({ length: 5 }, () => timed('1', 2, top)));
  return swaps.map(([u, v]) => {
    const values = network.values.slice();
    [values[u], values[v]] = [values[v]!, values[u]!];
    return Math.max(
      0,
      timed(lowerDistances({ ...network, values }), network.nodeCount, top) - start,
    );
  });
}

function timed(input: string, nodeCount: number, top: number): number {
  const start = performance.now();
  execFileSync(
    'ripser',
    ['--format', 'lower-distance', '--dim', String(top), '--threshold', String(nodeCount + 1)],
    { input, maxBuffer: 2 ** 28 },
  );
  return secondsSince(start);
}

/** Edges enter with their later node; pairs without an edge stay beyond the threshold. */
function lowerDistances(network: Network): string {
  const n = network.nodeCount;
  const distance = Array.from({ length: n }, (_, u) => new Array<number>(u).fill(n + 2));
  for (const [u, v] of edgesOf(network)) {
    distance[Math.max(u, v)]![Math.min(u, v)] =
      Math.max(network.values[u]!, network.values[v]!) + 1;
  }
  return distance
    .slice(1)
    .map((row) => row.join(' '))
    .join('\n');
}
