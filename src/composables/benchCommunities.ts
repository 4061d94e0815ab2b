import { onBeforeUnmount, shallowRef, watch, type ShallowRef } from 'vue';
import type { CommunitiesAnswer, CommunitiesQuestion } from '../graphs/communities.worker';

/**
 * Communities of the swap-safe graph, found off the page's thread.
 * @param question null while there is nothing to ask.
 * @returns null until the answer to the newest question is there.
 */
export function useBenchCommunities(
  question: () => CommunitiesQuestion | null,
): ShallowRef<CommunitiesAnswer | null> {
  const answer = shallowRef<CommunitiesAnswer | null>(null);
  let worker: Worker | null = null;
  const stop = (): void => {
    worker?.terminate();
    worker = null;
  };
  watch(
    question,
    (asked) => {
      stop();
      answer.value = null;
      if (asked === null) return;
      worker = new Worker(new URL('../graphs/communities.worker.ts', import.meta.url), {
        type: 'module',
      });
      worker.addEventListener('message', (event: MessageEvent<CommunitiesAnswer>) => {
        answer.value = event.data;
        stop();
      });
      worker.postMessage(asked);
    },
    { immediate: true },
  );
  onBeforeUnmount(stop);
  return answer;
}
