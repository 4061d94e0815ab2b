import { visiblePositions, xAt, type ArrivalAxis } from './arrivalAxis';

/** Pixels that one turned label needs along the axis. */
const LABEL_PITCH = 12;

/**
 * Arrival positions whose label is written: all if there is room, else every k-th; the pinned ones
 * always, with their neighbours left out so that nothing overlaps.
 */
export function namedPositions(axis: ArrivalAxis, pinned: readonly number[]): number[] {
  const { first, last } = visiblePositions(axis);
  const every = Math.max(1, Math.ceil(LABEL_PITCH / axis.step));
  const keep = pinned.filter((p) => p >= first && p <= last);
  const clear = (p: number): boolean =>
    keep.every((other) => other === p || Math.abs(other - p) * axis.step >= LABEL_PITCH);
  const regular: number[] = [];
  for (let p = Math.ceil(first / every) * every; p <= last; p += every) {
    if (!keep.includes(p) && clear(p)) regular.push(p);
  }
  return [...regular, ...keep].sort((a, b) => a - b);
}

/** Lanes in which the entry windows are laid, so that neighbours do not cover each other. */
export const WINDOW_LANES = 6;

/** A mark of the ruler of recorded time. */
export interface RulerMark {
  readonly x: number;
  readonly text: string;
}

/** Marks at even distances along the axis, each with the entry of the node there as recorded. */
export function rulerMarks(axis: ArrivalAxis, raw: readonly string[]): RulerMark[] {
  const { first, last } = visiblePositions(axis);
  const longest = Math.max(2, ...raw.map((text) => text.length));
  const text = Math.min(120, longest * 6.5);
  const every = Math.max(1, Math.ceil((text + 16) / axis.step));
  const marks: RulerMark[] = [];
  for (let p = first; p <= last; p += every) {
    const x = xAt(axis, p);
    if (x + text + 6 <= axis.width) marks.push({ x, text: raw[p] ?? '' });
  }
  return marks;
}
