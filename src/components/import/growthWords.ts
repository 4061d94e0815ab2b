import type { ImportGrowth } from '#contract/imports';
import { formatCount, formatNoun } from '../../composables/localeFormat';
import { stepAt, type BettiSteps } from '../../drawings/growthGeometry';

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

/** "Arrival 7 of 46: Marsh marigold, 2031-04-09; 12 edges by then; Betti numbers 1, 2, 0, 0." */
export function arrivalWords(growth: ImportGrowth, betti: BettiSteps, i: number): string {
  const { entries, labels, edgesBy } = growth;
  const edges = formatNoun(edgesBy[i] ?? 0, 'edge');
  const numbers = betti.map((steps) => formatCount(stepAt(steps, entries[i] ?? 0)));
  const curves = numbers.length > 0 ? `; Betti numbers ${numbers.join(', ')}` : '';
  return `Arrival ${formatCount(i + 1)} of ${formatCount(entries.length)}: ${labels[i] ?? ''}, ${entryWords(growth, i)}; ${edges} by then${curves}.`;
}
