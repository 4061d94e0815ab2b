import type { MeasureField } from '../graphs/measures';
import { pairAt, type Pair } from '../graphs/swapMatrix';
import { arcDistance, type ClothGeometry } from './clothGeometry';

/** Which arcs are shown. */
export interface ArcChoice {
  /** `safe`: pairs where nothing changes; `moved`: pairs at or above the threshold. */
  readonly show: 'safe' | 'moved';
  /** Least share of the ceiling of the measure, in (0, 1]; `moved` only. */
  readonly threshold: number;
  /** Only arcs with an end among these arrival positions, both ends for `within`; null for all. */
  readonly ends: { readonly positions: readonly number[]; readonly within: boolean } | null;
}

export interface ChosenArcs {
  /** Pair indices; strongest last for `moved`, longest first for `safe`. */
  readonly indices: Uint32Array;
  /** How many were chosen before the cut to `MOST_ARCS`. */
  readonly found: number;
}

/** More arcs than this cannot be told apart; the strongest, or the shortest safe ones, are kept. */
export const MOST_ARCS = 3000;

/** Chooses arcs. O(pairs log pairs) at worst. */
export function chooseArcs(field: MeasureField, nodeCount: number, choice: ArcChoice): ChosenArcs {
  const ends = choice.ends === null ? null : new Set(choice.ends.positions);
  const least = choice.threshold * field.ceiling;
  const chosen: number[] = [];
  field.values.forEach((value, index) => {
    const fits = choice.show === 'safe' ? value === 0 : value > 0 && value >= least;
    if (fits && (ends === null || touches(pairAt(nodeCount, index), ends, choice.ends?.within))) {
      chosen.push(index);
    }
  });
  const apart = (index: number): number => {
    const { p, q } = pairAt(nodeCount, index);
    return q - p;
  };
  if (choice.show === 'safe') chosen.sort((a, b) => apart(b) - apart(a) || a - b);
  else chosen.sort((a, b) => (field.values[a] ?? 0) - (field.values[b] ?? 0) || a - b);
  return { indices: Uint32Array.from(chosen.slice(-MOST_ARCS)), found: chosen.length };
}

function touches({ p, q }: Pair, ends: ReadonlySet<number>, within = false): boolean {
  return within ? ends.has(p) && ends.has(q) : ends.has(p) || ends.has(q);
}

/** The shown arc nearest to a point, at most `reach` pixels away. O(arcs). */
export function arcAtPoint(
  cloth: ClothGeometry,
  arcs: ChosenArcs,
  x: number,
  y: number,
  reach: number,
): Pair | null {
  let best: Pair | null = null;
  let nearest = reach;
  for (const index of arcs.indices) {
    const pair = pairAt(cloth.axis.nodeCount, index);
    const distance = arcDistance(cloth, pair, x, y);
    if (distance <= nearest) {
      nearest = distance;
      best = pair;
    }
  }
  return best;
}
