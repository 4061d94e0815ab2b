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
  /** Windows as [from, to] on the axis, of the nodes that have one. */
  readonly windows: readonly (readonly [number, number])[];
  /** Half-ellipses of single edges below the line; empty where there are too many. */
  readonly arcs: readonly string[];
  /** Betti curves below that, by dimension. */
  readonly betti: readonly BettiBand[];
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
const MARGIN = { left: 12, right: 12, top: 24, between: 26, bottom: 8 } as const;
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
  const shownArcs = edges !== null && edges.length <= MOST_ARCS ? edges : [];
  const below = base + MARGIN.between + (shownArcs.length > 0 ? ARCS : 0);
  return {
    width,
    height: below + steps.length * BAND + MARGIN.bottom,
    betti: steps.map((curve, dimension) =>
      bandOf(curve, dimension, below + dimension * BAND, { place, right }),
    ),
    ...{ left, right, base, top, x },
    curve: curveOf(x, edgesBy, { base, top, right }),
    windows: entries.flatMap((entry, i) => {
      const [a, b] = [earliest[i] ?? null, latest[i] ?? null];
      if (a === null && b === null) return [];
      return [[place(a ?? entry), place(b ?? entry)] as const];
    }),
    arcs: shownArcs.map(([a, b]) =>
      arcOf(x[a] ?? 0, x[b] ?? 0, base + MARGIN.between, right - left),
    ),
  };
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
