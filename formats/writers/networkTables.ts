import type { Cell } from '../csv';
import type { NetworkNode } from '../types';
import { VALUE_COLUMNS } from '../understanding/choices';
import { numberText } from './cells';
import type { WrittenNetwork } from './types';

export const NODE_HEADER: readonly string[] = [
  ...['id', 'label', 'entry', 'earliest', 'latest'],
  ...[VALUE_COLUMNS.entry, VALUE_COLUMNS.earliest, VALUE_COLUMNS.latest, VALUE_COLUMNS.unit],
];

/** A row for each node: what came in, then the values as understood, and their unit. */
export function* nodeRows({ nodes, entryUnit }: WrittenNetwork): Generator<readonly Cell[]> {
  for (const node of nodes) {
    const { id, label, entryRaw, earliestRaw, latestRaw } = node;
    yield [id, label, entryRaw, earliestRaw, latestRaw, ...valuesOf(node), entryUnit];
  }
}

const valuesOf = ({ entry, earliest, latest }: NetworkNode): Cell[] =>
  [entry, earliest, latest].map((value) => (value === null ? null : numberText(value)));

export const edgeHeader = ({ weights }: WrittenNetwork): readonly string[] =>
  weights ? ['source', 'target', 'weight'] : ['source', 'target'];

/** A row for each edge, by the ids of its ends; the weight is empty where there is none. */
export function* edgeRows(network: WrittenNetwork): Generator<readonly Cell[]> {
  for (const { source, target, weight } of edgesOf(network)) {
    const ends = [source, target];
    yield network.weights ? [...ends, weight === null ? null : numberText(weight)] : ends;
  }
}

export interface WrittenEdge {
  readonly source: string;
  readonly target: string;
  /** Null where the network or the edge has none. */
  readonly weight: number | null;
}

/** Edges in their stored order: ascending by node rows. */
export function* edgesOf({ nodes, edges, weights }: WrittenNetwork): Generator<WrittenEdge> {
  const idOf = (at: number): string => nodes[edges[at] ?? 0]?.id ?? '';
  for (let at = 0; at < edges.length; at += 2) {
    const weight = weights?.[at / 2] ?? NaN;
    const known = Number.isNaN(weight) ? null : weight;
    yield { source: idOf(at), target: idOf(at + 1), weight: known };
  }
}
