import type { Prepared } from './prepared';
import { EngineInputError, type Control, type RowResults } from './types';

/**
 * Exact bottleneck distances and largest Betti-curve gaps of all pairs (p, q), q > p, of some rows.
 * @param rows arrival positions, 0..n-1
 * @throws EngineInputError for a row that does not exist; EngineLimitError; EngineStopped
 */
export function computeRows(prepared: Prepared, rows: Uint32Array, control: Control): RowResults {
  const missing = rows.find((p) => p >= prepared.nodeCount);
  if (missing !== undefined) {
    throw new EngineInputError(
      `There is no arrival position ${missing}: the network has ${prepared.nodeCount} nodes.`,
    );
  }
  try {
    return prepared.computation().rows(rows, control);
  } catch (error) {
    prepared.forget();
    throw error;
  }
}
