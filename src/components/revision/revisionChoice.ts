import { computed, ref, watch } from 'vue';
import type { RevisionSummary } from '#contract/datasets';
import { shortHash } from '../../composables/localeFormat';

/** A choice among the revisions of a dataset; it moves on to one that is new. */
export function useRevisionChoice(revisions: () => readonly RevisionSummary[]) {
  const newestFirst = computed(() => [...revisions()].sort((a, b) => b.number - a.number));
  const newest = computed(() => newestFirst.value[0]?.id ?? '');
  const options = computed(() =>
    newestFirst.value.map((one) => ({
      value: one.id,
      label: `revision ${one.number} · ${shortHash(one.contentHash)}`,
    })),
  );
  const revisionId = ref(newest.value);
  watch(newest, (id) => {
    revisionId.value = id;
  });
  return { revisionId, options };
}
