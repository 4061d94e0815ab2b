/** Outside programs that compute the same things: GUDHI 3.7.1, ripser and networkx from Debian. */
import { execFileSync } from 'node:child_process';
import { join } from 'node:path';
import { z } from 'zod';
import type { Barcode, Network } from '../../jobs/engine/types';

/** Bars of one dimension, sorted; the death of an infinite bar is Infinity. */
export type PairList = (readonly [number, number])[];

const barcodes = z.array(z.array(z.array(z.tuple([z.number(), z.number().nullable()]))));
const edgeLists = z.array(z.array(z.tuple([z.number(), z.number()])));

const graphFiles = z.array(
  z.object({
    graphml: z.string(),
    gexf: z.string(),
    gml: z.string(),
    json: z.string(),
    net: z.string(),
  }),
);

function python(script: string, input: unknown): unknown {
  const output = execFileSync('/usr/bin/python3', [join(import.meta.dirname, script)], {
    input: JSON.stringify(input),
    maxBuffer: 2 ** 28,
    encoding: 'utf8',
  });
  return JSON.parse(output);
}

export function edgesOf({ edges }: Network): [number, number][] {
  return Array.from({ length: edges.length / 2 }, (_, e) => [edges[2 * e]!, edges[2 * e + 1]!]);
}

/** Barcodes of dimensions 0..top by GUDHI (Maria, Boissonnat, Glisse, Yvinec 2014). */
export function gudhiBarcodes(networks: readonly Network[], top: number): PairList[][] {
  const graphs = networks.map((network) => ({
    n: network.nodeCount,
    edges: edgesOf(network),
    values: [...network.values],
    top,
  }));
  return barcodes
    .parse(python('gudhiBarcodes.py', graphs))
    .map((bars) =>
      bars.map((pairs) => pairs.map(([birth, death]) => [birth, death ?? Infinity] as const)),
    );
}

/** Edge lists of networkx's G(n, p) graphs. */
export function networkxGraphs(
  requests: readonly (readonly [number, number, number])[],
): [number, number][][] {
  return edgeLists.parse(python('gnpGraphs.py', requests));
}

/** A graph as it is handed to networkx: name, entry and kind of nodes; ends and weight of edges. */
export interface GivenGraph {
  readonly directed: boolean;
  readonly nodes: readonly (readonly [name: string, entry: number, kind: string])[];
  readonly edges: readonly (readonly [earlier: string, later: string, weight: number])[];
}

/** The files that networkx writes of graphs, by their endings. */
export const networkxFiles = (graphs: readonly GivenGraph[]) =>
  graphFiles.parse(python('graphFiles.py', graphs));

/**
 * Bars of dimensions 1..top by ripser (Bauer 2021), as ranks of f. ripser filters by edges: an edge
 * enters with its later node, and pairs without an edge stay beyond the threshold. It computes in
 * single precision, hence ranks. Dimension 0 differs by definition: its nodes are all there at once.
 */
export function ripserBars(network: Network, ranks: readonly number[], top: number): PairList[] {
  const n = network.nodeCount;
  const beyond = n + 2;
  const distance = Array.from({ length: n }, () => new Array<number>(n).fill(beyond));
  for (const [u, v] of edgesOf(network)) {
    const entered = Math.max(ranks[u]!, ranks[v]!) + 1;
    distance[u]![v] = entered;
    distance[v]![u] = entered;
  }
  const rows = distance.map((row, u) => row.slice(0, u).join(' ')).slice(1);
  const output = execFileSync(
    'ripser',
    ['--format', 'lower-distance', '--dim', String(top), '--threshold', String(n + 1)],
    { input: rows.join('\n'), encoding: 'utf8', maxBuffer: 2 ** 28 },
  );
  return readRipser(output, top);
}

function readRipser(output: string, top: number): PairList[] {
  const bars: [number, number][][] = Array.from({ length: top + 1 }, () => []);
  let dimension = -1;
  for (const line of output.split('\n')) {
    const header = /intervals in dim (\d+)/.exec(line);
    const bar = /\[([\d.e+-]+),\s*([\d.e+-]*)\)/.exec(line);
    if (header) dimension = Number(header[1]);
    else if (bar && dimension >= 0 && dimension <= top && !line.includes('value range')) {
      bars[dimension]!.push([Number(bar[1]) - 1, bar[2] === '' ? Infinity : Number(bar[2]) - 1]);
    }
  }
  return bars.map((pairs) => pairs.sort(byBar));
}

/** By birth, then death. */
export function byBar(x: readonly [number, number], y: readonly [number, number]): number {
  return x[0] - y[0] || (x[1] === y[1] ? 0 : x[1] - y[1]);
}

export function pairLists(barcode: Barcode): PairList[] {
  return barcode.map(({ births, deaths }) =>
    Array.from(births, (birth, k) => [birth, deaths[k]!] as const),
  );
}

/** The network with the values of two arrival positions exchanged. */
export function swapped(network: Network, [p, q]: readonly [number, number]): Network {
  const rows = Array.from({ length: network.nodeCount }, (_, row) => row);
  rows.sort((u, v) => network.values[u]! - network.values[v]! || u - v);
  const values = network.values.slice();
  [values[rows[p]!], values[rows[q]!]] = [values[rows[q]!]!, values[rows[p]!]!];
  return { ...network, values };
}
