import type { Bars } from './types';

/**
 * The Betti curve: `counts[k]` bars are alive from `times[k]` up to `times[k + 1]`, none before
 * `times[0]`. Times ascend strictly, in the unit of f.
 */
export interface BettiCurve {
  readonly times: Float64Array;
  readonly counts: Int32Array;
}

/** Number of bars alive at every time at which it may change, O(b log b). */
export function bettiCurve(bars: Bars): BettiCurve {
  const births = Float64Array.from(bars.births).sort();
  const deaths = bars.deaths.filter(Number.isFinite).sort();
  const [times, counts]: [number[], number[]] = [[], []];
  let [born, died] = [0, 0];
  while (born < births.length || died < deaths.length) {
    const time = Math.min(births[born] ?? Infinity, deaths[died] ?? Infinity);
    while (births[born] === time) born++;
    while (deaths[died] === time) died++;
    times.push(time);
    counts.push(born - died);
  }
  return { times: Float64Array.from(times), counts: Int32Array.from(counts) };
}

/** g: the largest absolute difference of the two Betti curves, in bars. */
export function bettiGap(before: Bars, after: Bars): number {
  const [left, right] = [bettiCurve(before), bettiCurve(after)];
  let [x, y, gap] = [0, 0, 0];
  while (x < left.times.length || y < right.times.length) {
    const time = Math.min(left.times[x] ?? Infinity, right.times[y] ?? Infinity);
    if (left.times[x] === time) x++;
    if (right.times[y] === time) y++;
    const difference = (left.counts[x - 1] ?? 0) - (right.counts[y - 1] ?? 0);
    gap = Math.max(gap, Math.abs(difference));
  }
  return gap;
}
