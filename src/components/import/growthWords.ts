import type { ImportGrowth } from '#contract/imports';
import { formatCount, formatNoun } from '../../composables/localeFormat';

const DAY = 86_400_000;

/** A value of the entry unit as it is written in files: a number, a date, a date with time (UTC). */
export function valueWords(unit: ImportGrowth['entryUnit'], value: number): string {
  if (unit === 'number') return String(value);
  const date = new Date(unit === 'days' ? value * DAY : value * 1000);
  if (Number.isNaN(date.getTime())) return String(value);
  return unit === 'days'
    ? date.toISOString().slice(0, 10)
    : date.toISOString().replace('.000Z', 'Z');
}

/** The entry of an arrival with its window. */
export function entryWords(growth: ImportGrowth, i: number): string {
  const { entries, earliest, latest, entryUnit } = growth;
  const entry = valueWords(entryUnit, entries[i] ?? 0);
  const [from, to] = [earliest[i] ?? null, latest[i] ?? null];
  if (from === null && to === null) return entry;
  const end = (value: number | null): string =>
    value === null ? '?' : valueWords(entryUnit, value);
  return `${entry} (${end(from)} to ${end(to)})`;
}

/** "7th arrival of 46: Marsh marigold, 2031-04-09; 12 edges by then." */
export function arrivalWords(growth: ImportGrowth, i: number): string {
  const edges = formatNoun(growth.edgesBy[i] ?? 0, 'edge');
  return `Arrival ${formatCount(i + 1)} of ${formatCount(growth.entries.length)}: ${growth.labels[i] ?? ''}, ${entryWords(growth, i)}; ${edges} by then.`;
}
