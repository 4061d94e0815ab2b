import type { EntryUnit, Scale } from '#contract/enums';
import type { Amount } from '../drawings/barWords';
import type { Measure } from '../graphs/measures';

const figures = new Intl.NumberFormat(undefined, { maximumFractionDigits: 3 });
const shares = new Intl.NumberFormat(undefined, {
  minimumFractionDigits: 2,
  maximumFractionDigits: 2,
});
const percents = new Intl.NumberFormat(undefined, { style: 'percent', maximumFractionDigits: 1 });

export const writeNumber = (value: number): string => figures.format(value);
/** Similarities and modularities: always two decimals, so that columns line up. */
export const writeShare = (value: number): string =>
  shares.format(Math.abs(value) < 0.005 ? 0 : value);
export const writePercent = (value: number): string => percents.format(value);

/** Unit of the filtration: one and many. Bare numbers have none. */
export function unitOf(scale: Scale, unit: EntryUnit): readonly [one: string, many: string] {
  if (scale === 'rank') return ['step', 'steps'];
  switch (unit) {
    case 'days':
      return ['day', 'days'];
    case 'seconds':
      return ['second', 'seconds'];
    case 'number':
      return ['', ''];
  }
}

/** An entry as text where only its number is known: ISO date or date-time, or the number itself. */
export function writeEntry(entryUnit: EntryUnit, entry: number): string {
  if (entryUnit === 'number') return writeNumber(entry);
  const milliseconds = entry * (entryUnit === 'days' ? 86_400_000 : 1000);
  const date = new Date(milliseconds);
  if (Number.isNaN(date.getTime())) return writeNumber(entry);
  const iso = date.toISOString();
  return entryUnit === 'days' ? iso.slice(0, 10) : `${iso.slice(0, 19)}Z`;
}

export function amountOf(scale: Scale, entryUnit: EntryUnit): Amount {
  const [one, many] = unitOf(scale, entryUnit);
  return (value) => `${writeNumber(value)} ${value === 1 ? one : many}`.trim();
}

export const MEASURE_NAMES: Record<Measure, string> = {
  change: 'Change ÷ bound',
  distance: 'Distance',
  betti: 'Betti gap',
  moves: 'Moves most',
  bound: 'Bound',
};

/** Says what a colour stands for, above the legend. */
export function measureCaption(measure: Measure, dimension: number | null): string {
  const where = dimension === null ? '' : `, dimension ${dimension}`;
  switch (measure) {
    case 'change':
      return `change as a share of its bound${where}`;
    case 'distance':
      return dimension === null ? 'largest bottleneck distance' : `bottleneck distance${where}`;
    case 'betti':
      return `largest Betti-curve gap${where}`;
    case 'moves':
      return 'dimension that moves most';
    case 'bound':
      return 'stability bound of the pair';
  }
}

/** Time that is left or was spent, in words short enough for a line of progress. */
export function writeDuration(milliseconds: number): string {
  const seconds = milliseconds / 1000;
  if (seconds < 1) return `${writeNumber(Math.max(0.1, Math.round(seconds * 10) / 10))} s`;
  if (seconds < 90) return `${Math.round(seconds)} s`;
  const minutes = seconds / 60;
  return minutes < 90
    ? `${Math.round(minutes)} min`
    : `${writeNumber(Math.round(minutes / 6) / 10)} h`;
}
