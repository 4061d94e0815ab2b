import { describe, expect, it } from 'vitest';
import { InfiniteBirths } from '../../jobs/engine/fast/births';
import { BottleneckSweep } from '../../jobs/engine/fast/bottleneck';
import { Budget } from '../../jobs/engine/fast/budget';
import { DimensionChanges } from '../../jobs/engine/fast/changes';
import { Pulse } from '../../jobs/engine/fast/pulse';
import { seeded } from '../support/graphs';
import { AMPLE, QUIET } from './fastMatrix';
import { slowDistance } from './slowPath';

type Bar = readonly [number, number];

/** The distance of two diagrams by the sweep, over the values of f that occur in them. */
function distance(before: readonly Bar[], after: readonly Bar[]): number {
  const ends = [...before, ...after].flat().filter(Number.isFinite);
  const value = Float64Array.from(new Set(ends)).sort();
  const rank = (x: number) => value.indexOf(x);
  const budget = new Budget(AMPLE);
  const changes = new DimensionChanges(budget, value.length);
  for (const [bars, sign] of [
    [before, -1],
    [after, 1],
  ] as const) {
    for (const [birth, death] of bars) {
      if (death === Infinity) changes.infinite(rank(birth), sign);
      else changes.finite(rank(birth) * value.length + rank(death), sign);
    }
  }
  changes.settle();
  const finite = before.filter(([, death]) => death < Infinity);
  const keys = Float64Array.from(finite, ([b, d]) => rank(b) * value.length + rank(d)).sort();
  const infinite = before.filter(([, death]) => death === Infinity).map(([birth]) => rank(birth));
  const ranks = Int32Array.from(infinite).sort();
  const bars = {
    keys,
    births: keys.map((key) => value[Math.floor(key / value.length)]!),
    deaths: keys.map((key) => value[key % value.length]!),
    infinite: ranks,
  };
  const floor = new InfiniteBirths(ranks, value, budget).distance(changes);
  return new BottleneckSweep(bars, value, budget, new Pulse(QUIET), 64).distance(changes, floor);
}

const sorted = (bars: readonly Bar[]) => {
  const list = [...bars].sort((x, y) => x[0] - y[0] || x[1] - y[1]);
  return {
    births: Float64Array.from(list, ([birth]) => birth),
    deaths: Float64Array.from(list, ([, death]) => death),
  };
};

describe('published distances', () => {
  it.each<[string, Bar[], Bar[], number]>([
    [
      'E1',
      [
        [2.7, 3.7],
        [9.6, 14],
        [34.2, 34.974],
        [3, Infinity],
      ],
      [
        [2.8, 4.45],
        [9.5, 14.1],
        [3.2, Infinity],
      ],
      0.75,
    ],
    ['E2a', [[0, 2]], [], 1],
    ['E2b', [[0, 2]], [[0, 3]], 1],
    ['E2d', [[0, 1]], [[5, 6]], 0.5],
    ['E3a', [[0, 4]], [[1, 5]], 1],
    ['E3b', [[0, 4]], [[3, 7]], 2],
    [
      'E3c',
      [
        [0, 1],
        [2, 3],
      ],
      [[0, 3]],
      1.5,
    ],
    [
      'E3d',
      [
        [0, 6],
        [3, 5],
      ],
      [
        [1, 5],
        [2, 7],
      ],
      2,
    ],
    [
      'E4a',
      [
        [1, Infinity],
        [4, Infinity],
      ],
      [
        [2, Infinity],
        [9, Infinity],
      ],
      5,
    ],
    ['E4b', [[1, Infinity]], [[3, Infinity]], 2],
    [
      'E5a',
      [
        [0, 2],
        [9, 13],
        [8, 12],
      ],
      [
        [4, 5],
        [3, 7],
        [1, 6],
      ],
      2.5,
    ],
    [
      'E5b',
      [
        [6, 7],
        [6, 8],
        [10, 11],
        [13, 19],
        [14, 17],
      ],
      [
        [8, 11],
        [13, 19],
        [14, 17],
      ],
      1.5,
    ],
    [
      'E5c',
      [
        [13, 20],
        [19, 23],
        [19, 23],
      ],
      [
        [12, 19],
        [13, 20],
        [13, 23],
        [15, 23],
      ],
      4,
    ],
  ])('%s', (_, before, after, expected) => {
    expect(distance(before, after)).toBeCloseTo(expected, 12);
    expect(distance(after, before)).toBeCloseTo(expected, 12);
  });

  it('equal bars take part in the matching (E6)', () => {
    expect(
      distance(
        [
          [0, 10],
          [2, 10],
        ],
        [
          [2, 10],
          [4, 10],
        ],
      ),
    ).toBe(2);
  });
});

describe('the search', () => {
  it('may end by taking the partner of a short bar, which goes to the diagonal', () => {
    expect(
      distance(
        [[2, 3]],
        [
          [1, 4],
          [2, 3],
        ],
      ),
    ).toBe(1);
  });

  it('covers both sides, not only the removed bars', () => {
    expect(
      distance(
        [[1, 4]],
        [
          [1, 5],
          [2, 5],
        ],
      ),
    ).toBe(1.5);
    expect(
      distance(
        [
          [1, 5],
          [2, 5],
        ],
        [[1, 4]],
      ),
    ).toBe(1.5);
  });

  it.each([0, 1, 2, 3])(
    'agrees with trying all values on 1500 random diagrams, kind %i',
    (kind) => {
      const source = seeded(77 + kind);
      const span = [6, 14, 40, 12][kind]!;
      const end = () => (kind === 3 ? source.real() * span - 5 : source.integer(0, span));
      const bar = (): Bar => {
        const [x, y] = [end(), end()];
        return x === y ? [x, x + 1] : [Math.min(x, y), Math.max(x, y)];
      };
      const some = (most: number) => Array.from({ length: source.integer(0, most) }, bar);
      for (let i = 0; i < 1500; i++) {
        const common = some(8);
        const births = Array.from({ length: source.integer(0, 6) }, end);
        const forever = (): Bar[] =>
          births.map((b) => [source.real() < 0.6 ? b : end(), Infinity] as const);
        const before = [...common, ...some(5), ...forever()];
        const after = [...common, ...some(5), ...forever()];
        expect(distance(before, after)).toBe(slowDistance(sorted(before), sorted(after)));
      }
    },
  );

  it('infinite births over long common runs are compared by range maxima alike', () => {
    const source = seeded(5);
    for (let i = 0; i < 300; i++) {
      const all = Array.from({ length: 400 }, (_, k) => 3 * k + source.integer(0, 2));
      const moved = new Set(
        Array.from({ length: source.integer(1, 6) }, () => source.integer(0, 399)),
      );
      const forever = (values: number[]): Bar[] => values.map((birth) => [birth, Infinity]);
      const after = all.map((birth, k) => (moved.has(k) ? source.integer(0, 1200) : birth));
      const [x, y] = [forever(all), forever(after)];
      expect(distance(x, y)).toBe(slowDistance(sorted(x), sorted(y)));
    }
  });
});
