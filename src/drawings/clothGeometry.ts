import type { Pair } from '../graphs/swapMatrix';
import { positionAt, xAt, type ArrivalAxis } from './arrivalAxis';

/** The cloth above the axis: a pair stands at the midpoint of its arrivals, as high as they are apart. */
export interface ClothGeometry {
  readonly axis: ArrivalAxis;
  readonly height: number;
  /** y of the axis. */
  readonly base: number;
  /** Pixels upwards for each step that two arrivals are apart. */
  readonly rise: number;
}

/** Room for half a lozenge, the pencil and the focus ring above the highest cell. */
const HEADROOM = 8;

/** Height of a cloth as wide as the axis, with round arcs if that fits, and at most `most` pixels. */
export function clothHeight(axis: ArrivalAxis, most: number): number {
  const apart = Math.min(axis.nodeCount, axis.to - axis.from);
  return Math.max(120, Math.min(most, Math.ceil((apart * axis.step) / 2 + HEADROOM)));
}

/** The vertical scale shrinks so that the whole cloth fits; it is never steeper than a round arc. */
export function clothGeometry(axis: ArrivalAxis, height: number): ClothGeometry {
  const apart = Math.max(1, Math.min(axis.nodeCount, axis.to - axis.from));
  const rise = Math.min(axis.step / 2, (height - HEADROOM) / apart);
  return { axis, height, base: height - 0.5, rise };
}

/** Centre of a cell, which is the apex of the arc between its two arrivals. */
export function cellCentre(cloth: ClothGeometry, { p, q }: Pair): { x: number; y: number } {
  return { x: xAt(cloth.axis, (p + q) / 2), y: cloth.base - (q - p) * cloth.rise };
}

/** The pair whose lozenge holds a point, or null outside the cloth. Exact: lozenges tile the cloth. */
export function pairAtPoint(cloth: ClothGeometry, x: number, y: number): Pair | null {
  const middle = positionAt(cloth.axis, x);
  const apart = (cloth.base - y) / cloth.rise;
  // Adding 0 turns the -0 of rounding into 0.
  const p = Math.round(middle - apart / 2) + 0;
  const q = Math.round(middle + apart / 2);
  return p >= 0 && q < cloth.axis.nodeCount && p < q ? { p, q } : null;
}

/** SVG path of a cell, larger by `grow` pixels on every corner. */
export function lozengePath(cloth: ClothGeometry, pair: Pair, grow = 0): string {
  const { x, y } = cellCentre(cloth, pair);
  const across = cloth.axis.step / 2 + grow;
  const up = cloth.rise + grow;
  return `M${x - across} ${y}L${x} ${y - up}L${x + across} ${y}L${x} ${y + up}Z`;
}

/** SVG path of the half-ellipse from one arrival to the other; its apex is the centre of the cell. */
export function arcPath(cloth: ClothGeometry, { p, q }: Pair): string {
  const from = xAt(cloth.axis, p);
  const to = xAt(cloth.axis, q);
  const up = (q - p) * cloth.rise;
  return `M${from} ${cloth.base}A${(to - from) / 2} ${up} 0 0 1 ${to} ${cloth.base}`;
}

/** How far, in pixels, a point is from the arc of a pair, measured along the ray from its middle. */
export function arcDistance(cloth: ClothGeometry, { p, q }: Pair, x: number, y: number): number {
  const across = (x - xAt(cloth.axis, (p + q) / 2)) / (((q - p) * cloth.axis.step) / 2);
  const up = (cloth.base - y) / ((q - p) * cloth.rise);
  if (up < 0) return Infinity;
  const share = Math.hypot(across, up);
  const reach = Math.hypot(x - xAt(cloth.axis, (p + q) / 2), cloth.base - y);
  return share === 0 ? Infinity : Math.abs(reach - reach / share);
}
