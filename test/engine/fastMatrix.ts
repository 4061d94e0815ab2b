import { MatrixComputation } from '../../jobs/engine/fast/compute';
import { changedBars, layFoundation, recordedBars } from '../../jobs/engine/fast/foundation';
import type { LabelOrder } from '../../jobs/engine/fast/tables';
import type { ZeroTests } from '../../jobs/engine/fast/zero-policy';
import type { Barcode, Control, Limits, Network, RowResults } from '../../jobs/engine/types';
import type { Source } from '../support/graphs';

export const QUIET: Control = { shouldStop: () => false, onProgress: () => undefined };
export const AMPLE: Limits = { simplices: 10_000_000, bytes: 2 ** 31 };

export interface Options {
  readonly maxDimension?: number;
  readonly labels?: LabelOrder;
  readonly zeroTests?: ZeroTests;
  readonly limits?: Limits;
  readonly control?: Control;
}

/** The network read in arrival order: rows by position, f by position, edges as positions. */
export function arrival(network: Network) {
  const { values } = network;
  const rows = Uint32Array.from({ length: network.nodeCount }, (_, v) => v);
  rows.sort((u, v) => values[u]! - values[v]! || u - v);
  const place = new Int32Array(network.nodeCount);
  rows.forEach((row, at) => (place[row] = at));
  return {
    rows,
    values: Float64Array.from(rows, (row) => values[row]!),
    ends: Int32Array.from(network.edges, (row) => place[row]!),
  };
}

export function foundationOf(network: Network, options: Options = {}) {
  const { values, ends } = arrival(network);
  return layFoundation({
    values,
    ends,
    maxDimension: options.maxDimension ?? 3,
    limits: options.limits ?? AMPLE,
    control: options.control ?? QUIET,
    labels: options.labels,
    zeroTests: options.zeroTests,
  });
}

export interface FastMatrix {
  readonly recorded: Barcode;
  /** Whole barcodes after each swap, in the order of the pairs (p, q). */
  readonly swapped: Barcode[];
  readonly results: RowResults;
}

/** The whole matrix by the fast path, with every swapped barcode. */
export function fastMatrix(network: Network, options: Options = {}): FastMatrix {
  const foundation = foundationOf(network, options);
  const rows = Uint32Array.from({ length: network.nodeCount }, (_, p) => p);
  const results = new MatrixComputation(foundation).rows(rows, options.control ?? QUIET);
  const computation = new MatrixComputation(foundation);
  const swapped: Barcode[] = [];
  for (let p = 0; p < network.nodeCount; p++) {
    computation.beginRow(p);
    for (let q = p + 1; q < network.nodeCount; q++) {
      computation.swap(p, q);
      swapped.push(changedBars(foundation, computation.changes.dimensions));
    }
  }
  return { recorded: recordedBars(foundation), swapped, results };
}

/** A label order drawn at random. */
export function randomLabels(nodeCount: number, source: Source): Int32Array {
  const labels = Int32Array.from({ length: nodeCount }, (_, v) => v);
  for (let i = nodeCount - 1; i > 0; i--) {
    const k = source.integer(0, i);
    [labels[i], labels[k]] = [labels[k]!, labels[i]!];
  }
  return labels;
}
