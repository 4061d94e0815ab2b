import { markRaw, ref, shallowRef } from 'vue';
import { defineStore } from 'pinia';
import type { PairDetail } from '#contract/runs';
import { asProblem, type ApiProblem } from '../api/client';
import { getPair } from '../api/runs';

/** Details kept, newest last; a run is immutable, so a kept detail never goes stale. */
const MOST_KEPT = 60;

/** The selected pair in full: both barcodes and the matching between them. */
export const useBenchPairStore = defineStore('benchPair', () => {
  const detail = shallowRef<PairDetail | null>(null);
  const loading = ref(false);
  const problem = shallowRef<ApiProblem | null>(null);
  const kept = new Map<string, PairDetail>();
  let controller = new AbortController();

  /** @param rows node rows of the two nodes; null clears. */
  async function choose(
    workspaceId: string,
    runId: string,
    rows: readonly [number, number] | null,
  ): Promise<void> {
    controller.abort();
    controller = new AbortController();
    const { signal } = controller;
    problem.value = null;
    loading.value = false;
    if (rows === null) {
      detail.value = null;
      return;
    }
    const key = `${runId} ${rows.join(' ')}`;
    const known = kept.get(key);
    if (known !== undefined) {
      detail.value = known;
      return;
    }
    loading.value = true;
    try {
      const found = markRaw(await getPair(workspaceId, runId, rows[0], rows[1], signal));
      if (signal.aborted) return;
      kept.set(key, found);
      const oldest = kept.keys().next();
      if (kept.size > MOST_KEPT && oldest.done !== true) kept.delete(oldest.value);
      detail.value = found;
    } catch (error) {
      if (signal.aborted) return;
      detail.value = null;
      problem.value = asProblem(error);
    } finally {
      if (!signal.aborted) loading.value = false;
    }
  }

  return { detail, loading, problem, choose };
});
