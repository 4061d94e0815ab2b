import type { Issue } from '#contract/problems';

/** What kind of refusal it is; only `http/problem.ts` knows the status that belongs to it. */
export type FailureKind =
  | 'malformed'
  | 'signed_out'
  | 'forbidden'
  | 'not_found'
  | 'wrong_method'
  | 'timed_out'
  | 'conflict'
  | 'too_large'
  | 'unsupported'
  | 'invalid'
  | 'throttled'
  | 'unavailable';

export interface FailureOptions {
  readonly issues?: readonly Issue[];
  readonly issuesLeftOut?: number;
  /** Seconds after which trying again makes sense. */
  readonly retryAfter?: number;
  /** Methods that the address does answer. */
  readonly allow?: readonly string[];
  readonly cause?: unknown;
}

/** A refusal that a person may read: a stable code and a sentence that says what to do. */
export class Failure extends Error {
  constructor(
    readonly kind: FailureKind,
    readonly code: string,
    readonly detail: string,
    readonly options: FailureOptions = {},
  ) {
    super(detail, { cause: options.cause });
    this.name = 'Failure';
  }
}
