/**
 * The wire layout of one block of a swap matrix (little endian), read and written only here.
 *
 *   u32 magic 0x314d4448 ("HDM1") · u16 layout version 1 · u16 dimensions D + 1
 *   u32 n (nodes) · u32 rows R · u32 pairs P · u32 zero
 *   u32[R] arrival positions p of the rows, padded to 8 bytes
 *   f64[(D + 1) P] bottleneck distances, dimension k of pair i at k P + i
 *   i32[(D + 1) P] largest Betti-curve gaps, the same order
 *
 * Pairs run through the rows in the order given and, within a row, through q = p + 1 .. n - 1.
 */
export interface MatrixBlock {
  readonly nodeCount: number;
  readonly rows: Uint32Array;
  readonly pairCount: number;
  readonly distances: Float64Array;
  readonly bettiGaps: Int32Array;
}

const MAGIC = 0x314d4448;
const VERSION = 1;
const HEADER = 24;

const padded = (bytes: number): number => (bytes + 7) & ~7;

/** @returns the bytes of the block; dimensions are counted from the length of `distances`. */
export function encodeMatrixBlock(block: MatrixBlock): Uint8Array<ArrayBuffer> {
  const { rows, pairCount, distances, bettiGaps } = block;
  const rowsEnd = HEADER + padded(4 * rows.length);
  const bytes = new Uint8Array(rowsEnd + 12 * distances.length);
  const view = new DataView(bytes.buffer);
  view.setUint32(0, MAGIC, true);
  view.setUint16(4, VERSION, true);
  view.setUint16(6, pairCount === 0 ? 0 : distances.length / pairCount, true);
  view.setUint32(8, block.nodeCount, true);
  view.setUint32(12, rows.length, true);
  view.setUint32(16, pairCount, true);
  new Uint32Array(bytes.buffer, HEADER, rows.length).set(rows);
  new Float64Array(bytes.buffer, rowsEnd, distances.length).set(distances);
  new Int32Array(bytes.buffer, rowsEnd + 8 * distances.length, bettiGaps.length).set(bettiGaps);
  return bytes;
}

/** @throws RangeError if the bytes are not a block of this layout. */
export function decodeMatrixBlock(buffer: ArrayBuffer): MatrixBlock {
  const view = new DataView(buffer);
  if (buffer.byteLength < HEADER || view.getUint32(0, true) !== MAGIC) {
    throw new RangeError('These bytes are not a block of a swap matrix.');
  }
  if (view.getUint16(4, true) !== VERSION) {
    throw new RangeError(`Layout version ${view.getUint16(4, true)} is not known here.`);
  }
  const dimensions = view.getUint16(6, true);
  const rowCount = view.getUint32(12, true);
  const pairCount = view.getUint32(16, true);
  const rowsEnd = HEADER + padded(4 * rowCount);
  if (buffer.byteLength !== rowsEnd + 12 * dimensions * pairCount) {
    throw new RangeError('A block of a swap matrix is cut short or too long.');
  }
  const cells = dimensions * pairCount;
  return {
    nodeCount: view.getUint32(8, true),
    rows: new Uint32Array(buffer, HEADER, rowCount),
    pairCount,
    distances: new Float64Array(buffer, rowsEnd, cells),
    bettiGaps: new Int32Array(buffer, rowsEnd + 8 * cells, cells),
  };
}
