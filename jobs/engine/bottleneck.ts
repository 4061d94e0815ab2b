import type { BarMatch, Bars } from './types';
import { FiniteMatching } from './finiteMatching';

/** An optimal matching of two barcodes of one dimension. */
export interface Matching {
  /** The bottleneck distance, in the unit of f; Infinity if the numbers of infinite bars differ. */
  readonly distance: number;
  /** Every bar of both sides once; indices into the bars given. Empty if the distance is Infinity. */
  readonly matches: readonly BarMatch[];
}

/**
 * The exact bottleneck distance of two barcodes of one dimension: L-infinity between bars,
 * (death - birth) / 2 to the diagonal, infinite bars only with infinite bars, in the order of their
 * births (Edelsbrunner, Harer, Computational Topology 2010, ch. VIII.2). Each difference is one
 * subtraction of the doubles given.
 */
export function bottleneckDistance(before: Bars, after: Bars): number {
  return optimalMatching(before, after).distance;
}

/**
 * An optimal bottleneck matching. Equal bars are matched with themselves unless that would cost
 * more than the distance.
 */
export function optimalMatching(before: Bars, after: Bars): Matching {
  const left = split(before);
  const right = split(after);
  if (left.infinite.length !== right.infinite.length) return { distance: Infinity, matches: [] };
  const matches: BarMatch[] = [];
  let distance = 0;
  left.infinite.forEach((recorded, k) => {
    const swapped = right.infinite[k]!;
    const cost = Math.abs(before.births[recorded]! - after.births[swapped]!);
    distance = Math.max(distance, cost);
    matches.push({ recorded, swapped, cost });
  });
  const finite = new FiniteMatching(
    pick(before, left.finite),
    pick(after, right.finite),
    distance,
  ).solve();
  for (const match of finite.matches) {
    matches.push({
      recorded: left.finite[match.recorded] ?? -1,
      swapped: right.finite[match.swapped] ?? -1,
      cost: match.cost,
    });
  }
  return { distance: Math.max(distance, finite.distance), matches };
}

/** Indices of the infinite bars by birth, and of the finite ones in order. */
function split(bars: Bars): { infinite: number[]; finite: number[] } {
  const [infinite, finite]: [number[], number[]] = [[], []];
  bars.deaths.forEach((death, k) => (death === Infinity ? infinite : finite).push(k));
  infinite.sort((x, y) => bars.births[x]! - bars.births[y]! || x - y);
  return { infinite, finite };
}

function pick(bars: Bars, indices: readonly number[]): Bars {
  return {
    births: Float64Array.from(indices, (k) => bars.births[k]!),
    deaths: Float64Array.from(indices, (k) => bars.deaths[k]!),
  };
}
