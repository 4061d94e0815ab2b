import { decodeBlockPairs } from '../../db/codecs/blockPairs';
import { decodeBlockResult } from '../../db/codecs/blockResult';
import type { Db } from '../../db/client';
import { findBlock, listBlockRows } from '../../db/repositories/runBlocks';
import type { Scope } from '../../db/repositories/scope';
import { encodeMatrixBlock } from '#contract/matrixBytes';
import { notFound } from '../http/parse';
import type { ComputedRow } from './tables';
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
    ...decodeBlockPairs(stored),
    pairCount: stored.pairs,
    ...decodeBlockResult(stored.result),
  });
}

interface LoadedBlock {
  readonly distances: Float64Array;
  readonly bettiGaps: Int32Array;
  readonly pairs: number;
}

/** Some pairs of one row, where they lie in their block. */
interface Piece {
  readonly block: number;
  /** Index of the first of them. */
  readonly offset: number;
  /** Null: every later position. Not listed, or whole rows would take as much room as distances. */
  readonly partners: Uint32Array | null;
}

/** Which blocks of which run; blocks from `blocks` on are left out. */
export interface StoredMatrix {
  readonly runId: string;
  readonly nodeCount: number;
  readonly blocks: number;
}

/** Bytes of decoded blocks that one reader keeps; rows of one block lie apart in the order of p. */
const KEPT_BYTES = 32 * 2 ** 20;

/** The computed pairs in the order of p and then of q, with bounded memory whatever their number. */
export async function* matrixRows(
  db: Db,
  scope: Scope,
  matrix: StoredMatrix,
): AsyncGenerator<ComputedRow> {
  const pieces = await piecesOf(db, scope, matrix);
  const load = blockLoader(db, scope, matrix.runId);
  for (const [p, list] of pieces.entries()) {
    if (list.length === 0) continue;
    const found: { q: number; block: LoadedBlock; at: number }[] = [];
    for (const { block, offset, partners } of list) {
      const loaded = await load(block);
      (partners ?? laterThan(p, matrix.nodeCount)).forEach((q, i) =>
        found.push({ q, block: loaded, at: offset + i }),
      );
    }
    // A run that was extended has a row in two blocks.
    if (list.length > 1) found.sort((one, other) => one.q - other.q);
    yield {
      p,
      partners: found.map(({ q }) => q),
      distance: (k, i) => valueAt(found[i], ({ distances }) => distances, k),
      bettiGap: (k, i) => valueAt(found[i], ({ bettiGaps }) => bettiGaps, k),
    };
  }
}

function valueAt(
  found: { readonly block: LoadedBlock; readonly at: number } | undefined,
  arrayOf: (block: LoadedBlock) => Float64Array | Int32Array,
  k: number,
): number {
  return found ? (arrayOf(found.block)[k * found.block.pairs + found.at] ?? NaN) : NaN;
}

/** Reads blocks, the latest used of them kept. */
function blockLoader(db: Db, scope: Scope, runId: string) {
  const kept = new Map<number, LoadedBlock>();
  let bytes = 0;
  return async (block: number): Promise<LoadedBlock> => {
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
}

const sizeOf = ({ distances, bettiGaps }: LoadedBlock): number =>
  distances.byteLength + bettiGaps.byteLength;

/** @returns for each position p where its pairs lie. */
async function piecesOf(
  db: Db,
  scope: Scope,
  { runId, nodeCount, blocks }: StoredMatrix,
): Promise<Piece[][]> {
  const pieces: Piece[][] = Array.from({ length: nodeCount }, () => []);
  for (const { block, ...stored } of await listBlockRows(db, scope, runId)) {
    if (block >= blocks) continue;
    const { rows, choice } = decodeBlockPairs(stored);
    let offset = 0;
    for (const [i, p] of rows.entries()) {
      const partners = choice
        ? choice.partners.subarray(choice.starts[i], choice.starts[i + 1])
        : null;
      pieces[p]?.push({ block, offset, partners });
      offset += partners?.length ?? nodeCount - 1 - p;
    }
  }
  return pieces;
}

const laterThan = (p: number, nodeCount: number): Uint32Array =>
  Uint32Array.from({ length: nodeCount - 1 - p }, (_, i) => p + 1 + i);
