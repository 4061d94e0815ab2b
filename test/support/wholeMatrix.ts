import { createHash } from 'node:crypto';
import type { Queryable } from '../../db/client';
import { decodeBlockResult } from '../../db/codecs/blockResult';
import { decodeUint32 } from '../../db/codecs/typedArrays';
import { findBlock, listBlockRows } from '../../db/repositories/runBlocks';
import type { Scope } from '../../db/repositories/scope';
import { computeRows, prepare } from '../../jobs/engine/index';
import type { Network } from '../../jobs/engine/types';

/** Every result by position p: distances and gaps of its pairs, all dimensions. */
export type WholeMatrix = Map<number, { distances: number[]; bettiGaps: number[] }>;

const GENEROUS = { simplices: 1e8, bytes: 4 * 2 ** 30 };
const NEVER = { shouldStop: () => false, onProgress: () => undefined };

/** The matrix as the engine gives it when it is called directly, in one block. */
export function directMatrix(network: Network, maxDimension: number): WholeMatrix {
  const prepared = prepare(network, maxDimension, GENEROUS, NEVER);
  const rows = Uint32Array.from({ length: network.nodeCount - 1 }, (_, p) => p);
  const { distances, bettiGaps } = computeRows(prepared, rows, NEVER);
  return byPosition([{ rows, distances, bettiGaps }], network.nodeCount);
}

/** The matrix as it is stored. @throws Error if a block is missing */
export async function storedMatrix(
  db: Queryable,
  scope: Scope,
  runId: string,
  nodeCount: number,
): Promise<WholeMatrix> {
  const blocks = [];
  for (const { block, rows } of await listBlockRows(db, scope, runId)) {
    const stored = await findBlock(db, scope, runId, block);
    if (!stored) throw new Error(`Block ${block} is missing.`);
    blocks.push({ rows: decodeUint32(rows), ...decodeBlockResult(stored.result) });
  }
  return byPosition(blocks, nodeCount);
}

function byPosition(
  blocks: readonly { rows: Uint32Array; distances: Float64Array; bettiGaps: Int32Array }[],
  nodeCount: number,
): WholeMatrix {
  const matrix: WholeMatrix = new Map();
  for (const { rows, distances, bettiGaps } of blocks) {
    const pairs = rows.reduce((sum, p) => sum + nodeCount - 1 - p, 0);
    let offset = 0;
    for (const p of rows) {
      if (matrix.has(p)) throw new Error(`Row ${p} is in two blocks.`);
      const width = nodeCount - 1 - p;
      const slices = <A extends Float64Array | Int32Array>(array: A): number[] =>
        Array.from({ length: pairs === 0 ? 0 : array.length / pairs }, (_, k) =>
          Array.from(array.subarray(k * pairs + offset, k * pairs + offset + width)),
        ).flat();
      matrix.set(p, { distances: slices(distances), bettiGaps: slices(bettiGaps) });
      offset += width;
    }
  }
  return new Map([...matrix].sort(([p], [q]) => p - q));
}

/** SHA-256 of every stored byte of a run: pairs and results of its blocks, in the order of blocks. */
export async function storedHash(db: Queryable, scope: Scope, runId: string): Promise<string> {
  const hash = createHash('sha256');
  for (const { block, rows, partners } of await listBlockRows(db, scope, runId)) {
    const stored = await findBlock(db, scope, runId, block);
    hash
      .update(rows)
      .update(partners ?? 'whole')
      .update(stored?.result ?? 'missing');
  }
  return hash.digest('hex');
}
