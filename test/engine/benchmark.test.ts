import { describe, expect, it } from 'vitest';
import { growthExponent, median, spread, times } from '../../jobs/benchmark/figures';
import { benchGraphs } from '../../jobs/benchmark/graphs';
import { readOptions } from '../../jobs/benchmark/options';
import { sampleSwaps } from '../../jobs/benchmark/outside';

describe('the figures of the benchmark', () => {
  it('the fitted exponent is that of a power law, and noise of equal sizes cancels', () => {
    const points = [10, 20, 40, 80].map((size) => ({ size, time: 3e-4 * size ** 2.5 }));
    expect(growthExponent(points)).toBeCloseTo(2.5, 12);
    const noisy = points.flatMap(({ size, time }) => [
      { size, time: 2 * time },
      { size, time: time / 2 },
    ]);
    expect(growthExponent(noisy)).toBeCloseTo(2.5, 12);
  });

  it('a spread names the median, the least and the most', () => {
    expect(median([4, 1, 2])).toBe(2);
    expect(median([4, 1, 2, 3])).toBe(2.5);
    expect(spread([4, 1, 2], times)).toBe('2.00× (1.00×–4.00×)');
    expect(spread([4], times)).toBe('4.00×');
  });

  it('sampled swaps are the same each time, of two different nodes', () => {
    const swaps = sampleSwaps(9, 200);
    expect(swaps).toEqual(sampleSwaps(9, 200));
    expect(swaps.every(([u, v]) => u !== v && Math.max(u, v) < 9 && Math.min(u, v) >= 0)).toBe(
      true,
    );
  });
});

describe('the graphs of the benchmark', () => {
  it('are simple and the same each time', () => {
    for (const { name, network } of benchGraphs.slice(0, 6)) {
      const { nodeCount, edges } = network();
      expect(network().edges, name).toEqual(edges);
      const keys = new Set<number>();
      for (let e = 0; e < edges.length; e += 2) {
        const [u, v] = [edges[e]!, edges[e + 1]!];
        expect(u, name).not.toBe(v);
        keys.add(Math.min(u, v) * nodeCount + Math.max(u, v));
      }
      expect(keys.size, name).toBe(edges.length / 2);
    }
  });
});

describe('the options of the benchmark', () => {
  it('have defaults, and may choose sections and graphs', () => {
    expect(readOptions([])).toMatchObject({
      sections: ['matrix', 'first-form', 'growth'],
      graphs: [],
      dimension: 3,
    });
    const chosen = readOptions(['--sections', 'growth,matrix', '--graphs', 'A n=70,C', '--runs=2']);
    expect(chosen).toMatchObject({
      sections: ['growth', 'matrix'],
      graphs: ['A n=70', 'C'],
      runs: 2,
    });
    expect(readOptions(['--product']).sections).toEqual(['product']);
  });

  it('a wrong one is named', () => {
    expect(() => readOptions(['--dimension', '4'])).toThrow(/--dimension is wrong/);
    expect(() => readOptions(['--sections', 'speed'])).toThrow(/--sections is wrong/);
    expect(() => readOptions(['--graph', 'A'])).toThrow(/--graph/);
  });
});
