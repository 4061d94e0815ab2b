import type { FileIssue, FormatLimits } from '../types';

/** A whole file: its name (or "pasted text") for the messages, and its bytes. */
export interface SourceBytes {
  readonly name: string;
  readonly bytes: Uint8Array;
}

export type GraphFormat = 'graphml' | 'gexf' | 'node_link' | 'gml' | 'pajek';
export type SourceFormat = 'table' | 'matrix' | GraphFormat;
export type Encoding = 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252';
export type Delimiter = ',' | ';' | '\t' | '|' | ' ';
export type DecimalMark = '.' | ',';
export type TableRole = 'nodes' | 'edges';

/** How the bytes of a text file are read; guessed, correctable. */
export interface TextReading {
  readonly encoding: Encoding;
  readonly delimiter: Delimiter;
  readonly decimal: DecimalMark;
  /** Whether the first row names the columns. */
  readonly header: boolean;
}

/** What somebody said about a file; what is left out is guessed. */
export interface SourceHint {
  readonly format?: SourceFormat;
  readonly reading?: Partial<TextReading>;
  /** What the rows of a table are. */
  readonly role?: TableRole;
}

export interface SourceLimits extends FormatLimits {
  /** Bytes of one file. */
  readonly bytes: number;
  /** Columns of a table, or attributes of a graph file; a matrix may have one more than `nodes`. */
  readonly columns: number;
  /** Levels of nesting of XML, JSON and GML. */
  readonly depth: number;
}

export interface RawRow {
  /** 1-based; of what, `RawTable.where` says. */
  readonly line: number;
  /** One a column, trimmed, otherwise exactly as written; '' where there is nothing. */
  readonly cells: readonly string[];
}

/** Rows shown beside the choices. */
export const PREVIEW_ROWS = 50;

/**
 * A table as found. Only the preview is held as rows: `rows()` reads the bytes again (or walks a
 * compact form), so that two million rows need no more room than the file.
 */
export interface RawTable {
  /** As written, each once (compared in NFC); unnamed and repeated ones are 'column 3', by position. */
  readonly columns: readonly string[];
  /** The first rows, at most PREVIEW_ROWS. */
  readonly preview: readonly RawRow[];
  /** Rows that `rows()` gives. */
  readonly rowCount: number;
  /** Every readable row in the order of the file; may be called again and again, never throws. */
  rows(): Iterable<RawRow>;
  /** What `line` counts: lines of the file, or elements (nodes and edges apart) in its order. */
  readonly where: 'line' | 'element';
}

export interface RawSource {
  /** Name of the file. */
  readonly file: string;
  readonly format: SourceFormat;
  /** Encoding for all; delimiter, decimal mark and header mean something for 'table' and 'matrix'. */
  readonly reading: TextReading;
  /** One of them may be null: an edge list has no node table, a node table no edges. */
  readonly nodes: RawTable | null;
  readonly edges: RawTable | null;
  /** Whether the file says that its edges have a direction. */
  readonly directed: boolean;
  /** What cannot be kept, by kind ('hyperedges', 'comment lines'); nothing is dropped in silence. */
  readonly dropped: readonly Dropped[];
  /** What was assumed, in plain sentences: 'The first row is data, so the columns are numbered.' */
  readonly notes: readonly string[];
  /** What is wrong; a source with issues is shown but not understood. */
  readonly issues: readonly FileIssue[];
  /** Issues past those listed. */
  readonly leftOut: number;
}

export interface Dropped {
  readonly what: string;
  readonly count: number;
}

/** A decoded file, its byte order mark left out; never holds NUL or lone surrogates. */
export interface DecodedFile {
  readonly name: string;
  readonly text: string;
  readonly encoding: Encoding;
}

/**
 * A reader of one graph format. What is wrong is an issue of the source it returns (both tables
 * null if nothing could be read); it throws nothing.
 *
 * Canonical columns: nodes `id`, `label`, `start`, `end`, then attributes by their own names; edges
 * `source`, `target`, `weight`, `start`, `end`, then attributes. A column that no element uses is
 * left out (save `id`, `source`, `target`). An attribute that is called like a canonical column and
 * is not it gets a suffix: 'label (attribute)'.
 */
export type GraphReader = (
  file: DecodedFile,
  limits: SourceLimits,
) => RawSource | Promise<RawSource>;
