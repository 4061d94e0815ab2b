import { describe, expect, test } from 'vitest';
import { benchGraphs } from '../../jobs/benchmark/graphs';
import { prepare, recordedBarcode, swapDetail } from '../../jobs/engine/index';
import type { Control, Limits } from '../../jobs/engine/types';
import { seeded } from '../support/graphs';
import { gudhiBarcodes, pairLists, swapped } from './programs';

const QUIET: Control = { shouldStop: () => false, onProgress: () => undefined };
const AMPLE: Limits = { simplices: 50_000_000, bytes: 4 * 2 ** 30 };
const TOP = 3;
const SWAPS = 3;

/** Swaps of arrival positions near each other, half the order apart, and from end to end. */
function sampleOf(n: number, seed: number): (readonly [number, number])[] {
  const source = seeded(seed);
  return [4, n >> 1, n - 3].slice(0, SWAPS).map((apart) => {
    const p = source.integer(0, n - 1 - apart);
    return [p, p + apart] as const;
  });
}

describe('the large graphs of the benchmark have the barcodes of GUDHI', () => {
  test.each(benchGraphs.map((graph, i) => [graph.name, graph.network, i] as const))(
    '%s',
    (_, make, seed) => {
      const network = make();
      const swaps = sampleOf(network.nodeCount, seed + 1);
      const [recorded, ...after] = gudhiBarcodes(
        [network, ...swaps.map((swap) => swapped(network, swap))],
        TOP,
      );
      const ready = prepare(network, TOP, AMPLE, QUIET);
      expect(pairLists(recordedBarcode(ready))).toEqual(recorded);
      swaps.forEach(([p, q], i) => {
        expect(pairLists(swapDetail(ready, p, q).swapped), `${p} and ${q}`).toEqual(after[i]);
      });
    },
    120_000,
  );
});
