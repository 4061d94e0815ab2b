import type { RunFailure, WorkRun } from '../../db/repositories/runWork';
import type { WorkerConfig } from '../config';
import type { TimeLimit } from '../pool/tasks';

const digits = new Intl.NumberFormat('en-GB', { maximumSignificantDigits: 3 });

/** "90 s", "2.5 h" */
const spanOf = (seconds: number): string =>
  seconds < 3600 ? `${digits.format(seconds)} s` : `${digits.format(seconds / 3600)} h`;

const WAYS =
  'Choose fewer dimensions or a part of the pairs (those within some positions, or whose intervals overlap), or bring in a revision with a higher weight threshold.';

/** A run that was planned although nobody had asked for its estimate. */
export const tooLong = (seconds: number, mostSeconds: number): RunFailure => ({
  code: 'engine.limit_seconds',
  message: `The run would take about ${spanOf(seconds)} of one thread; ${spanOf(mostSeconds)} are allowed. ${WAYS}`,
});

/**
 * What is left to a run whose estimate was too low: stored blocks count by what threads spent on
 * them, the block at work from when its thread began it. Tables are bounded by their cliques.
 */
export const timeLeft = (
  { secondsSpent }: Pick<WorkRun, 'secondsSpent'>,
  { mostSeconds }: WorkerConfig,
): TimeLimit => ({
  seconds: Math.max(0, mostSeconds - secondsSpent),
  refusal: `The run took more than the ${spanOf(mostSeconds)} of one thread that are allowed, and was ended. ${WAYS}`,
});
