import { missingPosition, validateChoice } from './choice';
import type { MatrixComputation } from './fast/compute';
import type { Prepared } from './prepared';
import type { Control, PairChoice, PairResults, RowResults } from './types';

/**
 * Exact bottleneck distances and largest Betti-curve gaps of all pairs (p, q), q > p, of some rows.
 * @param rows arrival positions, 0..n-1
 * @throws EngineInputError for a row that does not exist; EngineLimitError; EngineStopped
 */
export function computeRows(prepared: Prepared, rows: Uint32Array, control: Control): RowResults {
  const { nodeCount } = prepared;
  const missing = rows.find((p) => p >= nodeCount);
  if (missing !== undefined) throw missingPosition(missing, nodeCount);
  return computed(prepared, (computation) => computation.rows(rows, control));
}

/**
 * The same for chosen pairs only: each has the values it has in the whole matrix. A row costs its
 * set-up once however many partners it has, and nothing is done after the last of them.
 *
 * @throws EngineInputError for a choice that is not in order; EngineLimitError; EngineStopped
 */
export function computePairs(
  prepared: Prepared,
  choice: PairChoice,
  control: Control,
): PairResults {
  validateChoice(choice, prepared.nodeCount);
  return computed(prepared, (computation) => computation.pairs(choice, control));
}

function computed<T>(prepared: Prepared, compute: (computation: MatrixComputation) => T): T {
  try {
    return compute(prepared.computation());
  } catch (error) {
    prepared.forget();
    throw error;
  }
}
