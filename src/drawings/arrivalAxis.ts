import { firstPositionAt } from '../graphs/filtration';

/** The horizontal axis that everything with an arrival order shares. Pixels are CSS pixels. */
export interface ArrivalAxis {
  readonly nodeCount: number;
  readonly width: number;
  readonly left: number;
  readonly right: number;
  /** First and last arrival position shown, fractional; half a step beyond the nodes at the ends. */
  readonly from: number;
  readonly to: number;
  /** Pixels between two arrivals. */
  readonly step: number;
}

/** Part of the axis that is shown, in arrival positions; null for all of it. */
export type AxisWindow = readonly [from: number, to: number] | null;

const MARGIN = 16;
/** Fewest arrivals a window may show. */
const FEWEST = 4;

export function arrivalAxis(nodeCount: number, width: number, window: AxisWindow): ArrivalAxis {
  const [from, to] = clampWindow(nodeCount, window) ?? [-0.5, nodeCount - 0.5];
  const left = MARGIN;
  const right = Math.max(left + 1, width - MARGIN);
  return { nodeCount, width, left, right, from, to, step: (right - left) / (to - from) };
}

/** Keeps a window inside the axis and at least four arrivals wide; null if it shows everything. */
export function clampWindow(nodeCount: number, window: AxisWindow): AxisWindow {
  if (window === null) return null;
  const span = Math.max(Math.min(FEWEST, nodeCount), window[1] - window[0]);
  if (span >= nodeCount) return null;
  const from = Math.min(Math.max(-0.5, window[0]), nodeCount - 0.5 - span);
  return [from, from + span];
}

/** x of an arrival position, fractional positions included. */
export const xAt = (axis: ArrivalAxis, position: number): number =>
  axis.left + (position - axis.from) * axis.step;

/** Fractional arrival position at x; the inverse of `xAt`. */
export const positionAt = (axis: ArrivalAxis, x: number): number =>
  axis.from + (x - axis.left) / axis.step;

/**
 * x of a filtration value: the first node that has it. Infinity, or a value above all, stands half a
 * step after the last arrival.
 */
export function xOfValue(axis: ArrivalAxis, values: Float64Array, value: number): number {
  const position = firstPositionAt(values, value);
  return xAt(axis, position >= values.length ? values.length - 0.5 : position);
}

/**
 * Fractional position at which a recorded entry would stand: between two arrivals in proportion, half
 * a step outside at the ends. @param entries recorded entries by arrival position, ascending.
 */
export function positionOfEntry(entries: Float64Array, entry: number): number {
  const after = firstPositionAt(entries, entry);
  if (after >= entries.length) return entries.length - 0.5;
  const high = entries[after] ?? 0;
  if (high === entry) return after;
  if (after === 0) return -0.5;
  const low = entries[after - 1] ?? 0;
  return after - 1 + (entry - low) / (high - low);
}

/** Arrival positions whose tick is inside the window. */
export function visiblePositions(axis: ArrivalAxis): {
  readonly first: number;
  readonly last: number;
} {
  return {
    first: Math.max(0, Math.ceil(axis.from)),
    last: Math.min(axis.nodeCount - 1, Math.floor(axis.to)),
  };
}
