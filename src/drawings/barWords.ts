/** A bar in the unit of the scale; death is Infinity for a bar that never dies. */
export interface Bar {
  readonly birth: number;
  readonly death: number;
}

/** Writes an amount with its unit, e.g. `7 steps`. */
export type Amount = (value: number) => string;

/**
 * What happens to one bar when the two nodes trade places, in words.
 * @param recorded null for a bar that is new; @param swapped null for a bar that vanishes.
 */
export function barWords(recorded: Bar | null, swapped: Bar | null, amount: Amount): string {
  if (recorded === null && swapped === null) return '';
  if (recorded === null) return `new, ${lengthWords(swapped, amount)}`;
  if (swapped === null) return `gone, was ${lengthWords(recorded, amount)}`;
  const parts = [
    shiftWords('born', swapped.birth - recorded.birth, amount),
    shiftWords('dies', swapped.death - recorded.death, amount),
  ];
  return parts.filter((part) => part !== '').join(', ') || 'unchanged';
}

function lengthWords(bar: Bar | null, amount: Amount): string {
  if (bar === null) return '';
  return bar.death === Infinity ? 'never dies' : `${amount(bar.death - bar.birth)} long`;
}

/** Infinity minus Infinity is not a number: both bars never die, nothing to say. */
function shiftWords(verb: string, shift: number, amount: Amount): string {
  if (shift === 0 || Number.isNaN(shift)) return '';
  return `${verb} ${amount(Math.abs(shift))} ${shift < 0 ? 'earlier' : 'later'}`;
}

/** The usual name of what a bar of a dimension stands for. */
export function dimensionNoun(dimension: number, count = 2): string {
  const nouns = [
    ['component', 'components'],
    ['loop', 'loops'],
    ['void', 'voids'],
    ['3-dimensional void', '3-dimensional voids'],
  ] as const;
  const pair = nouns[dimension] ?? ['bar', 'bars'];
  return count === 1 ? pair[0] : pair[1];
}

const SUBSCRIPTS = ['₀', '₁', '₂', '₃'];

/** "1 · loops"; dimension 3 has no shorter name than its number. */
export const dimensionName = (dimension: number): string =>
  dimension > 2 ? String(dimension) : `${dimension} · ${dimensionNoun(dimension)}`;

export const dimensionTitle = (dimension: number): string =>
  `H${SUBSCRIPTS[dimension] ?? dimension}${dimension > 2 ? '' : ` · ${dimensionNoun(dimension)}`}`;
