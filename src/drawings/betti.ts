import { select, sum } from 'd3';
import type { WireBars } from '#contract/runs';
import type { Pair } from '../graphs/swapMatrix';
import { xOfValue, type ArrivalAxis } from './arrivalAxis';
import { bettiCurve, largestGap, stairs, type BettiCurve } from './bettiGeometry';
import type { Drawing } from './drawing';
import type { Inks } from './inks';
import { plumbLines } from './plumbLines';

export interface BettiBand {
  readonly dimension: number;
  readonly recorded: WireBars;
  /** Null without a swap. */
  readonly swapped: WireBars | null;
}

export interface BettiScene {
  readonly axis: ArrivalAxis;
  /** f by arrival position. */
  readonly values: Float64Array;
  readonly bands: readonly BettiBand[];
  readonly inks: Inks;
  readonly selection: Pair | null;
}

const HEADING = 20;
const CURVE = 52;
const GAP = 10;

/** Betti curves before and after, a band for each dimension with its own scale of counts. */
export function drawBetti(element: HTMLElement): Drawing<BettiScene> {
  const svg = select(element).append('svg').attr('aria-hidden', 'true');
  const lines = plumbLines(svg);
  const body = svg.append('g');
  let scene: BettiScene | null = null;

  return {
    update(next) {
      const stale =
        scene === null ||
        scene.axis !== next.axis ||
        scene.bands !== next.bands ||
        scene.inks !== next.inks;
      scene = next;
      if (stale) {
        const heights = next.bands.map(bandHeight);
        const height = Math.max(HEADING, sum(heights));
        svg
          .attr('width', next.axis.width)
          .attr('height', height)
          .attr('font-family', next.inks.font);
        element.style.height = `${height}px`;
        body.selectAll('*').remove();
        next.bands.forEach((band, index) =>
          drawBand(body.append('g').node(), band, sum(heights.slice(0, index)), next),
        );
        lines.update(next.axis, height, next.inks);
      }
      lines.select(next.selection);
    },
    point: (pair) => lines.point(pair),
    destroy: () => svg.remove(),
  };
}

const isEmpty = ({ recorded, swapped }: BettiBand): boolean =>
  recorded.length + (swapped?.length ?? 0) === 0;

/** A dimension without bars keeps its heading only. */
const bandHeight = (band: BettiBand): number => (isEmpty(band) ? HEADING : HEADING + CURVE + GAP);

function drawBand(node: SVGGElement | null, band: BettiBand, top: number, scene: BettiScene): void {
  if (node === null) return;
  const { axis, inks, values } = scene;
  const g = select(node).attr('fill', 'none');
  const before = bettiCurve(band.recorded);
  const after = band.swapped === null ? null : bettiCurve(band.swapped);
  const most = Math.max(1, ...before.counts, ...(after?.counts ?? []));
  const base = top + HEADING + CURVE;
  const x = (time: number): number => xOfValue(axis, values, time);
  const y = (count: number): number => base - (count / most) * CURVE;
  const ends = [axis.left, axis.right] as const;
  const write = (text: string, at: number, height: number, anchor: string, colour: string) =>
    g
      .append('text')
      .attr('x', at)
      .attr('y', height)
      .attr('text-anchor', anchor)
      .attr('font-size', 11)
      .attr('fill', colour)
      .text(text);
  const none = isEmpty(band) ? ' · no bars' : '';
  write(
    `Betti curve, dimension ${band.dimension}${none}`,
    axis.left,
    top + 13,
    'start',
    inks.quiet,
  );
  if (isEmpty(band)) return;
  const area = stairs(before, x, y, ends, true);
  g.append('path').attr('d', area).attr('fill', inks.hairline).attr('fill-opacity', 0.5);
  g.append('path').attr('d', `M${axis.left} ${base}H${axis.right}`).attr('stroke', inks.hairline);
  const line = (curve: BettiCurve, colour: string) =>
    g
      .append('path')
      .attr('d', stairs(curve, x, y, ends))
      .attr('stroke', colour)
      .attr('stroke-width', 1.5);
  if (after !== null) {
    // Even-odd fills exactly what lies between the two curves.
    g.append('path')
      .attr('d', area + stairs(after, x, y, ends, true))
      .attr('fill-rule', 'evenodd')
      .attr('fill', inks.madder)
      .attr('fill-opacity', 0.4);
    line(after, inks.madder);
  }
  line(before, inks.ink);
  if (after !== null) {
    const { gap, at } = largestGap(before, after);
    if (gap > 0) {
      const right = x(at) > (axis.left + axis.right) / 2;
      g.append('path')
        .attr('d', `M${x(at) + 0.5} ${top + HEADING - 4}V${base}`)
        .attr('stroke', inks.madder)
        .attr('stroke-dasharray', '1 3');
      write(
        `largest gap ${gap}`,
        x(at) + (right ? -6 : 6),
        top + 13,
        right ? 'end' : 'start',
        inks.madder,
      );
    }
  }
  write(
    `most ${Math.max(0, ...before.counts, ...(after?.counts ?? []))}`,
    axis.right,
    top + 13,
    'end',
    inks.quiet,
  );
}
