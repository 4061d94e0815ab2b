import { decodeArrays, encodeArrays } from './typedArrays';

/** Results of P pairs in dimensions 0..D: dimension k of pair i at [k P + i]. */
export interface StoredResult {
  /** Bottleneck distances in the unit of the run's scale. */
  readonly distances: Float64Array;
  /** Largest differences of the Betti curves (bars). */
  readonly bettiGaps: Int32Array;
}

export const encodeBlockResult = (result: StoredResult): Uint8Array<ArrayBuffer> =>
  encodeArrays([result.distances, result.bettiGaps]);

/** @throws RangeError if the bytes are not the result of a block. */
export function decodeBlockResult(stored: Uint8Array): StoredResult {
  const [distances, bettiGaps, ...others] = decodeArrays(stored);
  if (
    !(distances instanceof Float64Array) ||
    !(bettiGaps instanceof Int32Array) ||
    others.length > 0
  ) {
    throw new RangeError('Stored arrays: the result of a block was expected.');
  }
  return { distances, bettiGaps };
}
