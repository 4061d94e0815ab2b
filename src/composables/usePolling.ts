import { onBeforeUnmount, watch } from 'vue';

/** Milliseconds between two looks. */
const PAUSE = 1_000;

/** Looks again every second while `waiting` holds and the component is there. */
export function usePolling(waiting: () => boolean, look: () => Promise<unknown>): void {
  let timer: ReturnType<typeof setTimeout> | undefined;
  let gone = false;
  const next = (): void => {
    clearTimeout(timer);
    if (!waiting() || gone) return;
    timer = setTimeout(() => void look().finally(next), PAUSE);
  };
  watch(waiting, next, { immediate: true });
  onBeforeUnmount(() => {
    gone = true;
    clearTimeout(timer);
  });
}
