import { bisectLeft, scaleLinear, scaleUtc } from 'd3';
import type { ImportGrowth } from '#contract/imports';

/** Where things of a growth are drawn, in pixels. */
export interface GrowthGeometry {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  /** Line on which the nodes stand. */
  readonly base: number;
  /** Top of the curve of edges. */
  readonly top: number;
  /** By arrival. */
  readonly x: Float64Array;
  /** Path of the number of edges that are there, rising from `base` to `top`. */
  readonly curve: string;
  /** Windows of the nodes that have one. */
  readonly windows: readonly WindowBar[];
  /** Round values of the axis; their words are in the middle of `wordsX`. */
  readonly ticks: readonly AxisTick[];
  /** Foot of the words of the ticks. */
  readonly words: number;
  /** Half-ellipses of single edges below the line; empty where there are too many. */
  readonly arcs: readonly string[];
  /** Betti curves below that, by dimension. */
  readonly betti: readonly BettiBand[];
}

export interface AxisTick {
  readonly x: number;
  readonly value: number;
  readonly wordsX: number;
}

/** A window on the axis; bars in one lane do not touch, but for those in the last. */
export interface WindowBar {
  readonly from: number;
  readonly to: number;
  readonly y: number;
}

/** One Betti curve in a band of its own. */
export interface BettiBand {
  readonly dimension: number;
  /** Bottom of the band. */
  readonly base: number;
  readonly path: string;
  /** Largest value, drawn as the height of the band. */
  readonly most: number;
}

/** Steps [entry, value from there on] by dimension. */
export type BettiSteps = readonly (readonly (readonly [number, number])[])[];

const CURVE = 120;
const ARCS = 90;
const BETTI = { heading: 18, curve: 34, gap: 8 } as const;
const MARGIN = { left: 12, right: 12, top: 24, below: 12, words: 14, arcs: 8, bottom: 8 } as const;
const LANES = { most: 8, step: 4 } as const;
/** Pixels that the words of a tick need. */
const TICK = { number: 60, days: 84, seconds: 132 } as const;
/** Milliseconds of one unit, where entries are times. */
const UNIT = { days: 86_400_000, seconds: 1_000 } as const;
/** Past so many arcs nothing can be told apart. */
const MOST_ARCS = 3_000;

/**
 * Nodes stand at their entries on a time axis; above it the number of edges that are there, below it
 * the edges as arcs, so that a wrong column shows as a heap or as a straight line.
 */
export function growthGeometry(
  growth: ImportGrowth,
  width: number,
  steps: BettiSteps = [],
): GrowthGeometry {
  const { entries, earliest, latest, edgesBy, edges } = growth;
  const left = MARGIN.left;
  const right = Math.max(left + 1, width - MARGIN.right);
  const top = MARGIN.top;
  const base = top + CURVE;
  const from = Math.min(...ends(entries, earliest));
  const to = Math.max(...ends(entries, latest));
  const span = to > from ? to - from : 1;
  const place = (value: number): number =>
    to > from ? left + ((value - from) / span) * (right - left) : (left + right) / 2;
  const x = Float64Array.from(entries, place);
  const windows = lanesOf(growth, place, base + MARGIN.below);
  const words = Math.max(base, ...windows.map(({ y }) => y)) + MARGIN.below + MARGIN.words;
  const shownArcs = edges !== null && edges.length <= MOST_ARCS ? edges : [];
  const line = words + MARGIN.arcs;
  const below = line + (shownArcs.length > 0 ? ARCS + MARGIN.arcs : 0);
  return {
    width,
    height: below + steps.length * BAND + MARGIN.bottom,
    betti: steps.map((curve, dimension) =>
      bandOf(curve, dimension, below + dimension * BAND, { place, right }),
    ),
    ...{ left, right, base, top, x, windows, words },
    ticks: ticksOf(growth, [from, to], { place, left, right }),
    curve: curveOf(x, edgesBy, { base, top, right }),
    arcs: shownArcs.map(([a, b]) => arcOf(x[a] ?? 0, x[b] ?? 0, line, right - left)),
  };
}

/** The arrival whose node stands nearest to a pixel of the axis. @param x pixels, rising */
export function arrivalNear(x: Float64Array, pixel: number): number {
  const after = bisectLeft(x, pixel);
  const [left, right] = [x[after - 1] ?? -Infinity, x[after] ?? Infinity];
  return pixel - left < right - pixel ? after - 1 : Math.min(after, x.length - 1);
}

/** Value of a Betti curve at an entry, after all that arrives at it. */
export function stepAt(steps: readonly (readonly [number, number])[], entry: number): number {
  return steps.findLast(([from]) => from <= entry)?.[1] ?? 0;
}

interface Axis {
  readonly place: (value: number) => number;
  readonly left: number;
  readonly right: number;
}

/** Round values from one end of the axis to the other, none so near the last that words would touch. */
function ticksOf(
  { entryUnit: unit, entries }: ImportGrowth,
  [from, to]: readonly [number, number],
  { place, left, right }: Axis,
): AxisTick[] {
  const room = TICK[unit];
  const ticks: AxisTick[] = [];
  // Between whole numbers and whole days nothing arrives.
  const whole = entries.every(Number.isInteger);
  for (const value of roundValues(unit, from, to, Math.max(1, (right - left) / room / 1.5))) {
    if (whole && !Number.isInteger(value)) continue;
    const x = place(value);
    const wordsX = Math.min(Math.max(x, left + room / 2), right - room / 2);
    if (wordsX - (ticks.at(-1)?.wordsX ?? -Infinity) >= room) ticks.push({ x, value, wordsX });
  }
  return ticks;
}

/** Of numbers, or of hours, days, weeks, months and years. */
function roundValues(unit: ImportGrowth['entryUnit'], from: number, to: number, about: number) {
  if (from === to) return [from];
  if (unit === 'number') return scaleLinear([from, to], [0, 1]).ticks(about);
  const length = UNIT[unit];
  const times = scaleUtc([from * length, to * length], [0, 1]).ticks(about);
  return times.map((time) => time.getTime() / length);
}

/** Windows from the earliest beginning on, each in the first lane with room. */
function lanesOf(
  { entries, earliest, latest }: ImportGrowth,
  place: (value: number) => number,
  top: number,
): WindowBar[] {
  const spans = entries.flatMap((entry, i) => {
    const [a, b] = [earliest[i] ?? null, latest[i] ?? null];
    return a === null && b === null ? [] : [[place(a ?? entry), place(b ?? entry)] as const];
  });
  const ends: number[] = [];
  return spans
    .sort((one, other) => one[0] - other[0])
    .map(([from, to]) => {
      const free = ends.findIndex((end) => end + 1 < from);
      const lane = free >= 0 ? free : Math.min(ends.length, LANES.most - 1);
      ends[lane] = Math.max(ends[lane] ?? to, to);
      return { from, to, y: top + lane * LANES.step };
    });
}

const BAND = BETTI.heading + BETTI.curve + BETTI.gap;

function bandOf(
  steps: readonly (readonly [number, number])[],
  dimension: number,
  top: number,
  { place, right }: { place: (value: number) => number; right: number },
): BettiBand {
  const base = top + BETTI.heading + BETTI.curve;
  const most = Math.max(0, ...steps.map(([, value]) => value));
  const y = (value: number): number => base - (value / Math.max(1, most)) * BETTI.curve;
  let path = `M${place(steps[0]?.[0] ?? 0)} ${base}`;
  for (const [entry, value] of steps) path += `H${place(entry)}V${y(value)}`;
  return { dimension, base, most, path: steps.length > 0 ? `${path}H${right}` : '' };
}

/** First and last value of the axis, windows included. */
function ends(entries: readonly number[], windows: readonly (number | null)[]): number[] {
  const limits = [entries[0] ?? 0, entries.at(-1) ?? 0];
  for (const value of windows) {
    if (value === null) continue;
    limits[0] = Math.min(limits[0] ?? value, value);
    limits[1] = Math.max(limits[1] ?? value, value);
  }
  return limits;
}

function curveOf(
  x: Float64Array,
  edgesBy: readonly number[],
  { base, top, right }: { base: number; top: number; right: number },
): string {
  const most = Math.max(1, edgesBy.at(-1) ?? 0);
  const y = (count: number): number => base - (count / most) * (base - top);
  let path = `M${x[0] ?? 0} ${base}`;
  edgesBy.forEach((count, i) => (path += `H${x[i] ?? 0}V${y(count)}`));
  return `${path}H${right}`;
}

function arcOf(from: number, to: number, line: number, span: number): string {
  const radius = Math.max(0.5, Math.abs(to - from) / 2);
  const depth = Math.max(2, (ARCS * Math.abs(to - from)) / span);
  return `M${from} ${line}A${radius} ${depth} 0 0 0 ${to} ${line}`;
}
