import { bettiCurve } from '../../drawings/bettiGeometry';
import { OPEN, paintCells, WOVEN } from '../../drawings/cellColours';
import type { Inks } from '../../drawings/inks';
import { dimensionColour } from '../../drawings/ramp';
import { firstPositionAt } from '../../graphs/filtration';
import type { MeasureField } from '../../graphs/measures';
import type { Swatch } from '../../stores/swatches';

/** Size of a thumbnail in CSS pixels. */
export const SWATCH = { width: 120, height: 84 } as const;

const MARGIN = 5;
/** y of the arrival axis; the cloth stands on it, the Betti curves hang below. */
const AXIS = 58;
const CURVES = 20;

/** Draws the cloth of a run over its Betti curves. The canvas keeps nothing of an earlier drawing. */
export function drawSwatch(canvas: HTMLCanvasElement, swatch: Swatch, inks: Inks): void {
  const ratio = window.devicePixelRatio;
  canvas.width = Math.round(SWATCH.width * ratio);
  canvas.height = Math.round(SWATCH.height * ratio);
  const pencil = canvas.getContext('2d');
  if (pencil === null) return;
  pencil.scale(ratio, ratio);
  const step = (SWATCH.width - 2 * MARGIN) / swatch.nodeCount;
  if (swatch.field) drawCloth(pencil, swatch.field, swatch.nodeCount, step, inks);
  drawAxis(pencil, swatch.nodeCount, step, inks);
  drawCurves(pencil, swatch, step, inks);
}

const xOf = (position: number, step: number): number => MARGIN + (position + 0.5) * step;

function drawCloth(
  pencil: CanvasRenderingContext2D,
  field: MeasureField,
  nodeCount: number,
  step: number,
  inks: Inks,
): void {
  const { classes, colours } = paintCells(field, inks.dark);
  const rise = Math.min(step / 2, (AXIS - MARGIN) / nodeCount);
  let index = 0;
  for (let p = 0; p < nodeCount; p += 1) {
    for (let q = p + 1; q < nodeCount; q += 1, index += 1) {
      const paint = classes[index] ?? OPEN;
      if (paint < WOVEN) continue;
      const x = xOf((p + q) / 2, step);
      const y = AXIS - (q - p) * rise;
      pencil.fillStyle = paint === WOVEN ? inks.thread : (colours[paint - 1] ?? inks.thread);
      pencil.beginPath();
      pencil.moveTo(x - step / 2, y);
      pencil.lineTo(x, y - rise);
      pencil.lineTo(x + step / 2, y);
      pencil.lineTo(x, y + rise);
      pencil.fill();
    }
  }
}

function drawAxis(
  pencil: CanvasRenderingContext2D,
  nodeCount: number,
  step: number,
  inks: Inks,
): void {
  pencil.fillStyle = inks.quiet;
  pencil.fillRect(MARGIN, AXIS, SWATCH.width - 2 * MARGIN, 1);
  // Ticks closer than two pixels would merge into a bar.
  if (step < 2) return;
  for (let p = 0; p < nodeCount; p += 1) pencil.fillRect(xOf(p, step) - 0.25, AXIS - 1, 0.5, 3);
}

function drawCurves(
  pencil: CanvasRenderingContext2D,
  { values, dimensions, bars, nodeCount }: Swatch,
  step: number,
  inks: Inks,
): void {
  const shown = dimensions.filter((dimension) => dimension > 0);
  const curves = shown.map((dimension) => ({ dimension, ...bettiCurve(bars[dimension] ?? []) }));
  const most = Math.max(1, ...curves.flatMap((curve) => curve.counts));
  const ground = AXIS + 4 + CURVES;
  pencil.lineWidth = 1;
  for (const { dimension, times, counts } of curves) {
    if (counts.length === 0) continue;
    pencil.strokeStyle = dimensionColour(dimension, inks.dark);
    pencil.beginPath();
    pencil.moveTo(MARGIN, ground);
    let y = ground;
    times.forEach((time, i) => {
      const x = xOf(firstPositionAt(values, time), step);
      pencil.lineTo(x, y);
      y = ground - (CURVES * (counts[i] ?? 0)) / most;
      pencil.lineTo(x, y);
    });
    pencil.lineTo(xOf(nodeCount - 0.5, step), y);
    pencil.stroke();
  }
}
