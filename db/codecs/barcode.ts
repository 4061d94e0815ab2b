import { decodeArrays, encodeArrays } from './typedArrays';

/** The bars of one dimension; a death of Infinity never comes. */
export interface StoredBars {
  readonly births: Float64Array;
  readonly deaths: Float64Array;
}

/** Stored as births and deaths of dimension 0, then of dimension 1, … */
export function encodeBarcode(barcode: readonly StoredBars[]): Uint8Array<ArrayBuffer> {
  return encodeArrays(barcode.flatMap(({ births, deaths }) => [births, deaths]));
}

/** @throws RangeError if the bytes are not a barcode. */
export function decodeBarcode(stored: Uint8Array): StoredBars[] {
  const arrays = decodeArrays(stored);
  const bars: StoredBars[] = [];
  for (let k = 0; k < arrays.length; k += 2) {
    const births = arrays[k];
    const deaths = arrays[k + 1];
    if (!(births instanceof Float64Array) || !(deaths instanceof Float64Array)) {
      throw new RangeError('Stored arrays: births and deaths were expected.');
    }
    bars.push({ births, deaths });
  }
  return bars;
}
