import type { Block, PreparedData } from '../engine/index';
import type {
  Barcode,
  Budget,
  Estimate,
  Limits,
  Network,
  PairChoice,
  PairDetail,
  PairResults,
  Part,
  RowResults,
  Ways,
} from '../engine/types';

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
  readonly blocks: readonly Block[];
}

export interface EstimateResult {
  readonly estimate: Estimate;
  /** Null where it is within the budget. */
  readonly ways: Ways | null;
}

/** Answer of a swap with the similarity over the chosen dimensions. */
export interface PairResult {
  readonly detail: PairDetail;
  readonly similarity: number;
}

/** A task that takes longer than this many seconds on its thread is refused with the sentence. */
export interface TimeLimit {
  readonly seconds: number;
  readonly refusal: string;
}

export type Task = {
  readonly subject: Subject;
  readonly timeLimit?: TimeLimit;
  /** Shared: [0] is 1 once the task must stop, [1] counts finished pairs. */
  readonly control: Int32Array;
  /** The prepared tables, in memory that all threads of the process share; null where not needed. */
  readonly tables: PreparedData | null;
} & (
  | { readonly kind: 'prepare' }
  | {
      readonly kind: 'plan';
      readonly secondsPerBlock: number;
      readonly part: Part;
      /** A part of which every pair is stored: only the others are planned. */
      readonly stored: Part | null;
    }
  | {
      readonly kind: 'estimate';
      readonly budget: Budget;
      readonly part: Part;
      /** The pairs of overlapping intervals, as a way out; null: no way out is asked for. */
      readonly overlapping: Part | null;
    }
  | { readonly kind: 'rows'; readonly rows: Uint32Array }
  | { readonly kind: 'pairs'; readonly choice: PairChoice }
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
      : K extends 'pairs'
        ? PairResults
        : K extends 'estimate'
          ? EstimateResult
          : PairResult;

/** Errors do not keep their class on the way out of a thread: the outcome says what happened. */
export type Outcome<R> =
  /**
   * `seconds` is what a thread spent on it; `bytes` the most that the engine's typed arrays for the
   * subject have taken at once, shared tables and their making included.
   */
  | {
      readonly kind: 'finished';
      readonly result: R;
      readonly seconds?: number;
      readonly bytes?: number;
    }
  | { readonly kind: 'stopped' }
  /** The input or its size is at fault; the message is a plain sentence. */
  | { readonly kind: 'refused'; readonly code: string; readonly message: string }
  /** A fault of the engine; the message is for the log. */
  | { readonly kind: 'broken'; readonly message: string }
  /** The thread died. */
  | { readonly kind: 'crashed'; readonly outOfMemory: boolean; readonly message: string };
