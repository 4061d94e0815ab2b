import { ref, shallowRef } from 'vue';
import type { PairEvents } from '../drawings/drawing';
import type { Pair } from '../graphs/swapMatrix';
import type { BenchViewState } from './benchView';

/** The one cursor of all drawings, and what the keyboard's moves say aloud. */
export function useBenchCursor(
  change: BenchViewState['change'],
  describe: (pair: Pair) => readonly string[],
) {
  const pointers = new Set<(pair: Pair | null) => void>();
  const spoken = ref('');
  const cursor = shallowRef<Pair | null>(null);
  /** Arrival positions of the cycle that is looked at. */
  const traced = shallowRef<readonly number[]>([]);
  const events: PairEvents = {
    onPoint(pair, keyboard) {
      const same = pair?.p === cursor.value?.p && pair?.q === cursor.value?.q;
      if (!same) {
        cursor.value = pair;
        for (const point of pointers) point(pair);
      }
      if (keyboard) spoken.value = pair === null ? 'Nothing selected.' : describe(pair).join('. ');
    },
    onSelect(pair) {
      change({ pair, ...(pair === null ? {} : { face: 'pair' as const }) });
      if (pair !== null) spoken.value = `Selected. ${describe(pair).join('. ')}`;
    },
  };
  return { pointers, spoken, events, traced };
}
