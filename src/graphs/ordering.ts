import { leewayByPosition } from './leeway';
import type { SwapMatrix } from './swapMatrix';

/** Orders in which the square form may lay its rows and columns. */
export const ORDERINGS = ['arrival', 'label', 'leeway', 'community'] as const;
export type Ordering = (typeof ORDERINGS)[number];

export interface OrderingInput {
  readonly matrix: SwapMatrix;
  readonly dimensions: readonly number[];
  /** Labels by arrival position. */
  readonly labels: readonly string[];
  /** Positions of every community. */
  readonly communities: readonly (readonly number[])[];
}

/**
 * @returns arrival positions in the order asked for. `leeway`: most first; `community`: largest first,
 * by arrival within one. Ties always fall back to arrival, so that the order is unique.
 */
export function orderingOf(ordering: Ordering, input: OrderingInput): Uint32Array {
  const n = input.matrix.nodeCount;
  const arrival = Uint32Array.from({ length: n }, (_, p) => p);
  switch (ordering) {
    case 'arrival':
      return arrival;
    case 'label': {
      const compare = new Intl.Collator(undefined, { numeric: true }).compare;
      return arrival.sort((a, b) => compare(input.labels[a] ?? '', input.labels[b] ?? '') || a - b);
    }
    case 'leeway': {
      const leeway = leewayByPosition(input.matrix, input.dimensions);
      return arrival.sort((a, b) => (leeway[b] ?? 0) - (leeway[a] ?? 0) || a - b);
    }
    case 'community': {
      const rank = new Uint32Array(n).fill(input.communities.length);
      input.communities.forEach((members, c) => members.forEach((p) => (rank[p] = c)));
      return arrival.sort((a, b) => (rank[a] ?? 0) - (rank[b] ?? 0) || a - b);
    }
  }
}
