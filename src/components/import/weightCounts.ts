import type { ImportChoices } from '#contract/importChoices';
import type { ImportWeights } from '#contract/imports';
import { formatCount, formatNoun } from '../../composables/localeFormat';

type Weights = ImportWeights['weights'];

/** Edges that a threshold or a share keeps; null while unknown. Between steps, an upper bound. */
export function edgesKept(
  weights: Weights,
  kind: ImportChoices['weights']['kind'],
  value: number,
): number | null {
  if (weights === null || !Number.isFinite(value)) return null;
  if (kind === 'all') return weights.edges;
  if (kind === 'threshold') {
    // The steps rise: the first that is not below the threshold has as many edges as it, or more.
    return weights.steps.find(({ least }) => least >= value)?.edges ?? 0;
  }
  const wanted = (value * weights.nodes * (weights.nodes - 1)) / 2;
  return Math.min(weights.edges - weights.withoutWeight, Math.floor(wanted));
}

/** What the live count says. */
export function weightWords(weights: Weights, kept: number | null): string {
  if (weights === null || kept === null) return 'Counting the edges …';
  const about = weights.complete ? '' : 'about ';
  const without =
    weights.withoutWeight > 0 ? `; ${formatCount(weights.withoutWeight)} have no weight` : '';
  return `Keeps ${about}${formatCount(kept)} of ${formatNoun(weights.edges, 'edge')}${without}.`;
}

/** A threshold to begin with: the middle of the weights. */
export const thresholdFor = (weights: Weights): number =>
  weights?.steps[Math.floor(weights.steps.length / 2)]?.least ?? 0;
