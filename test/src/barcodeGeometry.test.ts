import { describe, expect, it } from 'vitest';
import type { PairDetail } from '#contract/runs';
import {
  MOST_MOVED,
  namedRows,
  placeBands,
  recordedBand,
  swappedBand,
} from '../../src/drawings/barcodeGeometry';
import { barWords, dimensionTitle } from '../../src/drawings/barWords';
import { bettiAt, bettiCurve, largestGap, stairs } from '../../src/drawings/bettiGeometry';
import { leewayWords, movesOf } from '../../src/components/bench/faceWords';

const steps = (value: number): string => `${value} ${value === 1 ? 'step' : 'steps'}`;

const detail: PairDetail['dimensions'][number] = {
  dimension: 1,
  distance: 7,
  bettiGap: 1,
  recorded: [
    [21, 41],
    [30, 35],
    [44, null],
  ],
  swapped: [
    [14, 41],
    [30, 35],
    [44, null],
  ],
  matching: [
    [0, 0, 7],
    [1, 1, 0],
    [2, 2, 0],
  ],
  realising: 0,
  cycles: {
    recorded: [{ bar: 0, simplices: [[3, 4]] }],
    swapped: [{ bar: 0, simplices: null }],
  },
};

describe('the words of a bar', () => {
  it.each([
    [{ birth: 21, death: 41 }, { birth: 14, death: 41 }, 'born 7 steps earlier'],
    [{ birth: 2, death: 9 }, { birth: 3, death: 11 }, 'born 1 step later, dies 2 steps later'],
    [{ birth: 2, death: Infinity }, { birth: 1, death: Infinity }, 'born 1 step earlier'],
    [{ birth: 2, death: 5 }, null, 'gone, was 3 steps long'],
    [null, { birth: 2, death: Infinity }, 'new, never dies'],
    [{ birth: 2, death: 5 }, { birth: 2, death: 5 }, 'unchanged'],
  ])('%o to %o', (recorded, swapped, words) => {
    expect(barWords(recorded, swapped, steps)).toBe(words);
  });

  it('name dimensions by number and noun', () => {
    expect([0, 1, 3].map(dimensionTitle)).toEqual(['H₀ · components', 'H₁ · loops', 'H₃']);
  });
});

describe('a barcode with a swap laid over', () => {
  it('marks only the bars that move, and the match that makes the distance', () => {
    const rows = swappedBand(detail).rows;
    expect(rows.map(({ moved, realising }) => [moved, realising])).toEqual([
      [true, true],
      [false, false],
      [false, false],
    ]);
  });

  it('says what moves, the costliest first, with an end that never comes', () => {
    const band = swappedBand({
      ...detail,
      recorded: [
        [21, 41],
        [3, 6],
        [44, null],
      ],
      swapped: [
        [14, 41],
        [45, null],
      ],
      matching: [
        [0, 0, 7],
        [1, -1, 1.5],
        [2, 1, 1],
      ],
    });
    expect(movesOf([band], steps, String).map(({ words }) => words)).toEqual([
      'A loop is born at 14 instead of 21, 7 steps earlier, and still closes at 41.',
      'A loop that lived from 3 to 6 is gone.',
      'A loop is born at 45 instead of 44, 1 step later, and still never closes.',
    ]);
  });

  it('leaves no two rows of a band on top of each other', () => {
    const { bands, height } = placeBands([
      swappedBand(detail),
      recordedBand(2, [
        [1, 2],
        [1, 3],
      ]),
    ]);
    const rows = bands.flatMap((band) => band.rows);
    rows.slice(1).forEach((row, i) => {
      const before = rows[i];
      expect(row.y - row.height / 2).toBeGreaterThanOrEqual(
        (before?.y ?? 0) + (before?.height ?? 0) / 2 - 1e-9,
      );
    });
    expect(rows.every((row) => row.y < height)).toBe(true);
  });

  it('draws the longest and the costliest of too many bars, and counts the rest', () => {
    const many = Array.from({ length: 500 }, (_, i): [number, number] => [i, i + 1 + (i % 7)]);
    const quiet = placeBands([recordedBand(1, many)]).bands[0];
    expect(quiet?.leftOut).toBe(500 - (quiet?.rows.length ?? 0));
    expect(
      Math.min(
        ...(quiet?.rows ?? []).map(
          ({ recorded }) => (recorded?.death ?? 0) - (recorded?.birth ?? 0),
        ),
      ),
    ).toBe(7);
    const moved = placeBands([
      swappedBand({
        ...detail,
        recorded: many,
        swapped: many.map(([birth, death]): [number, number] => [birth + 0.25, death]),
        matching: many.map((_, i): [number, number, number] => [i, i, i]),
        realising: 499,
      }),
    ]).bands[0];
    expect([moved?.rows.length, moved?.movedLeftOut]).toEqual([MOST_MOVED, 500 - MOST_MOVED]);
    expect([...namedRows(moved?.rows ?? [])].map((row) => row.cost)).toEqual([499]);
  });
});

describe('Betti curves', () => {
  const before = bettiCurve([
    [1, 4],
    [2, 4],
    [3, null],
  ]);
  const after = bettiCurve([
    [1, 4],
    [4, null],
  ]);

  it('count the bars alive, birth included and death not', () => {
    expect([0, 1, 2, 3, 4, 9].map((time) => bettiAt(before, time))).toEqual([0, 1, 2, 3, 1, 1]);
  });

  it('have their largest gap where it is first reached', () => {
    expect(largestGap(before, after)).toEqual({ gap: 2, at: 3 });
    expect(largestGap(before, before).gap).toBe(0);
  });

  it('are drawn as stairs from end to end', () => {
    expect(
      stairs(
        before,
        (time) => 10 * time,
        (count) => 50 - count,
        [0, 100],
      ),
    ).toBe('M0 50H10V49H20V48H30V47H40V49H100');
  });
});

describe('leeway in words', () => {
  it('says that it may be more while pairs are missing', () => {
    expect(leewayWords({ earlier: 2, later: 0, open: false })).toBe('2 earlier · 0 later');
    expect(leewayWords({ earlier: 2, later: 0, open: true })).toBe('at least 2 earlier · 0 later');
  });
});
