import type { Dataset, RevisionSummary } from '#contract/datasets';

/** The revision with the highest number, whatever order they come in. */
export function latestRevision(dataset: Dataset): RevisionSummary | undefined {
  return dataset.revisions.reduce<RevisionSummary | undefined>(
    (latest, one) => (latest === undefined || one.number > latest.number ? one : latest),
    undefined,
  );
}
