import type { Selection } from 'd3';
import type { Pair } from '../graphs/swapMatrix';
import { xAt, type ArrivalAxis } from './arrivalAxis';
import type { Inks } from './inks';

/** Vertical lines under the two arrivals of the selected pair and of the cursor. */
export interface PlumbLines {
  update(axis: ArrivalAxis, height: number, inks: Inks): void;
  select(pair: Pair | null): void;
  point(pair: Pair | null): void;
}

export function plumbLines(svg: Selection<SVGSVGElement, unknown, null, undefined>): PlumbLines {
  const chosen = svg.append('path').attr('fill', 'none').attr('opacity', 0.35);
  const cursor = svg.append('path').attr('fill', 'none').attr('stroke-dasharray', '3 3');
  let shown: { axis: ArrivalAxis; height: number } | null = null;
  const path = (pair: Pair | null): string => {
    if (pair === null || shown === null) return '';
    const { axis, height } = shown;
    return [pair.p, pair.q].map((p) => `M${xAt(axis, p)} 0V${height}`).join('');
  };
  return {
    update(axis, height, inks) {
      shown = { axis, height };
      chosen.attr('stroke', inks.ink);
      cursor.attr('stroke', inks.woad);
    },
    select: (pair) => chosen.attr('d', path(pair)),
    point: (pair) => cursor.attr('d', path(pair)),
  };
}
