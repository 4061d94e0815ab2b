import { describe, expect, it } from 'vitest';
import { AGREEMENT_SWAPS } from '../support/config';
import {
  ENTRY_KINDS,
  MODELS,
  randomNetwork,
  seeded,
  withEntries,
  type EntryKind,
  type Model,
} from '../support/graphs';
import type { Network } from '../../jobs/engine/types';
import { disagreements } from './agreement';
import { randomLabels, type Options } from './fastMatrix';
import { allCliques } from './slowPath';

const LABELS = ['best', 'degree', 'position', 'random'] as const;
const ZERO_TESTS = ['auto', 'always', 'never'] as const;

/** Entries of every kind, and the same stretched to huge ones of both signs. */
function entries(model: Model, kind: EntryKind, nodeCount: number, seed: number) {
  const network = withEntries(randomNetwork(model, nodeCount, seed), kind, seed);
  if (seed % 5 !== 0) return network;
  return { ...network, values: network.values.map((value) => value * 2 ** 900) };
}

/** Cliques that the slow path reduces in a few milliseconds. */
const MOST_CLIQUES = 500;

/** The largest dimension up to `wanted` that leaves the slow path few enough cliques. */
function affordable(network: Network, wanted: number): number {
  let maxDimension = wanted;
  while (maxDimension > 0 && allCliques(network, maxDimension + 2).length > MOST_CLIQUES) {
    maxDimension--;
  }
  return maxDimension;
}

describe.each(MODELS)('model %s', (model) => {
  it.each(ENTRY_KINDS)(
    'every swapped barcode, distance and Betti gap is that of the definition, entries %s',
    { timeout: 3_600_000 },
    (kind) => {
      const wanted = AGREEMENT_SWAPS / (MODELS.length * ENTRY_KINDS.length);
      const source = seeded(1 + MODELS.indexOf(model) * 10 + ENTRY_KINDS.indexOf(kind));
      for (let swaps = 0, graph = 0; swaps < wanted; graph++) {
        // Mostly small graphs, where shortcuts show first; some up to 28 nodes.
        const nodeCount = graph % 12 === 11 ? source.integer(13, 28) : source.integer(0, 12);
        const seed = source.integer(1, 2 ** 30);
        const network = entries(model, kind, nodeCount, seed);
        const label = LABELS[graph % 4]!;
        const options: Options = {
          maxDimension: affordable(network, source.integer(0, 3)),
          labels: label === 'random' ? randomLabels(nodeCount, source) : label,
          zeroTests: ZERO_TESTS[graph % 3]!,
        };
        const result = disagreements(network, options);
        const where = `${nodeCount} nodes, seed ${seed}, labels ${label}, D ${options.maxDimension}`;
        expect(result.found, where).toEqual([]);
        swaps += result.swaps;
      }
    },
  );
});
