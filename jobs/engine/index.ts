/** The engine's door: everything that the rest of the house may use. */

/** Names a result together with its parameters; raised whenever a value could change. */
export const ENGINE_VERSION = '1.0.0';

export { arrivalOrder } from './graph';
export { ESTIMATE_MARGIN, ESTIMATE_START_UP, estimate } from './estimate';
export { countPairs, partnersOf, remainderOf, type Partners } from './part';
export { planBlocks, planPairs, type Block } from './plan';
export {
  adoptPrepared,
  prepare,
  preparedData,
  recordedBarcode,
  type Prepared,
  type PreparedData,
} from './prepared';
export { computePairs, computeRows } from './rows';
export { similarity } from './similarity';
export { swapDetail } from './swapDetail';
export { waysOut } from './ways';
