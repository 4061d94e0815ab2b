import { watch } from 'vue';
import type { RunFocusRequest } from '#contract/runs';
import { useBenchRunStore } from '../stores/benchRun';
import type { BenchView } from './benchQuery';

/** Milliseconds without another choice after which one is told: a cursor passes many pairs. */
const SETTLE = 250;

/** What a view looks at: the chosen pair or node, else the window of arrivals; null for the whole. */
export function focusOfView(
  { face, pair, node, window }: BenchView,
  order: Uint32Array,
): RunFocusRequest | null {
  const rowOf = (p: number): number => order[p] ?? 0;
  if (pair !== null && (face !== 'node' || node === null)) {
    return { kind: 'pair', a: rowOf(pair.p), b: rowOf(pair.q) };
  }
  if (node !== null) return { kind: 'node', row: rowOf(node) };
  if (window === null) return null;
  const from = Math.max(0, Math.round(window[0] + 0.5));
  const to = Math.min(order.length - 1, Math.round(window[1] - 0.5));
  return from < to ? { kind: 'window', from, to } : null;
}

/** While the run goes, what the reader looks at is computed first. */
export function useBenchFocus(
  workspaceId: string,
  view: () => BenchView,
  order: Uint32Array,
  ended: () => boolean,
): void {
  const store = useBenchRunStore();
  const looked = (): string => (ended() ? '' : JSON.stringify(focusOfView(view(), order)));
  watch(
    looked,
    (text, _before, onCleanup) => {
      const focus = ended() ? null : focusOfView(view(), order);
      if (text === '' || focus === null) return;
      const timer = setTimeout(() => void store.focus(workspaceId, focus), SETTLE);
      onCleanup(() => clearTimeout(timer));
    },
    { immediate: true },
  );
}
