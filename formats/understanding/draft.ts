import type { EntryUnit } from '../types';

/** A node while the network is put together. */
export interface DraftNode {
  /** Line or element of its row; of a node without a row, of what first names it. */
  readonly line: number;
  readonly file: string;
  readonly id: string;
  readonly label: string;
  /** Whether it has a row in the node table. */
  readonly listed: boolean;
  readonly raw: RawTimes;
}

export interface RawTimes {
  readonly entry: string;
  readonly earliest: string;
  readonly latest: string;
}

/** The times of a node; the entry is null where nothing says when it arrived. */
export interface NodeTimes {
  readonly entryRaw: string;
  readonly entry: number | null;
  readonly earliestRaw: string;
  readonly earliest: number | null;
  readonly latestRaw: string;
  readonly latest: number | null;
}

/** The times of all nodes in one unit, and how their windows came about. */
export interface TimedNodes {
  readonly unit: EntryUnit;
  /** By node row. */
  readonly times: readonly NodeTimes[];
  /** Windows that the file gives, and that years and months mean. */
  readonly given: number;
  readonly years: number;
  readonly months: number;
  /** Edge rows without a time; 0 where none was looked for. */
  readonly edgesWithoutTime: number;
  /** Cells that have to be asked about; then times are missing. */
  readonly ambiguous: readonly string[];
}

export const NO_TIMES: NodeTimes = {
  entryRaw: '',
  entry: null,
  earliestRaw: '',
  earliest: null,
  latestRaw: '',
  latest: null,
};
