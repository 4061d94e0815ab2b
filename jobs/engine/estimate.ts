import { countCliques } from './cliques';
import { rowSeconds, setUpSeconds } from './cost';
import { arrivalOrder, orderGraph, validateNetwork } from './graph';
import type { Estimate, Limits, Network } from './types';

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

/** Bytes of tables and stored columns per clique. Common practice: fitted to measured peaks. */
const BYTES_PER_CLIQUE = 220;
const BYTES_PER_NODE = 200;

/**
 * What the whole matrix of a network needs, counted before anything is listed.
 * @param limits counting stops once more than `limits.simplices` cliques are found
 * @throws EngineInputError as `prepare`
 */
export function estimate(network: Network, maxDimension: number, limits: Limits): Estimate {
  validateNetwork(network, maxDimension);
  const { nodeCount } = network;
  const graph = orderGraph(network, arrivalOrder(network.values));
  const counts = countCliques(graph, maxDimension + 2, limits.simplices);
  const rows = rowSeconds(counts);
  return {
    cliques: Array.from(counts.bySize),
    exact: counts.exact,
    pairs: (nodeCount * (nodeCount - 1)) / 2,
    bytes: BYTES_PER_CLIQUE * counts.total + BYTES_PER_NODE * nodeCount,
    seconds: rows.reduce((sum, seconds) => sum + seconds, setUpSeconds(counts)),
  };
}
