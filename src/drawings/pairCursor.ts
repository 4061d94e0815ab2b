import type { Pair } from '../graphs/swapMatrix';

/**
 * Where a key takes the cursor: left and right move the earlier arrival, up and down the later one,
 * Home and End the whole pair to the ends of the axis. Stays at the edge.
 * @param by arrivals to move.
 * @returns null for a key that moves nothing.
 */
export function movePair(
  current: Pair | null,
  key: string,
  by: number,
  nodeCount: number,
): Pair | null {
  if (nodeCount < 2) return null;
  const { p, q } = current ?? { p: 0, q: 1 };
  const within = (value: number, least: number, most: number): number =>
    Math.min(most, Math.max(least, value));
  switch (key) {
    case 'ArrowLeft':
      return current && { p: within(p - by, 0, q - 1), q };
    case 'ArrowRight':
      return current ? { p: within(p + by, 0, q - 1), q } : { p, q };
    case 'ArrowUp':
      return current ? { p, q: within(q + by, p + 1, nodeCount - 1) } : { p, q };
    case 'ArrowDown':
      return current && { p, q: within(q - by, p + 1, nodeCount - 1) };
    case 'Home':
      return { p: 0, q: q - p };
    case 'End':
      return { p: nodeCount - 1 - (q - p), q: nodeCount - 1 };
    default:
      return null;
  }
}
