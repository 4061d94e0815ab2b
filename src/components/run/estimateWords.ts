import type { RunEstimate } from '#contract/runs';
import { formatBytes, formatNoun } from '../../composables/localeFormat';

const SIZES = ['node', 'edge', 'triangle'];

/** "46 nodes, 108 edges, 52 triangles, 9 cliques of 4 nodes, none larger". */
export function cliqueWords(cliques: readonly number[]): string {
  const present = cliques.filter((count) => count > 0);
  const words = present.map((count, k) => {
    const known = SIZES[k];
    return known === undefined
      ? `${formatNoun(count, 'clique')} of ${k + 1} nodes`
      : formatNoun(count, known);
  });
  // A part of a clique is a clique: after the first size without any there is none.
  return [...words, ...(present.length < cliques.length ? ['none larger'] : [])].join(', ');
}

const digits = new Intl.NumberFormat(undefined, { maximumSignificantDigits: 2 });

/** Two digits, in the unit that suits: "0.38 s", "12 min", "3.5 h". @param seconds at least 0 */
export function formatSpan(seconds: number): string {
  if (seconds < 0.01) return `under ${digits.format(0.01)} s`;
  if (seconds < 90) return `${digits.format(seconds)} s`;
  if (seconds < 90 * 60) return `${digits.format(seconds / 60)} min`;
  return `${digits.format(seconds / 3600)} h`;
}

/** Seconds below which only the upper end is told: nobody plans by less, and starting up weighs most. */
const SHORT = 2;

/** What all pairs would take, with its range. */
export function spanWords({
  seconds,
  margin,
  startUp,
}: Pick<RunEstimate, 'seconds' | 'margin' | 'startUp'>): string {
  const most = seconds * margin + startUp;
  if (most < SHORT) return `under ${formatSpan(SHORT)} of one thread`;
  const range = `${formatSpan(seconds / margin)} to ${formatSpan(most)}`;
  return `about ${formatSpan(seconds)} of one thread (${range})`;
}

/** "about 12 min of one thread", "under 2 s of one thread". @param seconds at least 0 */
export const aboutSpan = (seconds: number): string =>
  seconds < SHORT
    ? `under ${formatSpan(SHORT)} of one thread`
    : `about ${formatSpan(seconds)} of one thread`;

/** What a run would need, in one line. */
export function estimateWords(estimate: RunEstimate): string {
  return [
    formatNoun(estimate.pairs, 'pair'),
    `Cliques: ${cliqueWords(estimate.cliques)}`,
    spanWords(estimate),
    `about ${formatBytes(estimate.bytes)} of memory`,
  ].join(' · ');
}
