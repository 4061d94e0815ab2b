import type { RunBrief } from '#contract/datasets';
import type { RunState } from '#contract/enums';

/** Numbers and dates as the reader's locale writes them. Exports never use these. */
const numbers = new Intl.NumberFormat();
const dates = new Intl.DateTimeFormat(undefined, { dateStyle: 'medium', timeStyle: 'short' });

export const formatCount = (count: number): string => numbers.format(count);

/** @param iso a date-time of the API. */
export const formatDate = (iso: string): string => dates.format(new Date(iso));

/** "1 node", "46 nodes". */
export const formatNoun = (count: number, one: string, many = `${one}s`): string =>
  `${formatCount(count)} ${count === 1 ? one : many}`;

/** @param bytes written in KiB or MiB of 1024 or 1024² bytes. */
export function formatBytes(bytes: number): string {
  if (bytes < 1024) return formatNoun(bytes, 'byte');
  if (bytes < 1024 ** 2) return `${formatCount(Math.round(bytes / 1024))} KiB`;
  return `${formatCount(Math.round((10 * bytes) / 1024 ** 2) / 10)} MiB`;
}

/** Time left in words, rounded up so that it does not promise too much. */
export function formatTimeLeft(milliseconds: number): string {
  const seconds = Math.ceil(milliseconds / 1000);
  if (seconds <= 1) return 'about a second left';
  if (seconds < 90) return `about ${formatCount(seconds)} seconds left`;
  const minutes = Math.ceil(seconds / 60);
  if (minutes < 90) return `about ${formatCount(minutes)} minutes left`;
  return `about ${formatNoun(Math.ceil(minutes / 60), 'hour')} left`;
}

/** First seven characters of a content hash, as it is shown beside a revision. */
export const shortHash = (contentHash: string): string => contentHash.slice(0, 7);

/** [1, 2, 3] → "1–3"; [0, 2] → "0, 2". */
export function formatDimensions(dimensions: readonly number[]): string {
  const first = dimensions[0];
  const last = dimensions.at(-1);
  if (first === undefined || last === undefined) return 'none';
  const unbroken = last - first === dimensions.length - 1 && dimensions.length > 2;
  return unbroken ? `${first}–${last}` : dimensions.join(', ');
}

export const STATE_WORDS: Record<RunState, string> = {
  queued: 'waiting for a worker',
  running: 'computing',
  done: 'finished',
  failed: 'failed',
  stopped: 'stopped',
};

export const SCALE_WORDS: Record<RunBrief['scale'], string> = {
  entry: 'recorded entries',
  rank: 'arrival rank',
};
