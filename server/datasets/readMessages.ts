import type { ImportReport } from '#contract/datasets';
import type { EntryUnit } from '#contract/enums';
import type { Issue } from '#contract/problems';
import type { NewNode } from '../../db/repositories/revisions';

/** What the reading thread is told. */
export interface ReadRequest {
  readonly nodesPath: string;
  readonly edgesPath: string;
}

/** A network that is right in every row. */
export interface ReadNetwork {
  /** In the row order of nodes.csv. */
  readonly nodes: readonly NewNode[];
  /** u32[2 m]: node rows of the ends of each edge, lower row first, edges ascending. */
  readonly edges: Uint32Array;
  readonly entryUnit: EntryUnit;
  /** SHA-256 of the canonical content, hexadecimal. */
  readonly contentHash: string;
  readonly report: ImportReport;
}

/** The network, or everything that is wrong with the files. */
export type ReadOutcome =
  ReadNetwork | { readonly issues: readonly Issue[]; readonly leftOut: number };
