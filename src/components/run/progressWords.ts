import { formatCount, formatNoun, formatTimeLeft } from '../../composables/localeFormat';
import { isFinal, type RunProgress } from '../../stores/runs';

/** @returns the share of a run's pairs that are done, 0..1. */
export function progressShare({ pairsDone, pairsTotal }: RunProgress): number {
  return pairsTotal === 0 ? 0 : pairsDone / pairsTotal;
}

/** @returns e.g. "1,024 of 4,005 pairs · about 12 seconds left". */
export function progressWords(run: RunProgress): string {
  if (run.state === 'queued') return 'Waiting for a worker';
  const pairs =
    run.pairsTotal === 0
      ? 'Planning the pairs'
      : `${formatCount(run.pairsDone)} of ${formatNoun(run.pairsTotal, 'pair')}`;
  if (isFinal(run.state)) return pairs;
  if (run.down) return `${pairs} · the connection is down, trying again`;
  return run.millisecondsLeft === null
    ? pairs
    : `${pairs} · ${formatTimeLeft(run.millisecondsLeft)}`;
}

/** @returns what the browser tab says of a run in front of its name, e.g. "42 %"; "" when done. */
export function tabWords(run: RunProgress): string {
  switch (run.state) {
    case 'queued':
      return 'waiting';
    case 'running':
      return `${Math.floor(100 * progressShare(run))} %`;
    case 'failed':
    case 'stopped':
      return run.state;
    case 'done':
      return '';
  }
}
