import type { Bars } from './engine/types';

/** One Betti curve as steps [value, number of bars alive from there on], by rising value. */
export function bettiSteps({ births, deaths }: Bars): [number, number][] {
  const changes = new Map<number, number>();
  const change = (at: number, by: number) => changes.set(at, (changes.get(at) ?? 0) + by);
  births.forEach((birth, bar) => {
    change(birth, 1);
    const death = deaths[bar] ?? Infinity;
    if (Number.isFinite(death)) change(death, -1);
  });
  let alive = 0;
  const steps: [number, number][] = [];
  for (const [at, by] of [...changes].sort(([a], [b]) => a - b)) {
    alive += by;
    if (by !== 0) steps.push([at, alive]);
  }
  return steps;
}
