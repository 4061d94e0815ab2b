import type { BarBand } from '../../drawings/barcodeGeometry';
import { dimensionNoun, type Amount, type Bar } from '../../drawings/barWords';
import type { Leeway } from '../../graphs/leeway';

/** "2 earlier · 5 later", "at least" while pairs are missing. */
export function leewayWords({ earlier, later, open }: Leeway): string {
  return `${open ? 'at least ' : ''}${earlier} earlier · ${later} later`;
}

/**
 * One sentence for each bar that moves, those that make the distance first, then by cost.
 * @param write writes a time of the filtration.
 */
export function moveWords(
  bands: readonly BarBand[],
  amount: Amount,
  write: (value: number) => string,
): string[] {
  return bands
    .flatMap((band) =>
      band.rows.filter((row) => row.moved).map((row) => ({ ...row, dimension: band.dimension })),
    )
    .sort((a, b) => b.cost - a.cost)
    .map((row) => {
      const noun = `A ${dimensionNoun(row.dimension, 1)}`;
      return sentence(noun, row.recorded, row.swapped, amount, write);
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
