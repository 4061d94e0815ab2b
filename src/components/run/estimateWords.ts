import type { RunEstimate } from '#contract/runs';
import { formatBytes, formatNoun } from '../../composables/localeFormat';

const SIZES = ['node', 'edge', 'triangle'];

/** "46 nodes, 108 edges, 52 triangles, 9 cliques of 4 nodes". */
export function cliqueWords(cliques: readonly number[]): string {
  return cliques
    .map((count, k) => {
      const known = SIZES[k];
      return known === undefined
        ? `${formatNoun(count, 'clique')} of ${k + 1} nodes`
        : formatNoun(count, known);
    })
    .join(', ');
}

const digits = new Intl.NumberFormat(undefined, { maximumSignificantDigits: 2 });

/** Two digits, in the unit that suits: "0.38 s", "12 min", "3.5 h". @param seconds at least 0 */
export function formatSpan(seconds: number): string {
  if (seconds < 0.01) return `under ${digits.format(0.01)} s`;
  if (seconds < 90) return `${digits.format(seconds)} s`;
  if (seconds < 90 * 60) return `${digits.format(seconds / 60)} min`;
  return `${digits.format(seconds / 3600)} h`;
}

/** What a run would need, in one line. */
export function estimateWords({ cliques, seconds, margin, bytes }: RunEstimate): string {
  const range = `${formatSpan(seconds / margin)} to ${formatSpan(seconds * margin)}`;
  return [
    `Cliques: ${cliqueWords(cliques)}`,
    `about ${formatSpan(seconds)} of one thread (${range})`,
    `about ${formatBytes(bytes)} of memory`,
  ].join(' · ');
}
