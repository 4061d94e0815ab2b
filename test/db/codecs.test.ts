import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { decodeBarcode, encodeBarcode } from '../../db/codecs/barcode';
import { decodeBlockResult, encodeBlockResult } from '../../db/codecs/blockResult';
import {
  decodeArrays,
  decodeUint32,
  encodeArrays,
  encodeUint32,
} from '../../db/codecs/typedArrays';

const doubles = fc.float64Array({ maxLength: 20 });
const gaps = fc.int32Array({ maxLength: 20 });
const rows = fc.uint32Array({ maxLength: 20 });

describe('stored typed arrays', () => {
  test('come back as they were, wherever the driver put their bytes', () => {
    fc.assert(
      fc.property(fc.array(fc.oneof(doubles, gaps, rows)), fc.nat(7), (arrays, shift) => {
        const bytes = encodeArrays(arrays);
        const shifted = new Uint8Array(bytes.length + shift);
        shifted.set(bytes, shift);
        expect(decodeArrays(shifted.subarray(shift))).toEqual(arrays);
      }),
    );
  });

  test('keep barcodes with bars that never die, and results of blocks', () => {
    const bars = { births: Float64Array.of(-1.5, 0), deaths: Float64Array.of(2 ** 53, Infinity) };
    expect(decodeBarcode(encodeBarcode([bars, bars]))).toEqual([bars, bars]);
    const result = { distances: Float64Array.of(0.5, 0), bettiGaps: Int32Array.of(-3, 9) };
    expect(decodeBlockResult(encodeBlockResult(result))).toEqual(result);
  });

  test('that are cut short, of another kind or of another layout are refused', () => {
    const bytes = encodeUint32(Uint32Array.of(1, 2, 3));
    expect(() => decodeArrays(bytes.subarray(0, bytes.length - 8))).toThrow(RangeError);
    expect(() => decodeArrays(new Uint8Array(16))).toThrow(RangeError);
    expect(() => decodeUint32(encodeArrays([Float64Array.of(1)]))).toThrow(RangeError);
    expect(() => decodeBlockResult(bytes)).toThrow(RangeError);
    expect(() => decodeBarcode(bytes)).toThrow(RangeError);
  });
});
