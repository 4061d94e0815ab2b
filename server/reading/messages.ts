import type { ImportReport } from '#contract/datasets';
import type { EntryUnit } from '#contract/enums';
import type { ImportChoices, SourceHint } from '#contract/importChoices';
import type { ImportWeights } from '#contract/imports';
import type { Issue } from '#contract/problems';
import type { NewNode } from '../../db/repositories/revisions';
import type { GrowthRequest } from '../../models/index';
import type { DraftView } from './draftView';

/** A file of an import on disk. */
export interface DraftFile {
  readonly path: string;
  readonly name: string;
  readonly bytes: number;
  readonly pasted: boolean;
  readonly hint: SourceHint;
}

export interface DraftRequest {
  /** Exists; what is read is left in it. */
  readonly folder: string;
  readonly files: readonly DraftFile[];
  /** Null for what is guessed. */
  readonly choices: ImportChoices | null;
}

export interface TwoFilesRequest {
  readonly folder: string;
  readonly nodesPath: string;
  readonly edgesPath: string;
}

/** A network that is grown and read where it does not hold up anybody. */
export interface GrowRequest {
  readonly folder: string;
  /** Not refused by `refusalsOf`. */
  readonly growth: GrowthRequest;
}

/** What the reading process is told: one request, then it ends. */
export type ReadRequest =
  | ({ readonly kind: 'two_files' } & TwoFilesRequest)
  | ({ readonly kind: 'grown' } & GrowRequest)
  | ({ readonly kind: 'view' | 'network' | 'problems' } & DraftRequest);

/** A typed array as bytes of db/codecs in a file of the folder. */
export interface ArrayFile {
  readonly path: string;
  /** Elements. */
  readonly length: number;
}

/** A network that is right in every row, its arrays on disk. */
export interface NetworkOnDisk {
  /** In node row order. */
  readonly nodes: readonly NewNode[];
  /** u32[2 m]: node rows of the ends of each edge, lower row first, edges ascending. */
  readonly edges: ArrayFile;
  /** f64[m], or null where the network has none. */
  readonly weights: ArrayFile | null;
  readonly entryUnit: EntryUnit;
  /** SHA-256 of the canonical content, hexadecimal. */
  readonly contentHash: string;
  readonly report: ImportReport;
}

/** What is needed to count the cliques of a draft. */
export interface GrowthOnDisk {
  /** f64[n]: entries in node row order. */
  readonly entries: ArrayFile;
  readonly edges: ArrayFile;
}

export interface ReadDraft {
  readonly view: DraftView;
  readonly weights: ImportWeights['weights'];
  /** Null without a network. */
  readonly growth: GrowthOnDisk | null;
}

export interface GrownOnDisk {
  readonly network: NetworkOnDisk;
  /** Names model, parameters and seed. */
  readonly description: string;
}

export interface Problems {
  readonly issues: readonly Issue[];
  readonly leftOut: number;
}

/** What it answers. */
export type ReadAnswer =
  | { readonly kind: 'network'; readonly network: NetworkOnDisk }
  | ({ readonly kind: 'grown' } & GrownOnDisk)
  | { readonly kind: 'view'; readonly draft: ReadDraft }
  | ({ readonly kind: 'problems' } & Problems)
  /** A fault of the program; the message is for the log. */
  | { readonly kind: 'broken'; readonly message: string };
