import { select } from 'd3';
import type { Pair } from '../graphs/swapMatrix';
import { xOfValue, type ArrivalAxis } from './arrivalAxis';
import { barWords, dimensionTitle, type Amount, type Bar } from './barWords';
import {
  namedRows,
  placeBands,
  type BarBand,
  type PlacedBand,
  type PlacedRow,
} from './barcodeGeometry';
import type { Drawing } from './drawing';
import type { Inks } from './inks';
import { plumbLines } from './plumbLines';

export interface BarcodeScene {
  readonly axis: ArrivalAxis;
  /** f by arrival position. */
  readonly values: Float64Array;
  readonly bands: readonly BarBand[];
  readonly inks: Inks;
  readonly selection: Pair | null;
  readonly amount: Amount;
}

/** Rough width of a letter of the 11 px labels; decides on which side of a bar its words stand. */
const LETTER = 6.2;

/** The barcode under the axis: unchanged bars quiet, moved bars in two inks joined to where they went. */
export function drawBarcode(element: HTMLElement): Drawing<BarcodeScene> {
  const svg = select(element).append('svg').attr('aria-hidden', 'true');
  const lines = plumbLines(svg);
  const body = svg.append('g');
  let scene: BarcodeScene | null = null;

  function draw(next: BarcodeScene): number {
    const { bands, height } = placeBands(next.bands);
    svg.attr('width', next.axis.width).attr('height', height).attr('font-family', next.inks.font);
    element.style.height = `${height}px`;
    body.selectAll('*').remove();
    for (const band of bands) drawBand(body.append('g').node(), band, next);
    return height;
  }

  return {
    update(next) {
      const stale =
        scene === null ||
        scene.axis !== next.axis ||
        scene.bands !== next.bands ||
        scene.inks !== next.inks;
      scene = next;
      if (stale) {
        const height = draw(next);
        lines.update(next.axis, height, next.inks);
      }
      lines.select(next.selection);
    },
    point: (pair) => lines.point(pair),
    destroy: () => svg.remove(),
  };
}

function drawBand(node: SVGGElement | null, band: PlacedBand, scene: BarcodeScene): void {
  if (node === null) return;
  const { inks, axis } = scene;
  const g = select(node);
  const note = noteOf(band);
  g.append('text')
    .attr('x', axis.left)
    .attr('y', band.top + 13)
    .attr('font-size', 11)
    .attr('fill', inks.quiet)
    .text(dimensionTitle(band.band.dimension) + note);
  const swap = band.band.distance !== null;
  const quiet = band.rows.filter((row) => !row.moved);
  const thickness = Math.max(1.2, Math.min(4, (quiet[0]?.height ?? 8) * 0.55));
  g.append('path')
    .attr('d', quiet.map((row) => barPath(scene, row.recorded, row.y)).join(''))
    .attr('stroke', swap ? inks.edge : inks.ink)
    .attr('stroke-opacity', swap ? 0.5 : 0.8)
    .attr('stroke-width', thickness);
  const named = namedRows(band.rows);
  for (const row of band.rows) {
    if (row.moved) drawMoved(g.append('g').node(), row, named.has(row), scene);
  }
}

function noteOf({ rows, leftOut, movedLeftOut }: PlacedBand): string {
  if (rows.length === 0) return ' · none';
  const parts = [
    movedLeftOut > 0 ? `${movedLeftOut} moved bars that cost less` : '',
    leftOut > 0 ? `${leftOut} shorter unchanged bars` : '',
  ].filter((part) => part !== '');
  return parts.length === 0 ? '' : ` · not drawn, in the table: ${parts.join(', ')}`;
}

function barPath(scene: BarcodeScene, bar: Bar | null, y: number): string {
  if (bar === null) return '';
  const from = xOfValue(scene.axis, scene.values, bar.birth);
  const to = xOfValue(scene.axis, scene.values, bar.death);
  const arrow = bar.death === Infinity ? `M${to - 4} ${y - 3}L${to} ${y}L${to - 4} ${y + 3}` : '';
  return `M${from} ${y}H${to}${arrow}`;
}

function drawMoved(
  node: SVGGElement | null,
  row: PlacedRow,
  named: boolean,
  scene: BarcodeScene,
): void {
  if (node === null) return;
  const { inks, axis, values } = scene;
  const g = select(node).attr('fill', 'none');
  const apart = Math.min(3, row.height / 4);
  const above = row.y - apart;
  const below = row.y + apart;
  const width = row.realising ? 2.6 : 1.8;
  g.append('path')
    .attr('d', barPath(scene, row.recorded, above))
    .attr('stroke', inks.ink)
    .attr('stroke-width', width);
  g.append('path')
    .attr('d', barPath(scene, row.swapped, below))
    .attr('stroke', inks.madder)
    .attr('stroke-width', width);
  g.append('path')
    .attr('d', joints(scene, row, above, below))
    .attr('stroke', inks.madder)
    .attr('stroke-dasharray', '2 2');
  if (!named) return;
  const words =
    barWords(row.recorded, row.swapped, scene.amount) +
    (row.realising ? ' · makes the distance' : '');
  const ends = [row.recorded, row.swapped].flatMap((bar) =>
    bar === null ? [] : [xOfValue(axis, values, bar.birth), xOfValue(axis, values, bar.death)],
  );
  const first = Math.min(...ends) - 8;
  const last = Math.max(...ends) + 8;
  const room = words.length * LETTER;
  const place = wordPlace(axis, first, last, room);
  g.append('text')
    .attr('x', place.x)
    .attr('text-anchor', place.anchor)
    .attr('stroke', inks.ground)
    .attr('stroke-width', 4)
    .attr('stroke-linejoin', 'round')
    .attr('paint-order', 'stroke')
    .attr('y', row.y + 4)
    .attr('font-size', 11)
    .attr('font-weight', row.realising ? 650 : 500)
    .attr('fill', inks.madder)
    .text(words);
}

/** Words stand before a bar if there is room, else behind it, else over it from the left edge. */
function wordPlace(
  axis: ArrivalAxis,
  first: number,
  last: number,
  room: number,
): { readonly x: number; readonly anchor: 'start' | 'end' } {
  if (first - room >= axis.left) return { x: first, anchor: 'end' };
  if (last + room <= axis.right) return { x: last, anchor: 'start' };
  return { x: axis.left, anchor: 'start' };
}

/** Dotted joints between the ends that moved; a bar of one side only is joined to its own middle. */
function joints(scene: BarcodeScene, row: PlacedRow, above: number, below: number): string {
  const x = (value: number): number => xOfValue(scene.axis, scene.values, value);
  const { recorded, swapped } = row;
  const one = recorded ?? swapped;
  if (one === null) return '';
  if (recorded === null || swapped === null) {
    const middle = (x(one.birth) + x(one.death)) / 2;
    return `M${middle} ${above}V${below}`;
  }
  const joint = (a: number, b: number): string =>
    a === b ? '' : `M${x(a)} ${above}L${x(b)} ${below}`;
  return joint(recorded.birth, swapped.birth) + joint(recorded.death, swapped.death);
}
