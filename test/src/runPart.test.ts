import { describe, expect, it } from 'vitest';
import type { RunPart } from '#contract/enums';
import { decodeMatrixBlock, encodeMatrixBlock } from '#contract/matrixBytes';
import { partnersOf } from '../../jobs/engine/index';
import { enginePart } from '../../jobs/parts';
import { partMask } from '../../src/graphs/runPart';
import { pairIndex, SwapMatrix } from '../../src/graphs/swapMatrix';
import { seeded } from '../support/graphs';

const NODES = 18;

/** Nodes in row order with tied entries and drawn, partly missing windows. */
function nodes() {
  const source = seeded(5);
  return Array.from({ length: NODES }, (_, row) => {
    const entry = source.integer(0, 12);
    const open = source.real() < 0.3;
    return {
      row,
      entry,
      earliest: open ? null : entry - source.integer(0, 2),
      latest: source.real() < 0.3 ? null : entry + source.integer(0, 2),
    };
  });
}

const PARTS: readonly RunPart[] = [
  { kind: 'whole' },
  { kind: 'within', positions: 3 },
  { kind: 'within', positions: 500 },
  { kind: 'overlapping' },
  { kind: 'chosen', windows: [[2, 6]], nodes: [4, 11], pairs: [[1, 16]] },
];

describe('the pairs of a part', () => {
  it.each(PARTS)('are the same to the browser and to the worker: $kind', (part) => {
    const inRows = nodes();
    const arrived = [...inRows].sort((a, b) => a.entry - b.entry || a.row - b.row);
    const mask = partMask(part, arrived);
    const partners = partnersOf(enginePart(part, inRows), NODES);
    for (let p = 0; p < NODES; p += 1) {
      const listed = new Set(partners.of(p));
      for (let q = p + 1; q < NODES; q += 1) {
        expect([p, q, mask[pairIndex(NODES, p, q)]]).toEqual([p, q, listed.has(q) ? 1 : 0]);
      }
    }
  });
});

describe('a block of chosen pairs on the wire', () => {
  const block = {
    nodeCount: 6,
    rows: Uint32Array.of(3, 0),
    choice: { starts: Uint32Array.of(0, 1, 3), partners: Uint32Array.of(5, 2, 4) },
    pairCount: 3,
    distances: Float64Array.of(0.5, 1, 1.5, 10, 20, 30),
    bettiGaps: Int32Array.of(1, 2, 3, 4, 5, 6),
  };

  it('comes back as it was sent', () => {
    expect(decodeMatrixBlock(encodeMatrixBlock(block).buffer)).toEqual(block);
  });

  it('fills the cells of its pairs and no others', () => {
    const matrix = new SwapMatrix(6, 2);
    matrix.place(block);
    matrix.place(block);
    const known = [
      [3, 5],
      [0, 2],
      [0, 4],
    ] as const;
    expect(matrix.knownCount).toBe(3);
    known.forEach(([p, q], i) => {
      const index = pairIndex(6, p, q);
      expect(matrix.isKnown(p, q)).toBe(true);
      expect([matrix.distance(0, index), matrix.distance(1, index)]).toEqual([
        block.distances[i],
        block.distances[3 + i],
      ]);
      expect(matrix.bettiGap(1, index)).toBe(block.bettiGaps[3 + i]);
    });
    expect(matrix.isKnown(0, 1)).toBe(false);
  });

  it('is refused where it is cut, or names other pairs than it holds', () => {
    const bytes = encodeMatrixBlock(block);
    expect(() => decodeMatrixBlock(bytes.slice(0, -4).buffer)).toThrow(RangeError);
    new DataView(bytes.buffer).setUint32(24 + 8 + 8, 2, true);
    expect(() => decodeMatrixBlock(bytes.buffer)).toThrow(/other pairs/);
    new DataView(bytes.buffer).setUint16(4, 3, true);
    expect(() => decodeMatrixBlock(bytes.buffer)).toThrow(/version 3/);
  });

  it('of whole rows keeps the first layout, byte by byte', () => {
    const whole = { ...block, rows: Uint32Array.of(2), choice: null };
    const bytes = encodeMatrixBlock(whole);
    expect(new DataView(bytes.buffer).getUint16(4, true)).toBe(1);
    expect(bytes.byteLength).toBe(24 + 8 + 6 * 8 + 6 * 4);
    expect(decodeMatrixBlock(bytes.buffer)).toEqual(whole);
  });
});
