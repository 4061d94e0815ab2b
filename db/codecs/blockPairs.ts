import { decodeArrays, decodeUint32, encodeArrays } from './typedArrays';

/** Which pairs a block holds: whole rows, or some later partners of each row. */
export interface BlockPairs {
  /** Arrival positions p. */
  readonly rows: Uint32Array;
  /** Null: every pair (p, q), q > p. Else those of row i at starts[i] .. starts[i + 1] - 1. */
  readonly choice: { readonly starts: Uint32Array; readonly partners: Uint32Array } | null;
}

/** As in run_blocks.partners; null for whole rows. */
export const encodePartners = ({ choice }: BlockPairs): Uint8Array | null =>
  choice === null ? null : encodeArrays([choice.starts, choice.partners]);

/**
 * @param stored the columns rows and partners of a block
 * @throws RangeError if the bytes are not those of a block
 */
export function decodeBlockPairs(stored: {
  readonly rows: Uint8Array;
  readonly partners: Uint8Array | null;
}): BlockPairs {
  const rows = decodeUint32(stored.rows);
  if (stored.partners === null) return { rows, choice: null };
  const [starts, partners, ...others] = decodeArrays(stored.partners);
  if (
    !(starts instanceof Uint32Array) ||
    !(partners instanceof Uint32Array) ||
    others.length > 0 ||
    starts.length !== rows.length + 1 ||
    starts.at(-1) !== partners.length
  ) {
    throw new RangeError('Stored arrays: the partners of the rows of a block were expected.');
  }
  return { rows, choice: { starts, partners } };
}
