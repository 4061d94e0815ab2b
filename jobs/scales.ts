/** Steps 1, 2, … of the entries; equal entries share one. */
export function denseRanks(entries: Float64Array): Float64Array {
  const steps = new Map<number, number>();
  for (const entry of [...new Set(entries)].sort((a, b) => a - b)) steps.set(entry, steps.size + 1);
  return entries.map((entry) => steps.get(entry) ?? 0);
}

/** @returns the filtration value of every node row in the unit of the scale. */
export const valuesOn = (scale: 'entry' | 'rank', entries: Float64Array): Float64Array =>
  scale === 'rank' ? denseRanks(entries) : entries;
