import type { DecimalMark } from './types';

const POINT = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const COMMA = /^[+-]?(?:\d+,?\d*|,\d+)(?:[eE][+-]?\d+)?$/;
const DATE =
  /^(?:\d{4}[-/.]\d{1,2}(?:[-/.]\d{1,2})?|\d{1,2}[-/.]\d{1,2}[-/.]\d{2,4}|\d{1,2}[-/.]\d{4})(?:[T ]\d{1,2}:\d{2}.*)?$/;
const NO_NUMBERS = /^[+-]?(?:nan|inf(?:inity)?)$/i;
const MISSING = /^(?:|\?|-|–|—|\.|na|n\/a|n\.a\.|nd|n\.d\.|none|null|unknown|missing)$/i;

/** Whether a cell is a plain decimal number as the mark has it. */
export const isNumber = (cell: string, decimal: DecimalMark): boolean =>
  (decimal === ',' ? COMMA : POINT).test(cell);

/** Whether a cell is meant as a number, even one that orders nothing (NaN, Infinity). */
export const isNumberLike = (cell: string): boolean =>
  POINT.test(cell) || COMMA.test(cell) || NO_NUMBERS.test(cell);

/** Whether a cell has the look of a date, right or wrong: 2024-02-01, 1/2/2024, 2024-02, 01/2024. */
export const isDateLike = (cell: string): boolean => DATE.test(cell);

/** Whether a cell says that nothing is known: it is empty, or NA, n/a, none, unknown, ?, –. */
export const isMissing = (cell: string): boolean => MISSING.test(cell);

/** Whether a cell has a decimal comma that cannot be anything else. */
export const hasDecimalComma = (cell: string): boolean =>
  /^[+-]?\d*,\d+(?:[eE][+-]?\d+)?$/.test(cell);

export const hasDecimalPoint = (cell: string): boolean =>
  /^[+-]?\d*\.\d+(?:[eE][+-]?\d+)?$/.test(cell);

/**
 * The value of digits with at most one point (up to 15 characters), NaN for any other text. A quick
 * way for the commonest cells; it decides nothing that the patterns above would not.
 */
export function plainNumber(cell: string): number {
  if (cell.length === 0 || cell.length > 15) return NaN;
  let points = 0;
  for (let at = 0; at < cell.length; at++) {
    const code = cell.charCodeAt(at);
    if (code === 46) points++;
    else if (code < 48 || code > 57) return NaN;
  }
  return points > 1 || points === cell.length ? NaN : Number(cell);
}
