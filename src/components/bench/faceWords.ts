import type { BarBand, BarRow } from '../../drawings/barcodeGeometry';
import { dimensionNoun, type Amount, type Bar } from '../../drawings/barWords';
import type { Leeway } from '../../graphs/leeway';

/** "2 earlier · 5 later", "at least" while pairs are missing. */
export function leewayWords({ earlier, later, open }: Leeway): string {
  return `${open ? 'at least ' : ''}${earlier} earlier · ${later} later`;
}

/** A bar that moves, in words. */
export interface Move {
  readonly words: string;
  readonly dimension: number;
  readonly row: BarRow;
}

/**
 * One sentence for each bar that moves, those that make the distance first, then by cost.
 * @param write writes a time of the filtration.
 */
export function movesOf(
  bands: readonly BarBand[],
  amount: Amount,
  write: (value: number) => string,
): Move[] {
  return bands
    .flatMap(({ dimension, rows }) =>
      rows.filter((row) => row.moved).map((row) => ({ row, dimension })),
    )
    .sort((a, b) => b.row.cost - a.row.cost)
    .map(({ row, dimension }) => {
      const noun = `A ${dimensionNoun(dimension, 1)}`;
      const words = sentence(noun, row.recorded, row.swapped, amount, write);
      return { words, dimension, row };
    });
}

function sentence(
  noun: string,
  recorded: Bar | null,
  swapped: Bar | null,
  amount: Amount,
  write: (value: number) => string,
): string {
  const span = ({ birth, death }: Bar): string =>
    death === Infinity ? `from ${write(birth)} on` : `from ${write(birth)} to ${write(death)}`;
  if (recorded === null) return swapped === null ? '' : `${noun} appears, ${span(swapped)}.`;
  if (swapped === null) return `${noun} that lived ${span(recorded)} is gone.`;
  const born =
    recorded.birth === swapped.birth
      ? `is still born at ${write(recorded.birth)}`
      : `is born at ${write(swapped.birth)} instead of ${write(recorded.birth)}, ${amount(Math.abs(swapped.birth - recorded.birth))} ${swapped.birth < recorded.birth ? 'earlier' : 'later'},`;
  const end = (death: number): string =>
    death === Infinity ? 'never closes' : `closes at ${write(death)}`;
  const dies =
    recorded.death === swapped.death
      ? recorded.death === Infinity
        ? 'still never closes'
        : `still closes at ${write(recorded.death)}`
      : `${end(swapped.death)} instead of ${recorded.death === Infinity ? 'never' : write(recorded.death)}`;
  return `${noun} ${born} and ${dies}.`;
}
