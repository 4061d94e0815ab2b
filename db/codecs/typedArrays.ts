/**
 * Typed arrays in one bytea column, little endian, read and written only here.
 *
 *   u8 magic 0x48 ("H") · u8 layout version 1 · u16 number of arrays · u32 zero
 *   per array: u8 type (1 u32, 2 i32, 3 f64) · u8[3] zero · u32 length · the elements, padded to 8 bytes
 *
 * A Node.js process on a big-endian machine would write other bytes; none is supported.
 */
export type StoredArray = Uint32Array | Int32Array | Float64Array;

const MAGIC = 0x48;
const VERSION = 1;
const HEADER = 8;
const TYPES = { u32: 1, i32: 2, f64: 3 } as const;

const padded = (bytes: number): number => (bytes + 7) & ~7;

function typeOf(array: StoredArray): number {
  if (array instanceof Uint32Array) return TYPES.u32;
  return array instanceof Int32Array ? TYPES.i32 : TYPES.f64;
}

/** @returns the bytes of the arrays in the order given. */
export function encodeArrays(arrays: readonly StoredArray[]): Uint8Array<ArrayBuffer> {
  const size = arrays.reduce((sum, array) => sum + 8 + padded(array.byteLength), HEADER);
  const bytes = new Uint8Array(size);
  const view = new DataView(bytes.buffer);
  view.setUint8(0, MAGIC);
  view.setUint8(1, VERSION);
  view.setUint16(2, arrays.length, true);
  let offset = HEADER;
  for (const array of arrays) {
    view.setUint8(offset, typeOf(array));
    view.setUint32(offset + 4, array.length, true);
    bytes.set(new Uint8Array(array.buffer, array.byteOffset, array.byteLength), offset + 8);
    offset += 8 + padded(array.byteLength);
  }
  return bytes;
}

function arrayAt(buffer: ArrayBuffer, type: number, offset: number, length: number): StoredArray {
  switch (type) {
    case TYPES.u32:
      return new Uint32Array(buffer, offset, length);
    case TYPES.i32:
      return new Int32Array(buffer, offset, length);
    case TYPES.f64:
      return new Float64Array(buffer, offset, length);
    default:
      throw new RangeError(`Stored arrays have the unknown type ${type}.`);
  }
}

/** @throws RangeError if the bytes are not of this layout. */
export function decodeArrays(stored: Uint8Array): StoredArray[] {
  // Copied: what the driver hands over may start at any byte, views of doubles may not.
  const buffer = new ArrayBuffer(stored.byteLength);
  new Uint8Array(buffer).set(stored);
  const view = new DataView(buffer);
  if (buffer.byteLength < HEADER || view.getUint8(0) !== MAGIC || view.getUint8(1) !== VERSION) {
    throw new RangeError('These bytes are not stored arrays of layout version 1.');
  }
  const arrays: StoredArray[] = [];
  let offset = HEADER;
  for (let k = 0; k < view.getUint16(2, true); k++) {
    const array = arrayAt(
      buffer,
      view.getUint8(offset),
      offset + 8,
      view.getUint32(offset + 4, true),
    );
    arrays.push(array);
    offset += 8 + padded(array.byteLength);
  }
  if (offset !== buffer.byteLength) throw new RangeError('Stored arrays are too long.');
  return arrays;
}

/** @returns the bytes of one u32 array, as in revisions.edges and run_blocks.rows. */
export const encodeUint32 = (array: Uint32Array): Uint8Array<ArrayBuffer> => encodeArrays([array]);

/** @throws RangeError if the bytes do not hold exactly one u32 array. */
export function decodeUint32(stored: Uint8Array): Uint32Array {
  const [array, ...others] = decodeArrays(stored);
  if (!(array instanceof Uint32Array) || others.length > 0) {
    throw new RangeError('Stored arrays: one u32 array was expected.');
  }
  return array;
}

/** @returns the bytes of one f64 array, as in revisions.weights. */
export const encodeFloat64 = (array: Float64Array): Uint8Array<ArrayBuffer> =>
  encodeArrays([array]);

/** @throws RangeError if the bytes do not hold exactly one f64 array. */
export function decodeFloat64(stored: Uint8Array): Float64Array {
  const [array, ...others] = decodeArrays(stored);
  if (!(array instanceof Float64Array) || others.length > 0) {
    throw new RangeError('Stored arrays: one f64 array was expected.');
  }
  return array;
}
