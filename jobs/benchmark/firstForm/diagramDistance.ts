import { costOf, type Diagram } from './diagram';
import { Feasibility } from './feasibility';

/**
 * Bottleneck distance of whole diagrams: bounds from the changed bars, then trial distances, first
 * the lower bound, then in doubling steps, then by bisection.
 */
export class DiagramDistance {
  private readonly feasibility = new Feasibility();

  /** @param halves whether every value of f is whole, so that all costs are multiples of 1/2 */
  constructor(private readonly halves: boolean) {}

  /**
   * @param bound difference of f between the two nodes
   * @param floor the infinite part; the larger of both is returned
   */
  of(before: Diagram, after: Diagram, bound: number, floor: number): number {
    before.sortChanged();
    after.sortChanged();
    const longest = Math.max(longestChanged(before), longestChanged(after));
    const upper = Math.min(longest, bound);
    if (upper <= floor) return floor;
    const lower = raised(after, before, raised(before, after, floor));
    if (lower >= upper || this.feasibility.test(before, after, lower)) return lower;
    return this.halves
      ? this.amongHalves(before, after, lower, upper)
      : this.amongCandidates(before, after, lower, upper);
  }

  /** `lower` is not feasible, `upper` is. */
  private amongHalves(before: Diagram, after: Diagram, lower: number, upper: number): number {
    let step = 0.5;
    let high = Math.min(lower + step, upper);
    let low = lower;
    while (high < upper && !this.feasibility.test(before, after, high)) {
      low = high;
      step *= 2;
      high = Math.min(high + step, upper);
    }
    while (high - low > 0.5) {
      const middle = low + Math.floor(high - low) / 2;
      if (this.feasibility.test(before, after, middle)) high = middle;
      else low = middle;
    }
    return high;
  }

  private amongCandidates(before: Diagram, after: Diagram, lower: number, upper: number): number {
    const costs = candidates(before, after, lower, upper);
    // The distance is one of them: the last is feasible.
    let [low, high, step] = [-1, 0, 1];
    while (high < costs.length - 1 && !this.feasibility.test(before, after, costs[high]!)) {
      low = high;
      high = Math.min(high + step, costs.length - 1);
      step *= 2;
    }
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (this.feasibility.test(before, after, costs[middle]!)) high = middle;
      else low = middle;
    }
    return costs[high]!;
  }
}

function longestChanged(side: Diagram): number {
  return side.changedCount === 0 ? 0 : side.half(side.changed[0]!);
}

/** Every changed bar goes at least to the nearest bar of the whole other side, or half its length. */
function raised(side: Diagram, other: Diagram, floor: number): number {
  let bound = floor;
  for (let j = 0; j < side.changedCount; j++) {
    const i = side.changed[j]!;
    const half = side.half(i);
    if (half <= bound) break;
    bound = Math.max(bound, nearest(side, i, other, half));
  }
  return bound;
}

/** Distance to the nearest bar of the other side, `most` if none is nearer. */
function nearest(side: Diagram, bar: number, other: Diagram, most: number): number {
  const birth = side.births[bar]!;
  const from = other.firstWithin(birth, 0);
  let least = most;
  for (let v = from; v < other.count && other.births[v]! - birth < least; v++) {
    least = Math.min(least, costOf(side, bar, other, v));
  }
  for (let v = from - 1; v >= 0 && birth - other.births[v]! < least; v--) {
    least = Math.min(least, costOf(side, bar, other, v));
  }
  return least;
}

/** All costs in (lower, upper], each once, ascending. */
function candidates(before: Diagram, after: Diagram, lower: number, upper: number): Float64Array {
  const costs = new Set<number>();
  const add = (cost: number) => {
    if (cost > lower && cost <= upper) costs.add(cost);
  };
  for (let i = 0; i < before.count; i++) {
    add(before.half(i));
    const birth = before.births[i]!;
    let v = after.firstWithin(birth, upper);
    for (; v < after.count && after.births[v]! - birth <= upper; v++) {
      add(costOf(before, i, after, v));
    }
  }
  for (let v = 0; v < after.count; v++) add(after.half(v));
  return Float64Array.from(costs).sort();
}
