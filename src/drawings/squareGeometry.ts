import type { Pair } from '../graphs/swapMatrix';

/** The square form: rows and columns in one order; row i, column j shows the pair of their nodes. */
export interface SquareGeometry {
  /** Arrival position at each row and column. */
  readonly order: Uint32Array;
  /** Row or column of each arrival position: the inverse of `order`. */
  readonly place: Uint32Array;
  readonly left: number;
  readonly top: number;
  /** Pixels of a cell's side. */
  readonly cell: number;
  readonly size: number;
  /** Whether names fit beside rows and columns. */
  readonly named: boolean;
}

const NAMES = 118;
const BARE = 10;
const SMALLEST_NAMED = 10;

/** A square that fits a width and a height, with names where a cell is tall enough for one. */
export function squareGeometry(order: Uint32Array, width: number, height: number): SquareGeometry {
  const n = Math.max(1, order.length);
  const side = (margin: number): number => Math.max(40, Math.min(width, height) - margin - BARE);
  const named = side(NAMES) / n >= SMALLEST_NAMED;
  const margin = named ? NAMES : BARE;
  const size = side(margin);
  const place = new Uint32Array(order.length);
  order.forEach((position, index) => (place[position] = index));
  const left = margin + Math.max(0, (width - size - margin - BARE) / 2);
  return { order, place, left, top: margin, cell: size / n, size, named };
}

/** Row and column at a point, or null outside and on the diagonal. */
export function squareCellAt(
  square: SquareGeometry,
  x: number,
  y: number,
): { readonly row: number; readonly column: number } | null {
  const column = Math.floor((x - square.left) / square.cell);
  const row = Math.floor((y - square.top) / square.cell);
  const n = square.order.length;
  return row >= 0 && column >= 0 && row < n && column < n && row !== column
    ? { row, column }
    : null;
}

/** The pair of the nodes in a row and a column. */
export function squarePair(square: SquareGeometry, row: number, column: number): Pair | null {
  const a = square.order[row];
  const b = square.order[column];
  if (a === undefined || b === undefined || a === b) return null;
  return a < b ? { p: a, q: b } : { p: b, q: a };
}

/** The two cells of a pair, the one above the diagonal first. */
export function squareCells(
  square: SquareGeometry,
  { p, q }: Pair,
): readonly (readonly [row: number, column: number])[] {
  const a = square.place[p] ?? 0;
  const b = square.place[q] ?? 0;
  const [low, high] = a < b ? [a, b] : [b, a];
  return [
    [low, high],
    [high, low],
  ];
}
