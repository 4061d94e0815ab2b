import { describe, expect, it } from 'vitest';
import { FirstForm, layFirstForm } from '../../jobs/benchmark/firstForm/firstForm';
import type { Diagram } from '../../jobs/benchmark/firstForm/diagram';
import type { Network } from '../../jobs/engine/types';
import { ENTRY_KINDS, MODELS, randomNetwork, withEntries } from '../support/graphs';
import { AMPLE, fastMatrix } from './fastMatrix';

/** Finite bars of positive length as text, in order. */
const barsOf = ({ births, deaths, count }: Diagram): string[] =>
  Array.from({ length: count }, (_, i) => `${births[i]}..${deaths[i]}`);

/** What differs between the first form and the engine; counts the swaps. */
function differences(network: Network, maxDimension: number) {
  const engine = fastMatrix(network, { maxDimension });
  const form = new FirstForm(layFirstForm(network, maxDimension, AMPLE));
  const rows = Uint32Array.from({ length: network.nodeCount }, (_, p) => p);
  const { distances } = form.rows(rows);
  const found: string[] = [];
  distances.forEach((distance, at) => {
    if (distance !== engine.results.distances[at]) {
      found.push(`cell ${at}: ${distance} instead of ${engine.results.distances[at]}`);
    }
  });
  const { values } = network;
  const sorted = Float64Array.from(values).sort();
  let swaps = 0;
  for (let p = 0; p < network.nodeCount; p++) {
    form.beginRow(p);
    for (let q = p + 1; q < network.nodeCount; q++, swaps++) {
      form.swap(p, q);
      if (sorted[p] === sorted[q]) continue;
      form.diagrams.forEach(({ after }, k) => {
        const { births, deaths } = engine.swapped[swaps]![k]!;
        const wanted = Array.from(births, (birth, i) => `${birth}..${deaths[i]}`).filter(
          (bar) => !bar.endsWith('Infinity'),
        );
        if (barsOf(after).join() !== wanted.join()) found.push(`bars ${k} of swap ${p}, ${q}`);
      });
    }
  }
  return { swaps, found };
}

describe('the first form of the algorithm', () => {
  it.each(MODELS)('has the barcodes and distances of the engine on graphs of model %s', (model) => {
    let swaps = 0;
    ENTRY_KINDS.forEach((kind, i) => {
      for (let seed = 0; seed < 4; seed++) {
        const plain = randomNetwork(model, 10 + 5 * seed, 100 * i + seed);
        const result = differences(withEntries(plain, kind, seed), 3 - (seed % 2));
        expect(result.found).toEqual([]);
        swaps += result.swaps;
      }
    });
    expect(swaps).toBeGreaterThan(2_500);
  });
});
