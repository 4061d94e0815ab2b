import type { Pair } from '../graphs/swapMatrix';
import { movePair } from './pairCursor';
import type { PairEvents } from './drawing';

/** How a surface finds pairs. */
export interface PairSurface {
  /** The pair at a point of the element, in CSS pixels. */
  locate(x: number, y: number): Pair | null;
  nodeCount(): number;
  /** Where the keyboard stands: the cursor, else the selection. */
  current(): Pair | null;
}

/**
 * Pointer and keyboard of a drawing of pairs: hover or touch moves the cursor, a click or Enter
 * selects, arrows move along the two arrivals, Escape clears.
 * @returns takes the listeners off again.
 */
export function listenToPairs(
  element: HTMLElement,
  surface: PairSurface,
  events: PairEvents,
): () => void {
  const controller = new AbortController();
  const { signal } = controller;
  const at = (event: PointerEvent | MouseEvent): Pair | null => {
    const box = element.getBoundingClientRect();
    return surface.locate(event.clientX - box.left, event.clientY - box.top);
  };
  element.addEventListener('pointermove', (event) => events.onPoint(at(event), false), { signal });
  element.addEventListener(
    'pointerleave',
    (event) => {
      if (event.pointerType === 'mouse') events.onPoint(null, false);
    },
    { signal },
  );
  element.addEventListener(
    'click',
    (event) => {
      const pair = at(event);
      if (pair !== null) events.onSelect(pair);
    },
    { signal },
  );
  element.addEventListener(
    'keydown',
    (event) => {
      if (event.altKey || event.ctrlKey || event.metaKey) return;
      const current = surface.current();
      if (event.key === 'Escape') {
        events.onPoint(null, true);
        events.onSelect(null);
      } else if (event.key === 'Enter' || event.key === ' ') {
        if (current !== null) events.onSelect(current);
      } else {
        const moved = movePair(current, event.key, event.shiftKey ? 10 : 1, surface.nodeCount());
        if (moved === null) return;
        events.onPoint(moved, true);
      }
      event.preventDefault();
      event.stopPropagation();
    },
    { signal },
  );
  return () => controller.abort();
}
