import { partSeconds, setUpSeconds } from './cost';
import { countNetwork, estimate } from './estimate';
import { countPairs, partnersOf } from './part';
import type { Budget, Estimate, Network, Part, Ways } from './types';

/** What is asked: a part of the pairs of a network, up to a dimension. */
export interface Wanted {
  readonly network: Network;
  /** D, 0..3. */
  readonly maxDimension: number;
  readonly part: Part;
  /** The part of overlapping intervals of the same network. */
  readonly overlapping: Part;
}

/**
 * What would fit instead of something that is over the budget. Fewer dimensions help against every
 * limit; fewer pairs against time alone, since tables do not shrink with the pairs.
 *
 * @param needed the estimate of what is wanted
 * @returns null where it fits
 */
export function waysOut(wanted: Wanted, needed: Estimate, budget: Budget): Ways | null {
  if (fits(needed, budget)) return null;
  const { network, maxDimension, part } = wanted;
  let dimension: number | null = null;
  for (let d = maxDimension - 1; d >= 0 && dimension === null; d--) {
    if (fits(estimate(network, d, budget, part), budget)) dimension = d;
  }
  if (!roomFor(needed, budget)) return { dimension, within: null, overlapping: null };
  return { dimension, ...fewerPairs(wanted, budget) };
}

const roomFor = ({ exact, bytes }: Estimate, budget: Budget): boolean =>
  exact && bytes <= budget.bytes;

const fits = (needed: Estimate, budget: Budget): boolean =>
  roomFor(needed, budget) && needed.seconds <= budget.seconds;

function fewerPairs(
  { network, maxDimension, overlapping }: Wanted,
  budget: Budget,
): Pick<Ways, 'within' | 'overlapping'> {
  const { nodeCount } = network;
  const counts = countNetwork(network, maxDimension, budget);
  const secondsOf = (part: Part): number =>
    setUpSeconds(counts) + partSeconds(counts, partnersOf(part, nodeCount));
  // More positions never cost less: the largest number that fits is found by halving.
  let [fitting, over] = [0, nodeCount];
  while (over - fitting > 1) {
    const positions = (fitting + over) >> 1;
    if (secondsOf({ kind: 'within', positions }) <= budget.seconds) fitting = positions;
    else over = positions;
  }
  const pairs = countPairs(partnersOf(overlapping, nodeCount));
  const seconds = secondsOf(overlapping);
  return {
    within: fitting > 0 && fitting < nodeCount - 1 ? fitting : null,
    overlapping: pairs > 0 && seconds <= budget.seconds ? { pairs, seconds } : null,
  };
}
