import { computed, watch } from 'vue';
import type { Pair, SwapMatrix } from '../graphs/swapMatrix';
import { useBenchPairStore } from '../stores/benchPair';
import { useBenchRunStore } from '../stores/benchRun';

/**
 * Asks for the bars of the selected pair once its figures have landed, whether it was clicked or came
 * with the address. @param order node row at every arrival position.
 */
export function useBenchDetail(
  place: { readonly workspaceId: string; readonly runId: string },
  matrix: SwapMatrix,
  order: Uint32Array,
  selection: () => Pair | null,
): void {
  const pairs = useBenchPairStore();
  const runs = useBenchRunStore();
  const asked = computed(() => {
    void runs.landed;
    const pair = selection();
    return pair !== null && matrix.isKnown(pair.p, pair.q) ? `${pair.p} ${pair.q}` : '';
  });
  watch(
    asked,
    (key) => {
      const [p, q] = key.split(' ').map(Number);
      const rows: readonly [number, number] | null =
        key === '' || p === undefined || q === undefined ? null : [order[p] ?? 0, order[q] ?? 0];
      void pairs.choose(place.workspaceId, place.runId, rows);
    },
    { immediate: true },
  );
}
