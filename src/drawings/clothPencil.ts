import { select } from 'd3';
import type { Pair } from '../graphs/swapMatrix';
import { xAt } from './arrivalAxis';
import { arcPath, lozengePath, type ClothGeometry } from './clothGeometry';
import type { Inks } from './inks';

/** What is drawn over the cells: the selected pair, the cursor, and the cells inside a group. */
export interface ClothPencil {
  update(cloth: ClothGeometry, inks: Inks, selection: Pair | null, group: readonly number[]): void;
  point(pair: Pair | null): void;
  destroy(): void;
}

/** Groups with more members are outlined by their arrivals only. */
const MOST_OUTLINED = 80;

export function clothPencil(element: HTMLElement): ClothPencil {
  const svg = select(element).append('svg').attr('aria-hidden', 'true').attr('class', 'pencil');
  const group = svg.append('path').attr('class', 'group').attr('fill', 'none');
  const mark = (name: string) => {
    const g = svg.append('g').attr('class', name).attr('fill', 'none');
    const halo = g.append('path');
    return { g, halo, arc: g.append('path'), cell: g.append('path'), feet: g.append('path') };
  };
  const chosen = mark('chosen');
  const cursor = mark('cursor');
  let shown: { cloth: ClothGeometry; inks: Inks } | null = null;

  const put = ({ g, halo, arc, cell, feet }: typeof chosen, pair: Pair | null): void => {
    g.attr('display', pair === null || shown === null ? 'none' : null);
    if (pair === null || shown === null) return;
    const { cloth } = shown;
    arc.attr('d', arcPath(cloth, pair));
    const lozenge = lozengePath(cloth, pair, Math.max(1, 4 - cloth.axis.step / 4));
    cell.attr('d', lozenge);
    halo.attr('d', lozenge);
    const foot = (x: number): string => `M${x} ${cloth.base - 5}V${cloth.base}`;
    feet.attr('d', foot(xAt(cloth.axis, pair.p)) + foot(xAt(cloth.axis, pair.q)));
  };

  return {
    update(cloth, inks, selection, members) {
      shown = { cloth, inks };
      svg.attr('width', cloth.axis.width).attr('height', cloth.height);
      chosen.g.attr('stroke', inks.ink);
      chosen.arc.attr('stroke-width', 1.25);
      chosen.cell.attr('stroke-width', 1.75);
      chosen.feet.attr('stroke-width', 3);
      cursor.g.attr('stroke', inks.woad);
      cursor.arc.attr('stroke-width', 1.25).attr('stroke-dasharray', '4 3');
      cursor.cell.attr('stroke-width', 2);
      cursor.feet.attr('stroke-width', 3);
      for (const { halo } of [chosen, cursor]) {
        halo.attr('stroke', inks.cloth).attr('stroke-width', 4.5);
      }
      group.attr('stroke', inks.woad).attr('stroke-width', Math.min(1.5, cloth.axis.step / 9));
      group.attr('d', groupPath(cloth, members));
      put(chosen, selection);
    },
    point: (pair) => put(cursor, pair),
    destroy: () => svg.remove(),
  };
}

function groupPath(cloth: ClothGeometry, members: readonly number[]): string {
  if (members.length > MOST_OUTLINED) return '';
  const cells: string[] = [];
  for (const p of members) {
    for (const q of members) if (p < q) cells.push(lozengePath(cloth, { p, q }, -0.75));
  }
  return cells.join('');
}
