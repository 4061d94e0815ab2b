import { Failure } from '../http/failure';

export const otherParameters = () =>
  new Failure(
    'conflict',
    'runs.key_reused',
    'This Idempotency-Key already started a run with other parameters. Use a new key for a new run.',
  );

export const longKey = () =>
  new Failure(
    'malformed',
    'runs.long_key',
    'The Idempotency-Key is longer than 200 characters; use a shorter one.',
  );

export const notPlanned = () =>
  new Failure(
    'conflict',
    'runs.not_planned',
    'The recorded barcode is not computed yet; read it once the run has blocks.',
  );

export const notDone = (state: string) =>
  new Failure(
    'conflict',
    'runs.not_done',
    `The matrix is written once the run is done; it is ${state} now.`,
  );

export const alreadyOver = (state: string) =>
  new Failure('conflict', 'runs.already_over', `The run is ${state} already; nothing was changed.`);

export const nothingToExtend = (why: string) =>
  new Failure('conflict', 'runs.nothing_to_extend', why);

export const nothingToFocus = (state: string) =>
  new Failure(
    'conflict',
    'runs.nothing_left',
    `The run is ${state}; nothing is computed first any more.`,
  );

/** The sentence says the number and the ways out. */
export const tooLarge = (sentence: string) => new Failure('invalid', 'runs.too_large', sentence);

export const estimateRefused = (sentence: string) =>
  new Failure('conflict', 'estimates.refused', sentence);

export const estimateLate = () =>
  new Failure(
    'unavailable',
    'estimates.not_answered_yet',
    'No worker has counted the cliques of this revision yet. It is asked for and not lost: ask again in a moment.',
    { retryAfter: 5 },
  );

/** The worker's own sentence says what stood in the way. */
export const pairRefused = (sentence: string) => new Failure('conflict', 'pairs.refused', sentence);

export const pairLate = () =>
  new Failure(
    'unavailable',
    'pairs.not_answered_yet',
    'No worker has worked this swap out yet. It is asked for and not lost: open it again in a moment.',
    { retryAfter: 5 },
  );
