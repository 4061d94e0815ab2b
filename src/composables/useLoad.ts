import { ref, shallowRef, watch, type WatchSource } from 'vue';
import { asProblem, type ApiProblem } from '../api/client';
import { useSignedOut } from './useSignedOut';

export type LoadState = 'loading' | 'ready' | 'failed';

/**
 * Fetches what a page shows, again whenever `sources` change.
 * @param fetchIt brings it into a store; its latest call decides, an earlier one that is slower is
 *   ignored.
 */
export function useLoad(sources: WatchSource[], fetchIt: () => Promise<unknown>) {
  const state = ref<LoadState>('loading');
  const problem = shallowRef<ApiProblem | null>(null);
  const signedOut = useSignedOut();
  let latest = 0;

  async function load(): Promise<void> {
    const turn = ++latest;
    state.value = 'loading';
    problem.value = null;
    try {
      await fetchIt();
      if (turn === latest) state.value = 'ready';
    } catch (error) {
      if (turn !== latest) return;
      problem.value = asProblem(error);
      state.value = 'failed';
      await signedOut(problem.value);
    }
  }

  watch(sources, load, { immediate: true });
  return { state, problem, load };
}
