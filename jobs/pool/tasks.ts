import type { PreparedData } from '../engine/index';
import type { Barcode, Estimate, Limits, Network, PairDetail, RowResults } from '../engine/types';

/** What a thread needs to prepare a run. */
export interface Subject {
  /** Names the prepared tables: the same key always means the same network and dimension. */
  readonly key: string;
  /** Its typed arrays lie in shared memory, so that posting them copies nothing. */
  readonly network: Network;
  readonly maxDimension: number;
  readonly limits: Limits;
}

export interface PlanResult {
  readonly engineVersion: string;
  readonly estimate: Estimate;
  readonly barcode: Barcode;
  /** Arrival positions of each block. */
  readonly blocks: readonly Uint32Array[];
}

/** Answer of a swap with the similarity over the chosen dimensions. */
export interface PairResult {
  readonly detail: PairDetail;
  readonly similarity: number;
}

export type Task = {
  readonly subject: Subject;
  /** Shared: [0] is 1 once the task must stop, [1] counts finished pairs. */
  readonly control: Int32Array;
  /** The prepared tables, in memory that all threads of the process share; null where not needed. */
  readonly tables: PreparedData | null;
} & (
  | { readonly kind: 'prepare' }
  | { readonly kind: 'plan'; readonly secondsPerBlock: number }
  | { readonly kind: 'estimate' }
  | { readonly kind: 'rows'; readonly rows: Uint32Array }
  | {
      readonly kind: 'pair';
      readonly p: number;
      readonly q: number;
      readonly dimensions: readonly number[];
    }
);

/** Kinds of tasks that may be asked for; `prepare` the pool asks for itself. */
export type Asked = Exclude<Task['kind'], 'prepare'>;

export type ResultOf<K extends Task['kind']> = K extends 'prepare'
  ? PreparedData
  : K extends 'plan'
    ? PlanResult
    : K extends 'rows'
      ? RowResults
      : K extends 'estimate'
        ? Estimate
        : PairResult;

/** Errors do not keep their class on the way out of a thread: the outcome says what happened. */
export type Outcome<R> =
  | { readonly kind: 'finished'; readonly result: R }
  | { readonly kind: 'stopped' }
  /** The input or its size is at fault; the message is a plain sentence. */
  | { readonly kind: 'refused'; readonly code: string; readonly message: string }
  /** A fault of the engine; the message is for the log. */
  | { readonly kind: 'broken'; readonly message: string }
  /** The thread died. */
  | { readonly kind: 'crashed'; readonly outOfMemory: boolean; readonly message: string };
