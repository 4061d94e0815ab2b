import { rgb } from 'd3';
import { weaveInk } from './clothCells';
import { LEFT_OUT, WOVEN, type CellPaint } from './cellColours';
import type { Inks } from './inks';
import type { SquareGeometry } from './squareGeometry';

interface Cell {
  readonly paint: CellPaint;
  readonly kind: number;
}

/**
 * Paints the cells as an n × n image, the diagonal left open, and the names where they fit.
 * @param cellOf null on the diagonal.
 */
export function paintSquare(
  context: CanvasRenderingContext2D,
  square: SquareGeometry,
  scene: { readonly labels: readonly string[]; readonly inks: Inks },
  cellOf: (row: number, column: number) => Cell | null,
): void {
  const n = square.order.length;
  const sheet = document.createElement('canvas');
  sheet.width = n;
  sheet.height = n;
  const pen = sheet.getContext('2d');
  if (pen === null || n === 0) return;
  const image = pen.createImageData(n, n);
  const knots: [row: number, column: number][] = [];
  const threads = [rgb(scene.inks.thread), rgb(weaveInk(scene.inks))] as const;
  for (let row = 0; row < n; row += 1) {
    for (let column = 0; column < n; column += 1) {
      const cell = cellOf(row, column);
      if (cell === null) continue;
      if (cell.kind === LEFT_OUT) {
        knots.push([row, column]);
        continue;
      }
      const at = 4 * (row * n + column);
      const thread = threads[(row + column) % 2 === 0 ? 0 : 1];
      const from = 3 * (cell.kind - 1);
      if (cell.kind > WOVEN) image.data.set(cell.paint.bytes.subarray(from, from + 3), at);
      else image.data.set([thread.r, thread.g, thread.b], at);
      image.data[at + 3] = cell.kind >= WOVEN ? 255 : (row + column) % 2 === 0 ? 110 : 0;
    }
  }
  pen.putImageData(image, 0, 0);
  context.imageSmoothingEnabled = false;
  context.drawImage(sheet, square.left, square.top, square.size, square.size);
  tieKnots(context, square, knots, scene.inks);
  rule(context, square, scene.inks);
  if (square.named) nameSquare(context, square, scene.labels, scene.inks);
}

/** Least pixels between two knots. */
const KNOTS_APART = 6;

/** Of a cell that is left out a knot stays, as on the cloth; where cells are small, of some of them. */
function tieKnots(
  context: CanvasRenderingContext2D,
  { left, top, cell }: SquareGeometry,
  knots: readonly (readonly [row: number, column: number])[],
  inks: Inks,
): void {
  const every = Math.max(1, Math.ceil(KNOTS_APART / cell));
  context.fillStyle = inks.edge;
  for (const [row, column] of knots) {
    if (row % every !== 0 || column % every !== 0) continue;
    const [x, y] = [left + (column + 0.5) * cell, top + (row + 0.5) * cell];
    context.fillRect(x - 0.75, y - 0.75, 1.5, 1.5);
  }
}

/** Gaps between the cells, and the frame. */
function rule(context: CanvasRenderingContext2D, square: SquareGeometry, inks: Inks): void {
  const { left, top, size, cell } = square;
  if (cell >= 5) {
    context.strokeStyle = inks.ground;
    context.lineWidth = 1;
    context.beginPath();
    for (let i = 1; i < square.order.length; i += 1) {
      context.moveTo(left + i * cell, top);
      context.lineTo(left + i * cell, top + size);
      context.moveTo(left, top + i * cell);
      context.lineTo(left + size, top + i * cell);
    }
    context.stroke();
  }
  context.strokeStyle = inks.edge;
  context.strokeRect(left - 0.5, top - 0.5, size + 1, size + 1);
}

function nameSquare(
  context: CanvasRenderingContext2D,
  square: SquareGeometry,
  labels: readonly string[],
  inks: Inks,
): void {
  context.fillStyle = inks.quiet;
  context.font = `11px ${inks.font}`;
  context.textBaseline = 'middle';
  square.order.forEach((position, index) => {
    const label = shortened(labels[position] ?? '');
    const at = (index + 0.5) * square.cell;
    context.textAlign = 'right';
    context.fillText(label, square.left - 7, square.top + at);
    context.save();
    context.translate(square.left + at, square.top - 7);
    context.rotate(-Math.PI / 2);
    context.textAlign = 'left';
    context.fillText(label, 0, 0);
    context.restore();
  });
}

/** A label cut to what fits beside a drawing. */
export const shortened = (label: string, most = 19): string =>
  label.length > most ? `${label.slice(0, most - 1).trimEnd()}…` : label;
