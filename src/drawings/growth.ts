import { select } from 'd3';
import type { ImportGrowth } from '#contract/imports';
import {
  arrivalNear,
  growthGeometry,
  type BettiSteps,
  type GrowthGeometry,
} from './growthGeometry';
import type { Inks } from './inks';

export interface GrowthScene {
  readonly growth: ImportGrowth;
  /** Empty until they are computed. */
  readonly betti: BettiSteps;
  readonly width: number;
  readonly inks: Inks;
  /** Arrival that the cursor is on, null for none. */
  readonly cursor: number | null;
  /** A value of the entry unit in words. */
  readonly words: (value: number) => string;
}

export interface GrowthDrawing {
  readonly update: (scene: GrowthScene) => void;
  /** The arrival that stands nearest to a pixel from the left; null before the first update. */
  readonly arrivalAt: (x: number) => number | null;
  readonly destroy: () => void;
}

/** A growth before it is saved: nodes at their entries, the number of edges above, arcs below. */
export function drawGrowth(element: HTMLElement): GrowthDrawing {
  const svg = select(element).append('svg').attr('aria-hidden', 'true');
  const body = svg.append('g').attr('fill', 'none');
  const mark = svg.append('path');
  let drawn: GrowthScene | null = null;
  let geometry: GrowthGeometry | null = null;

  return {
    update(scene) {
      const { growth, betti, width, inks, cursor } = scene;
      const same = drawn?.growth === growth && drawn.betti === betti && drawn.width === width;
      const now = geometry !== null && same ? geometry : growthGeometry(growth, width, betti);
      if (now !== geometry || drawn?.inks !== inks) {
        svg
          .attr('width', width)
          .attr('height', now.height)
          .attr('font-family', inks.font)
          .attr('font-size', 11);
        body.selectAll('*').remove();
        drawBody(body.node(), now, scene);
      }
      drawn = scene;
      geometry = now;
      const at = cursor === null ? undefined : now.x[cursor];
      mark
        .attr('d', at === undefined ? '' : `M${at} ${now.top - 6}V${now.height}`)
        .attr('stroke', inks.woad)
        .attr('stroke-width', 2);
    },
    arrivalAt: (x) => geometry && arrivalNear(geometry.x, x),
    destroy: () => svg.remove(),
  };
}

function drawBody(
  node: SVGGElement | null,
  geometry: GrowthGeometry,
  { growth, inks, words }: GrowthScene,
): void {
  if (node === null) return;
  const g = select(node);
  const { base, left, right, top, x, curve, windows, arcs } = geometry;
  const path = (d: string, colour: string, width: number) =>
    g.append('path').attr('d', d).attr('stroke', colour).attr('stroke-width', width);
  path(arcs.join(''), inks.edge, 0.75).attr('stroke-opacity', 0.6);
  path(`M${left} ${base}H${right}`, inks.hairline, 1);
  path(
    windows.map(({ from, to, y }) => `M${from} ${y}H${Math.max(to, from + 1)}`).join(''),
    inks.weld,
    2,
  );
  path(curve, inks.woad, 1.5);
  path(Array.from(x, (at) => `M${at} ${base}v7`).join(''), inks.ink, 1);
  const write = (text: string, at: number, y: number, anchor: string) =>
    g
      .append('text')
      .attr('x', at)
      .attr('y', y)
      .attr('text-anchor', anchor)
      .attr('fill', inks.quiet)
      .text(text);
  for (const tick of geometry.ticks) {
    write(words(tick.value), tick.wordsX, geometry.words, 'middle');
    path(`M${tick.x} ${base}V${geometry.words - 11}`, inks.hairline, 1).lower();
  }
  write('edges that are there', left, top - 10, 'start');
  write(`${growth.edgesBy.at(-1) ?? 0} in the end`, right, top - 10, 'end');
  for (const band of geometry.betti) {
    path(band.path, inks.ink, 1.25);
    path(`M${left} ${band.base}H${right}`, inks.hairline, 1);
    write(`Betti curve, dimension ${band.dimension}`, left, band.base - 40, 'start');
    write(`most ${band.most}`, right, band.base - 40, 'end');
  }
}
