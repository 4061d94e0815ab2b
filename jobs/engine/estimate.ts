import { countCliques, type CliqueCounts } from './cliques';
import { partSeconds, rowSeconds, setUpSeconds } from './cost';
import { arrivalOrder, orderGraph, validateNetwork } from './graph';
import { countPairs, partnersOf } from './part';
import type { Estimate, Limits, Network, Part } from './types';

/**
 * The time is taken to lie between seconds / margin and seconds × margin plus the start-up. Common
 * practice; cost.ts says on which graphs the margin held, measured on threads that had worked before.
 */
export const ESTIMATE_MARGIN = 5;

/**
 * Seconds that a fresh thread may lose until its code is compiled. Common practice: 0.02 to 0.6 s more
 * than on a warm thread were seen for nine graphs of 10 to 200 nodes at D = 3.
 */
export const ESTIMATE_START_UP = 1;

/**
 * Bytes of tables and stored columns per clique. Common practice: 135 to 375 on the graphs of cost.ts
 * with more than 10,000 cliques. The limit itself is held by counting.
 */
const BYTES_PER_CLIQUE = 300;
const BYTES_PER_NODE = 200;

/**
 * What the matrix of a part needs, counted before anything is listed. Cliques and bytes are those of
 * the whole matrix: the tables do not shrink with the pairs.
 *
 * @param limits counting stops once more than `limits.simplices` cliques are found
 * @throws EngineInputError as `prepare`, or for a part that names missing positions
 */
export function estimate(
  network: Network,
  maxDimension: number,
  limits: Limits,
  part: Part = { kind: 'whole' },
): Estimate {
  const counts = countNetwork(network, maxDimension, limits);
  const { nodeCount } = network;
  const base = {
    cliques: Array.from(counts.bySize),
    exact: counts.exact,
    bytes: BYTES_PER_CLIQUE * counts.total + BYTES_PER_NODE * nodeCount,
  };
  if (part.kind === 'whole') {
    const rows = rowSeconds(counts).reduce((sum, seconds) => sum + seconds, 0);
    const pairs = (nodeCount * (nodeCount - 1)) / 2;
    return { ...base, pairs, seconds: setUpSeconds(counts) + rows };
  }
  const partners = partnersOf(part, nodeCount);
  const seconds = setUpSeconds(counts) + partSeconds(counts, partners);
  return { ...base, pairs: countPairs(partners), seconds };
}

/** Cliques of up to D + 2 nodes. @throws EngineInputError as `prepare` */
export function countNetwork(network: Network, maxDimension: number, limits: Limits): CliqueCounts {
  validateNetwork(network, maxDimension);
  const graph = orderGraph(network, arrivalOrder(network.values));
  return countCliques(graph, maxDimension + 2, limits.simplices);
}
