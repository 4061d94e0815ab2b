import { select } from 'd3';
import type { ImportGrowth } from '#contract/imports';
import { growthGeometry, type BettiSteps, type GrowthGeometry } from './growthGeometry';
import type { Inks } from './inks';

export interface GrowthScene {
  readonly growth: ImportGrowth;
  /** Empty until they are computed. */
  readonly betti: BettiSteps;
  readonly width: number;
  readonly inks: Inks;
  /** Arrival that the cursor is on, null for none. */
  readonly cursor: number | null;
}

export interface GrowthDrawing {
  readonly update: (scene: GrowthScene) => void;
  readonly destroy: () => void;
}

/** A growth before it is saved: nodes at their entries, the number of edges above, arcs below. */
export function drawGrowth(element: HTMLElement): GrowthDrawing {
  const svg = select(element).append('svg').attr('aria-hidden', 'true');
  const body = svg.append('g').attr('fill', 'none');
  const mark = svg.append('path');
  let drawn: GrowthScene | null = null;

  return {
    update(scene) {
      const { growth, betti, width, inks, cursor } = scene;
      const geometry = growthGeometry(growth, width, betti);
      const same = drawn?.growth === growth && drawn.betti === betti;
      if (!same || drawn?.width !== width || drawn.inks !== inks) {
        svg
          .attr('width', width)
          .attr('height', geometry.height)
          .attr('font-family', inks.font)
          .attr('font-size', 11);
        body.selectAll('*').remove();
        drawBody(body.node(), geometry, growth, inks);
      }
      drawn = scene;
      const at = cursor === null ? null : geometry.x[cursor];
      mark
        .attr(
          'd',
          at === null || at === undefined ? '' : `M${at} ${geometry.top - 6}V${geometry.base + 10}`,
        )
        .attr('stroke', inks.woad)
        .attr('stroke-width', 2);
    },
    destroy: () => svg.remove(),
  };
}

function drawBody(
  node: SVGGElement | null,
  geometry: GrowthGeometry,
  growth: ImportGrowth,
  inks: Inks,
): void {
  if (node === null) return;
  const g = select(node);
  const { base, left, right, top, x, curve, windows, arcs } = geometry;
  const path = (d: string, colour: string, width: number) =>
    g.append('path').attr('d', d).attr('stroke', colour).attr('stroke-width', width);
  path(arcs.join(''), inks.edge, 0.75).attr('stroke-opacity', 0.6);
  path(`M${left} ${base}H${right}`, inks.hairline, 1);
  path(
    windows.map(([from, to]) => `M${from} ${base + 12}H${Math.max(to, from + 1)}`).join(''),
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
  write('edges that are there', left, top - 10, 'start');
  write(`${growth.edgesBy.at(-1) ?? 0} in the end`, right, top - 10, 'end');
  for (const band of geometry.betti) {
    path(band.path, inks.ink, 1.25);
    path(`M${left} ${band.base}H${right}`, inks.hairline, 1);
    write(`Betti curve, dimension ${band.dimension}`, left, band.base - 38, 'start');
    write(`most ${band.most}`, right, band.base - 38, 'end');
  }
}
