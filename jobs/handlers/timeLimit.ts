import type { RunFailure, WorkRun } from '../../db/repositories/runWork';
import type { WorkerConfig } from '../config';

const digits = new Intl.NumberFormat('en-GB', { maximumSignificantDigits: 3 });

/** "90 s", "2.5 h" */
const spanOf = (seconds: number): string =>
  seconds < 3600 ? `${digits.format(seconds)} s` : `${digits.format(seconds / 3600)} h`;

const WAYS =
  'Choose fewer dimensions or a part of the pairs (those within some positions, or whose intervals overlap), or bring in a revision with a higher weight threshold.';

/** A run that was planned although nobody had asked for its estimate. */
export const tooLong = (seconds: number, { mostSeconds }: WorkerConfig): RunFailure => ({
  code: 'engine.limit_seconds',
  message: `The run would take about ${spanOf(seconds)} of one thread; ${spanOf(mostSeconds)} are allowed. ${WAYS}`,
});

/** A run whose estimate was too low. */
export const overTime = ({ mostSeconds }: WorkerConfig): RunFailure => ({
  code: 'engine.limit_seconds',
  message: `The run took more than the ${spanOf(mostSeconds)} of one thread that are allowed, and was ended. ${WAYS}`,
});

/**
 * Aborts as `signal` does, and once the run has taken the time that is left to it. Stored blocks
 * count by what threads spent on them, the block at work by the clock.
 */
export function runSignal(
  { secondsSpent }: Pick<WorkRun, 'secondsSpent'>,
  { mostSeconds }: WorkerConfig,
  signal: AbortSignal,
): { readonly signal: AbortSignal; readonly isOver: () => boolean } {
  const milliseconds = Math.ceil(1000 * Math.max(0, mostSeconds - secondsSpent));
  // The longest time that a timer of the platform takes.
  const limit = AbortSignal.timeout(Math.min(milliseconds, 2 ** 31 - 1));
  return {
    signal: AbortSignal.any([signal, limit]),
    isOver: () => limit.aborted && !signal.aborted,
  };
}
