import type { ImportReport } from '#contract/datasets';
import type { EntryUnit } from '#contract/enums';
import type { NewNode } from '../../db/repositories/revisions';
import type { EncodedPieces } from '../../db/repositories/stagedPieces';
import { piecesOf } from './arrayPieces';
import type { NetworkOnDisk } from '../reading/messages';

/** A network that is right in every row. */
export interface ReadNetwork {
  /** In the row order of the node table. */
  readonly nodes: readonly NewNode[];
  /** u32[2 m]: node rows of the ends of each edge, lower row first, edges ascending. */
  readonly edges: Uint32Array | EncodedPieces;
  /** f64[m], NaN for none; null or absent where the network has none. */
  readonly weights?: Float64Array | EncodedPieces | null;
  readonly entryUnit: EntryUnit;
  /** SHA-256 of the canonical content, hexadecimal. */
  readonly contentHash: string;
  readonly report: ImportReport;
}

/** A network whose arrays go from their files to the database without being held. */
export const networkFrom = (onDisk: NetworkOnDisk): ReadNetwork => ({
  ...onDisk,
  edges: piecesOf(onDisk.edges),
  weights: onDisk.weights && piecesOf(onDisk.weights),
});
