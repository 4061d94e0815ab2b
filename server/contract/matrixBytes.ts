/**
 * The wire layout of one block of a swap matrix (little endian), read and written only here.
 *
 *   u32 magic 0x314d4448 ("HDM1") · u16 layout version 1 or 2 · u16 dimensions D + 1
 *   u32 n (nodes) · u32 rows R · u32 pairs P · u32 zero
 *   u32[R] arrival positions p of the rows, padded to 8 bytes
 *   version 2 only: u32[R + 1] starts, padded to 8 bytes · u32[P] partners q, padded to 8 bytes
 *   f64[(D + 1) P] bottleneck distances, dimension k of pair i at k P + i
 *   i32[(D + 1) P] largest Betti-curve gaps, the same order
 *
 * Version 1 holds whole rows: pairs run through the rows in the order given and, within a row,
 * through q = p + 1 .. n - 1. In version 2 the partners of row i are partners[starts[i]] ..
 * partners[starts[i + 1] - 1], ascending, and pair i is that of partners[i].
 */
export interface MatrixBlock {
  readonly nodeCount: number;
  readonly rows: Uint32Array;
  /** Null for whole rows. */
  readonly choice: { readonly starts: Uint32Array; readonly partners: Uint32Array } | null;
  readonly pairCount: number;
  readonly distances: Float64Array;
  readonly bettiGaps: Int32Array;
}

const MAGIC = 0x314d4448;
const WHOLE_ROWS = 1;
const CHOSEN_PAIRS = 2;
const HEADER = 24;

const padded = (bytes: number): number => (bytes + 7) & ~7;

/** Where the parts of a block begin, in bytes. */
function layout(version: number, rows: number, pairs: number, cells: number) {
  const starts = HEADER + padded(4 * rows);
  const partners = version === WHOLE_ROWS ? starts : starts + padded(4 * (rows + 1));
  const distances = version === WHOLE_ROWS ? starts : partners + padded(4 * pairs);
  const gaps = distances + 8 * cells;
  return { starts, partners, distances, gaps, end: gaps + 4 * cells };
}

/** @returns the bytes of the block; dimensions are counted from the length of `distances`. */
export function encodeMatrixBlock(block: MatrixBlock): Uint8Array<ArrayBuffer> {
  const { rows, choice, pairCount, distances, bettiGaps } = block;
  const version = choice === null ? WHOLE_ROWS : CHOSEN_PAIRS;
  const at = layout(version, rows.length, pairCount, distances.length);
  const bytes = new Uint8Array(at.end);
  const view = new DataView(bytes.buffer);
  view.setUint32(0, MAGIC, true);
  view.setUint16(4, version, true);
  view.setUint16(6, pairCount === 0 ? 0 : distances.length / pairCount, true);
  view.setUint32(8, block.nodeCount, true);
  view.setUint32(12, rows.length, true);
  view.setUint32(16, pairCount, true);
  new Uint32Array(bytes.buffer, HEADER, rows.length).set(rows);
  if (choice !== null) {
    new Uint32Array(bytes.buffer, at.starts, rows.length + 1).set(choice.starts);
    new Uint32Array(bytes.buffer, at.partners, pairCount).set(choice.partners);
  }
  new Float64Array(bytes.buffer, at.distances, distances.length).set(distances);
  new Int32Array(bytes.buffer, at.gaps, bettiGaps.length).set(bettiGaps);
  return bytes;
}

/** @throws RangeError if the bytes are not a block of one of these layouts. */
export function decodeMatrixBlock(buffer: ArrayBuffer): MatrixBlock {
  const view = new DataView(buffer);
  if (buffer.byteLength < HEADER || view.getUint32(0, true) !== MAGIC) {
    throw new RangeError('These bytes are not a block of a swap matrix.');
  }
  const version = view.getUint16(4, true);
  if (version !== WHOLE_ROWS && version !== CHOSEN_PAIRS) {
    throw new RangeError(`Layout version ${version} is not known here.`);
  }
  const dimensions = view.getUint16(6, true);
  const rowCount = view.getUint32(12, true);
  const pairCount = view.getUint32(16, true);
  const cells = dimensions * pairCount;
  const at = layout(version, rowCount, pairCount, cells);
  if (buffer.byteLength !== at.end) {
    throw new RangeError('A block of a swap matrix is cut short or too long.');
  }
  const choice = version === CHOSEN_PAIRS && {
    starts: new Uint32Array(buffer, at.starts, rowCount + 1),
    partners: new Uint32Array(buffer, at.partners, pairCount),
  };
  if (choice && choice.starts[rowCount] !== pairCount) {
    throw new RangeError('A block of a swap matrix names other pairs than it holds.');
  }
  return {
    nodeCount: view.getUint32(8, true),
    rows: new Uint32Array(buffer, HEADER, rowCount),
    choice: choice || null,
    pairCount,
    distances: new Float64Array(buffer, at.distances, cells),
    bettiGaps: new Int32Array(buffer, at.gaps, cells),
  };
}
