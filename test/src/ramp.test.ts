import { lab, rgb } from 'd3';
import { describe, expect, it } from 'vitest';
import { paintCells, OPEN, WOVEN } from '../../src/drawings/cellColours';
import { changeRamp, RAMP_SIZE, rampEntry } from '../../src/drawings/ramp';

const THEMES = [
  ['light', false],
  ['dark', true],
] as const;

/** Linear RGB as two kinds of dichromats see it: Machado, Oliveira, Fernandes, IEEE TVCG 15 (2009) 1291-1298, severity 1; the figures from memory. */
const DICHROMATS = {
  protan: [
    0.152286, 1.052583, -0.204868, 0.114503, 0.786281, 0.099216, -0.003882, -0.048116, 1.051998,
  ],
  deutan: [
    0.367322, 0.860646, -0.227968, 0.280085, 0.672501, 0.047413, -0.01182, 0.04294, 0.968881,
  ],
} as const;

const linear = (byte: number): number => {
  const s = byte / 255;
  return s <= 0.04045 ? s / 12.92 : ((s + 0.055) / 1.055) ** 2.4;
};
const byte = (value: number): number => {
  const s = Math.min(1, Math.max(0, value));
  return 255 * (s <= 0.0031308 ? 12.92 * s : 1.055 * s ** (1 / 2.4) - 0.055);
};

function lightness(ramp: Uint8ClampedArray, see: readonly number[] | null): number[] {
  return Array.from({ length: RAMP_SIZE }, (_, i) => {
    const colour = [ramp[3 * i] ?? 0, ramp[3 * i + 1] ?? 0, ramp[3 * i + 2] ?? 0];
    const seen = see
      ? [0, 3, 6].map((row) =>
          byte(colour.reduce((sum, c, k) => sum + (see[row + k] ?? 0) * linear(c), 0)),
        )
      : colour;
    return lab(rgb(seen[0] ?? 0, seen[1] ?? 0, seen[2] ?? 0)).l;
  });
}

describe.each(THEMES)('the ramp of change, %s', (_, dark) => {
  const ramp = changeRamp(dark);

  it('changes its lightness in even steps', () => {
    const all = lightness(ramp, null);
    const total = (all.at(-1) ?? 0) - (all[0] ?? 0);
    for (let i = 0; i < 16; i += 1) {
      const step =
        (all[Math.round(((i + 1) * 255) / 16)] ?? 0) - (all[Math.round((i * 255) / 16)] ?? 0);
      expect(Math.abs(step - total / 16)).toBeLessThan(1.2);
    }
  });

  it.each(Object.entries(DICHROMATS))(
    'keeps the direction of its lightness for %s eyes',
    (__, see) => {
      const all = lightness(ramp, see);
      const direction = Math.sign((all.at(-1) ?? 0) - (all[0] ?? 0));
      for (let i = 16; i < RAMP_SIZE; i += 16) {
        expect(direction * ((all[i] ?? 0) - (all[i - 16] ?? 0))).toBeGreaterThan(0.5);
      }
    },
  );
});

describe('cells', () => {
  it('put zero and not yet apart from the least change', () => {
    const values = Float64Array.of(NaN, 0, 1e-9, 0.5, 1);
    const field = { measure: 'change' as const, dimensions: [1], values, ceiling: 1 };
    expect([...paintCells(field, false).classes]).toEqual([
      OPEN,
      WOVEN,
      1,
      1 + rampEntry(0.5),
      RAMP_SIZE,
    ]);
  });

  it('of the dimension that moves most have a colour of their own each', () => {
    const values = Float64Array.of(0, 1, 2, 3, 4);
    const paint = paintCells(
      { measure: 'moves', dimensions: [0, 1, 2, 3], values, ceiling: 4 },
      true,
    );
    expect([...paint.classes]).toEqual([WOVEN, 1, 2, 3, 4]);
    expect(new Set(paint.colours).size).toBe(4);
  });
});
