import { decodeBlockResult } from '../../db/codecs/blockResult';
import { decodeUint32 } from '../../db/codecs/typedArrays';
import type { Db } from '../../db/client';
import { findBlock, listBlockRows } from '../../db/repositories/runBlocks';
import type { Scope } from '../../db/repositories/scope';
import type { MatrixRow } from '../../formats/matrixTable';
import { encodeMatrixBlock } from '#contract/matrixBytes';
import { notFound } from '../http/parse';
import { requireRun } from './usecases';

/** One block in the layout of the wire. @throws Failure 404 while it is not stored */
export async function readBlockBytes(
  db: Db,
  scope: Scope,
  runId: string,
  block: number,
): Promise<Uint8Array> {
  const run = await requireRun(db, scope, runId);
  const stored = await findBlock(db, scope, runId, block);
  if (stored === null) throw notFound('blocks');
  return encodeMatrixBlock({
    nodeCount: run.nodeCount,
    rows: decodeUint32(stored.rows),
    pairCount: stored.pairs,
    ...decodeBlockResult(stored.result),
  });
}

interface LoadedBlock {
  readonly distances: Float64Array;
  readonly bettiGaps: Int32Array;
  readonly pairs: number;
}

/** Bytes of decoded blocks that one reader keeps; rows of one block lie apart in the order of p. */
const KEPT_BYTES = 32 * 2 ** 20;

/** The rows of a finished matrix in the order of p, with bounded memory whatever its size. */
export async function* matrixRows(
  db: Db,
  scope: Scope,
  runId: string,
  nodeCount: number,
): AsyncGenerator<MatrixRow> {
  const places = await placesOf(db, scope, runId, nodeCount);
  const kept = new Map<number, LoadedBlock>();
  let bytes = 0;
  const load = async (block: number): Promise<LoadedBlock> => {
    const found = kept.get(block);
    if (found) {
      kept.delete(block);
      kept.set(block, found);
      return found;
    }
    const stored = await findBlock(db, scope, runId, block);
    if (!stored) throw new Error(`Block ${block} of a finished run is missing.`);
    const loaded = { ...decodeBlockResult(stored.result), pairs: stored.pairs };
    kept.set(block, loaded);
    bytes += sizeOf(loaded);
    for (const [oldest, old] of kept) {
      if (bytes <= KEPT_BYTES || oldest === block) break;
      kept.delete(oldest);
      bytes -= sizeOf(old);
    }
    return loaded;
  };
  for (let p = 0; p < nodeCount - 1; p++) {
    const place = places[p];
    if (!place) throw new Error(`Row ${p} of a finished run is in no block.`);
    const { distances, bettiGaps, pairs } = await load(place.block);
    yield {
      p,
      distance: (k, i) => distances[k * pairs + place.offset + i] ?? NaN,
      bettiGap: (k, i) => bettiGaps[k * pairs + place.offset + i] ?? NaN,
    };
  }
}

const sizeOf = ({ distances, bettiGaps }: LoadedBlock): number =>
  distances.byteLength + bettiGaps.byteLength;

/** @returns for each position p its block and the index of the pair (p, p + 1) in it. */
async function placesOf(db: Db, scope: Scope, runId: string, nodeCount: number) {
  const places: ({ readonly block: number; readonly offset: number } | undefined)[] = [];
  for (const { block, rows } of await listBlockRows(db, scope, runId)) {
    let offset = 0;
    for (const p of decodeUint32(rows)) {
      places[p] = { block, offset };
      offset += nodeCount - 1 - p;
    }
  }
  return places;
}
