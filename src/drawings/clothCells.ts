import { rgb } from 'd3';
import { pairIndex } from '../graphs/swapMatrix';
import { xAt } from './arrivalAxis';
import { weavePattern } from './canvasLayer';
import { LEFT_OUT, OPEN, WOVEN, type CellPaint } from './cellColours';
import { cellCentre, type ClothGeometry } from './clothGeometry';
import type { Inks } from './inks';

/** Narrower lozenges (CSS pixels) are painted as one turned image instead of one path each. */
const SMALLEST_PATH = 5;

/** Paints all cells of a cloth that are inside its window. */
export function paintCloth(
  context: CanvasRenderingContext2D,
  cloth: ClothGeometry,
  paint: CellPaint,
  inks: Inks,
): void {
  context.save();
  context.beginPath();
  context.rect(0, 0, cloth.axis.width, cloth.base);
  context.clip();
  if (cloth.axis.step >= SMALLEST_PATH) paintPaths(context, cloth, paint, inks);
  else paintImage(context, cloth, paint, inks);
  context.restore();
}

function addLozenge(path: Path2D, cloth: ClothGeometry, p: number, q: number, gap: number): void {
  const { x, y } = cellCentre(cloth, { p, q });
  const across = cloth.axis.step / 2 - gap;
  const up = cloth.rise - (gap * cloth.rise) / (cloth.axis.step / 2);
  path.moveTo(x - across, y);
  path.lineTo(x, y - up);
  path.lineTo(x + across, y);
  path.lineTo(x, y + up);
  path.closePath();
}

/** One path for each class of cells: a few hundred fills however many cells there are. */
function paintPaths(
  context: CanvasRenderingContext2D,
  cloth: ClothGeometry,
  paint: CellPaint,
  inks: Inks,
): void {
  const { axis } = cloth;
  const paths = new Map<number, Path2D>();
  const gap = axis.step > 9 ? 0.5 : 0.25;
  for (let p = 0; p < axis.nodeCount; p += 1) {
    for (let q = p + 1; q < axis.nodeCount; q += 1) {
      const middle = (p + q) / 2;
      if (middle < axis.from - 1 || middle > axis.to + 1) continue;
      const kind = paint.classes[pairIndex(axis.nodeCount, p, q)] ?? OPEN;
      let path = paths.get(kind);
      if (path === undefined) paths.set(kind, (path = new Path2D()));
      addLozenge(path, cloth, p, q, gapOf(kind, gap, axis.step));
    }
  }
  for (const [kind, path] of paths) {
    if (kind === LEFT_OUT) {
      context.fillStyle = inks.edge;
      context.fill(path);
    } else if (kind === OPEN) {
      context.strokeStyle = inks.hairline;
      context.lineWidth = 1;
      context.stroke(path);
    } else if (kind === WOVEN) {
      context.fillStyle = weavePattern(context, inks.thread, weaveInk(inks));
      context.fill(path);
    } else {
      context.fillStyle = paint.colours[kind - 1] ?? inks.edge;
      context.fill(path);
    }
  }
}

/** An open cell is a smaller outline; of a pair that is left out a knot stays, where no thread was laid. */
function gapOf(kind: number, gap: number, step: number): number {
  if (kind === LEFT_OUT) return step / 2 - Math.min(1.5, step / 6);
  return kind === OPEN ? gap + step * 0.12 : gap;
}

/** The second thread of the weave: a little off the first, towards the ground. */
export const weaveInk = (inks: Inks): string => (inks.dark ? '#313c4c' : '#f5f1e7');

/** Opacity where nothing is computed: lines for open cells, single knots for those left out. */
function sparse(kind: number, p: number, q: number): number {
  if (kind === OPEN) return (p % 4) * (q % 4) === 0 ? 90 : 0;
  return p % 4 === 0 && q % 4 === 0 ? 130 : 0;
}

/**
 * The n × n square as an image, turned so that rows and columns become the two slopes of the cloth.
 * The affine map sends column q, row p to the midpoint of the arrivals and their distance.
 */
function paintImage(
  context: CanvasRenderingContext2D,
  cloth: ClothGeometry,
  paint: CellPaint,
  inks: Inks,
): void {
  const n = cloth.axis.nodeCount;
  const sheet = document.createElement('canvas');
  sheet.width = n;
  sheet.height = n;
  const pen = sheet.getContext('2d');
  if (pen === null) return;
  const image = pen.createImageData(n, n);
  const thread = rgb(inks.thread);
  const weave = rgb(weaveInk(inks));
  const open = rgb(inks.edge);
  for (let p = 0; p < n; p += 1) {
    for (let q = p + 1; q < n; q += 1) {
      const kind = paint.classes[pairIndex(n, p, q)] ?? OPEN;
      const at = 4 * (p * n + q);
      if (kind > WOVEN) {
        for (let c = 0; c < 3; c += 1) image.data[at + c] = paint.bytes[3 * (kind - 1) + c] ?? 0;
        image.data[at + 3] = 255;
        continue;
      }
      const colour = kind < WOVEN ? open : (p + 2 * q) % 6 < 3 ? thread : weave;
      image.data[at] = colour.r;
      image.data[at + 1] = colour.g;
      image.data[at + 2] = colour.b;
      image.data[at + 3] = kind < WOVEN ? sparse(kind, p, q) : 255;
    }
  }
  pen.putImageData(image, 0, 0);
  const { step } = cloth.axis;
  context.transform(
    step / 2,
    -cloth.rise,
    step / 2,
    cloth.rise,
    xAt(cloth.axis, 0) - step / 2,
    cloth.base,
  );
  context.imageSmoothingEnabled = step * (window.devicePixelRatio || 1) < 3;
  context.imageSmoothingQuality = 'high';
  context.drawImage(sheet, 0, 0);
}
