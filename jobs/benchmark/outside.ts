/** The same swaps by outside programs, a sample at a time: GUDHI from Python, and ripser. */
import { execFileSync } from 'node:child_process';
import { performance } from 'node:perf_hooks';
import { join } from 'node:path';
import { z } from 'zod';
import type { Network } from '../engine/types';
import { median } from './figures';
import { seeded } from './graphs';
import { secondsSince } from './poolRuns';

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

const loopOutput = z.strictObject({
  plain: z.array(z.number()),
  collapsed: z.array(z.number()),
  kept: z.array(z.number()),
  distances: z.array(z.number()),
  disagreements: z.number(),
  bytes: z.number(),
});

/** Seconds per swap of loops over GUDHI, its own bottleneck distance included. */
export interface GudhiTimes {
  /** The better of a complex built anew and one whose edges are collapsed first. */
  readonly better: { readonly name: 'plain' | 'collapsed'; readonly seconds: readonly number[] };
  /** A complex that is built once and whose values are assigned anew. */
  readonly kept: readonly number[];
  /** Swaps of the sample whose barcodes differ between the three. */
  readonly disagreements: number;
  readonly bytes: number;
}

/** What of the sample can be done within `limit` seconds. */
export function gudhiSeconds(
  network: Network,
  top: number,
  swaps: readonly [number, number][],
  limit: number,
): GudhiTimes {
  const { nodeCount: n, values } = network;
  const input = { n, edges: edgesOf(network), values: [...values], top, swaps, seconds: limit };
  const output = execFileSync('/usr/bin/python3', [join('jobs', 'benchmark', 'gudhiLoop.py')], {
    input: JSON.stringify(input),
    encoding: 'utf8',
    maxBuffer: 2 ** 26,
  });
  const { distances, disagreements, bytes, ...ways } = loopOutput.parse(JSON.parse(output));
  const whole = (way: keyof typeof ways) => ways[way].map((own, i) => own + distances[i]!);
  const [plain, collapsed] = [whole('plain'), whole('collapsed')];
  const better =
    median(collapsed) < median(plain)
      ? ({ name: 'collapsed', seconds: collapsed } as const)
      : ({ name: 'plain', seconds: plain } as const);
  return { better, kept: whole('kept'), disagreements, bytes };
}

/**
 * Seconds of ripser for each swap, its start (measured on one edge) taken off; barcodes only. Swaps
 * that are not begun within `limit` seconds are left out.
 */
export function ripserSeconds(
  network: Network,
  top: number,
  swaps: readonly [number, number][],
  limit: number,
): number[] {
  const start = Math.min(...Array.from({ length: 5 }, () => timed('1', 2, top)));
  const began = performance.now();
  const seconds: number[] = [];
  for (const [u, v] of swaps) {
    if (secondsSince(began) > limit) break;
    const values = network.values.slice();
    [values[u], values[v]] = [values[v]!, values[u]!];
    const input = lowerDistances({ ...network, values });
    seconds.push(Math.max(0, timed(input, network.nodeCount, top) - start));
  }
  return seconds;
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
