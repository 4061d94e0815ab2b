import { computed, type ComputedRef } from 'vue';
import { useRoute, useRouter } from 'vue-router';
import { readView, writeView, type BenchView } from './benchQuery';

export interface BenchViewState {
  readonly view: ComputedRef<BenchView>;
  /** Changes part of the view and the link with it; the page stays where it is. */
  readonly change: (part: Partial<BenchView>) => void;
}

/** The view of the bench, kept in the query of the address. */
export function useBenchView(nodeCount: () => number): BenchViewState {
  const route = useRoute();
  const router = useRouter();
  const view = computed(() => readView(route.query, nodeCount()));
  return {
    view,
    change(part) {
      void router.replace({ query: writeView({ ...view.value, ...part }), hash: route.hash });
    },
  };
}
