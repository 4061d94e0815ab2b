import { rgb } from 'd3';
import { OUTSIDE, type MeasureField } from '../graphs/measures';
import { changeRamp, dimensionColour, rampColour, rampEntry, RAMP_SIZE } from './ramp';

/** Pair has not landed. */
export const OPEN = -1;
/** Pair is no part of the run. */
export const LEFT_OUT = -2;
/** Nothing changes. */
export const WOVEN = 0;

/** Paint of every class of cell: class 1.. is drawn in `colours[class - 1]`. */
export interface CellPaint {
  /** LEFT_OUT, OPEN, WOVEN, or 1 + entry of `colours`, by pair index. */
  readonly classes: Int16Array;
  readonly colours: readonly string[];
  /** Red, green, blue of `colours`. */
  readonly bytes: Uint8ClampedArray;
}

/** Sorts the cells of a measure into paints. O(pairs). */
export function paintCells(field: MeasureField, dark: boolean): CellPaint {
  const { values, ceiling, measure } = field;
  const classes = new Int16Array(values.length);
  const categories = measure === 'moves';
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i] ?? NaN;
    if (Number.isNaN(value)) classes[i] = OPEN;
    else if (value === OUTSIDE) classes[i] = LEFT_OUT;
    else if (value === 0) classes[i] = WOVEN;
    else classes[i] = 1 + (categories ? value - 1 : rampEntry(value / ceiling));
  }
  return { classes, ...(categories ? dimensionPaint(dark) : rampPaint(dark)) };
}

function rampPaint(dark: boolean): Pick<CellPaint, 'colours' | 'bytes'> {
  const bytes = changeRamp(dark);
  const colours = Array.from({ length: RAMP_SIZE }, (_, entry) => rampColour(bytes, entry));
  return { colours, bytes };
}

function dimensionPaint(dark: boolean): Pick<CellPaint, 'colours' | 'bytes'> {
  const colours = [0, 1, 2, 3].map((dimension) => dimensionColour(dimension, dark));
  const bytes = Uint8ClampedArray.from(
    colours.flatMap((colour) => {
      const { r, g, b } = rgb(colour);
      return [r, g, b];
    }),
  );
  return { colours, bytes };
}
