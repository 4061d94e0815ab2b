import type { ImportEstimate } from '#contract/imports';
import { formatNoun } from '../../composables/localeFormat';
import { cliqueWords, formatSpan, spanWords } from '../run/estimateWords';

/** What a full matrix of an import would need, in one line; null where there is no network yet. */
export function importEstimateWords(estimate: ImportEstimate): string | null {
  switch (estimate.state) {
    case 'none':
      return null;
    case 'waiting':
      return 'Counting cliques …';
    case 'failed':
      return estimate.message;
    case 'ready': {
      const { cliques, exact, pairs, seconds } = estimate;
      const present = cliques.filter((count) => count > 0);
      const counted = exact
        ? `Cliques: ${cliqueWords(cliques)}.`
        : `Cliques, at least: ${cliqueWords(present)}; counting was stopped there.`;
      const time = exact ? spanWords(estimate) : `more than ${formatSpan(seconds)} of one thread`;
      return `${counted} The full matrix, ${formatNoun(pairs, 'pair')} up to dimension ${estimate.maxDimension}, would take ${time}.`;
    }
  }
}
