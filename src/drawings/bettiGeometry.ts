import type { WireBars } from '#contract/runs';

/** A Betti curve: `counts[i]` bars are alive from `times[i]` (inclusive) to `times[i + 1]`. */
export interface BettiCurve {
  /** Ascending, distinct, in the unit of the scale. */
  readonly times: readonly number[];
  readonly counts: readonly number[];
}

/** Number of bars alive at each time. O(bars log bars). */
export function bettiCurve(bars: WireBars): BettiCurve {
  const change = new Map<number, number>();
  const add = (time: number, by: number): void => {
    change.set(time, (change.get(time) ?? 0) + by);
  };
  for (const [birth, death] of bars) {
    add(birth, 1);
    if (death !== null) add(death, -1);
  }
  const times: number[] = [];
  const counts: number[] = [];
  let alive = 0;
  for (const [time, by] of [...change].sort((a, b) => a[0] - b[0])) {
    if (by === 0) continue;
    alive += by;
    times.push(time);
    counts.push(alive);
  }
  return { times, counts };
}

/** Bars alive at a time. */
export function bettiAt(curve: BettiCurve, time: number): number {
  let alive = 0;
  for (let i = 0; i < curve.times.length && (curve.times[i] ?? 0) <= time; i += 1) {
    alive = curve.counts[i] ?? 0;
  }
  return alive;
}

export interface BettiGap {
  /** Largest difference, in bars. */
  readonly gap: number;
  /** The first time at which it is reached. */
  readonly at: number;
}

/** Largest absolute difference of two curves and where it is first reached. */
export function largestGap(recorded: BettiCurve, swapped: BettiCurve): BettiGap {
  const times = [...new Set([...recorded.times, ...swapped.times])].sort((a, b) => a - b);
  let gap = 0;
  let at = times[0] ?? 0;
  for (const time of times) {
    const here = Math.abs(bettiAt(recorded, time) - bettiAt(swapped, time));
    if (here > gap) {
      gap = here;
      at = time;
    }
  }
  return { gap, at };
}

/**
 * SVG path of a curve as stairs.
 * @param x pixel of a time; @param y pixel of a count; @param from,to ends of the axis in pixels.
 * @param closed joins it to the ground line, for an area.
 */
export function stairs(
  curve: BettiCurve,
  x: (time: number) => number,
  y: (count: number) => number,
  [from, to]: readonly [number, number],
  closed = false,
): string {
  let path = `M${from} ${y(0)}`;
  curve.times.forEach((time, i) => {
    path += `H${x(time)}V${y(curve.counts[i] ?? 0)}`;
  });
  return `${path}H${to}${closed ? `V${y(0)}Z` : ''}`;
}
