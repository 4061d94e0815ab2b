import { interpolateBasis, lab, rgb } from 'd3';

/** Colours of the ramp, three bytes each; entry t of `RAMP_SIZE - 1`. */
export const RAMP_SIZE = 256;

type Stop = readonly [a: number, b: number];

/** CIELAB lightness runs in a straight line, so that equal steps of change look equal. */
interface Course {
  readonly from: number;
  readonly to: number;
  /** Chroma coordinates a, b at even distances. */
  readonly stops: readonly Stop[];
}

/** Weld, madder, deep wine: darker is more. */
const LIGHT: Course = {
  from: 80,
  to: 15,
  stops: [
    [7, 54],
    [24, 52],
    [44, 38],
    [44, 18],
    [30, 3],
  ],
};

/** Dim bronze to rose: lighter is more. */
const DARK: Course = {
  from: 36,
  to: 82,
  stops: [
    [5, 27],
    [17, 36],
    [36, 36],
    [40, 18],
    [29, 4],
  ],
};

/** The ramp of change for a theme: `RAMP_SIZE` times red, green, blue. Zero is not on it. */
export function changeRamp(dark: boolean): Uint8ClampedArray {
  const { from, to, stops } = dark ? DARK : LIGHT;
  const a = interpolateBasis(stops.map((stop) => stop[0]));
  const b = interpolateBasis(stops.map((stop) => stop[1]));
  const bytes = new Uint8ClampedArray(3 * RAMP_SIZE);
  for (let i = 0; i < RAMP_SIZE; i += 1) {
    const t = i / (RAMP_SIZE - 1);
    const colour = rgb(lab(from + (to - from) * t, a(t), b(t)));
    bytes.set([Math.round(colour.r), Math.round(colour.g), Math.round(colour.b)], 3 * i);
  }
  return bytes;
}

/** @returns the entry of the ramp for a share in (0, 1]; anything above zero is on the ramp. */
export const rampEntry = (share: number): number =>
  Math.max(0, Math.min(RAMP_SIZE - 1, Math.round(share * (RAMP_SIZE - 1))));

export const rampColour = (ramp: Uint8ClampedArray, entry: number): string =>
  `rgb(${ramp[3 * entry] ?? 0} ${ramp[3 * entry + 1] ?? 0} ${ramp[3 * entry + 2] ?? 0})`;

/** Hue of a homology dimension 0..3, as red, green, blue; its number stands beside it everywhere. */
const DIMENSIONS = {
  light: ['#7a7568', '#2b5a8a', '#b9820f', '#a8323e'],
  dark: ['#8b93a1', '#86b7e6', '#e8be5c', '#f0828b'],
} as const;

export function dimensionColour(dimension: number, dark: boolean): string {
  return DIMENSIONS[dark ? 'dark' : 'light'][dimension] ?? '#808080';
}
