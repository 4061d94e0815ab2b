/** What reading a network gives: plain data, so that it can be posted between threads. */

export interface NetworkNode {
  /** As written, surrounding spaces left out. */
  readonly id: string;
  /** The id where the file gives no label. */
  readonly label: string;
  readonly entryRaw: string;
  /** In the entry unit of the network. */
  readonly entry: number;
  readonly earliestRaw: string;
  readonly earliest: number | null;
  readonly latestRaw: string;
  readonly latest: number | null;
}

/** A bare number, whole days since 1970-01-01, or seconds since 1970-01-01 00:00 UTC. */
export type EntryUnit = 'number' | 'days' | 'seconds';

/** Counts of what was folded or passed over. */
export interface ImportCounts {
  readonly nodeRows: number;
  readonly edgeRows: number;
  readonly selfLoops: number;
  readonly duplicateEdges: number;
  readonly reversedEdges: number;
  readonly tiedNodes: number;
  readonly repeatedLabels: number;
  readonly isolatedNodes: number;
  readonly components: number;
  readonly ignoredColumns: string[];
}

export interface ReadNetwork {
  /** In the row order of the node file. */
  readonly nodes: readonly NetworkNode[];
  /** u32[2 m]: node rows of the ends of each edge, lower row first, edges ascending. */
  readonly edges: Uint32Array;
  /**
   * f64[m]: the weight of each edge, the largest where several rows were folded, NaN where the file
   * gives none; null without a weight column. No part of the content hash: weights change neither
   * order nor complex, which edges they leave in does.
   */
  readonly weights: Float64Array | null;
  readonly entryUnit: EntryUnit;
  readonly report: ImportCounts;
}

/** One thing that is wrong with a file. */
export interface FileIssue {
  readonly file: string;
  /** 1-based, the header being line 1. */
  readonly line?: number;
  readonly field?: string;
  /** What is wrong and what to do. */
  readonly message: string;
}

export interface FormatLimits {
  readonly nodes: number;
  readonly edgeRows: number;
  readonly lineCharacters: number;
  readonly labelCharacters: number;
  /** Issues that are listed, those past it being counted; 200 unless told otherwise. */
  readonly issues?: number;
}

/** A file as it arrives: its name for the messages, and its bytes. */
export interface SourceFile {
  readonly name: string;
  readonly bytes: AsyncIterable<Uint8Array>;
}

export type ReadOutcome =
  | ({ readonly ok: true } & ReadNetwork)
  | { readonly ok: false; readonly issues: readonly FileIssue[]; readonly leftOut: number };
