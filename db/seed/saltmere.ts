import { FEEDING, SETTLING, SPECIES, type Guild } from './saltmereSpecies';
import { sourceOf, tableText, type DemoNetwork, type Source } from './source';

/** Chosen among 1,200 seeds for bars in dimensions 1 and 2 and a mix of safe and consequential pairs. */
const SEED = 835;

/** Days between two visits of the surveyors: the least and the most. */
const VISITS_APART = [2, 4] as const;
/** Chance that a visit finds a species that is there. */
const DETECTION = 0.6;

interface Settler {
  readonly name: string;
  readonly guild: Guild;
  /** Survey day of the first detection. */
  readonly entry: number;
  readonly earliest: number;
  readonly latest: number;
}

/**
 * Invented: 46 species of a re-flooded fen. Each settles on a day of its guild's season; the entry
 * is the visit that first detects it. It may have been there since the last visit but two (a present
 * species is overlooked three times in a row in 6 % of cases), and is confirmed by the visit after.
 */
export function saltmere(seed = SEED): DemoNetwork {
  const source = sourceOf(seed);
  const visits = visitDays(source);
  const settlers = Object.entries(SPECIES)
    .flatMap(([guild, names]) => names.map((name) => settled(name, guild as Guild, visits, source)))
    .sort((a, b) => a.entry - b.entry);
  return {
    name: 'Saltmere re-flooding survey',
    description:
      'Invented data. 46 species of a re-flooded fen; entry is the survey day of first detection, ' +
      'with the window of days in which the species may have arrived; an edge is feeding or ' +
      'pollination that was seen.',
    invented: true,
    nodesCsv: tableText(
      'id,label,entry,earliest,latest',
      settlers.map(({ name, entry, earliest, latest }, i) => [
        idOf(i),
        name,
        entry,
        earliest,
        latest,
      ]),
    ),
    edgesCsv: tableText('source,target', seenLinks(settlers, source)),
  };
}

const idOf = (i: number): string => `s${String(i + 1).padStart(2, '0')}`;

function visitDays(source: Source): number[] {
  const days = [1];
  for (let day = 1; day < 420; days.push(day)) day += source.integer(...VISITS_APART);
  return days;
}

function settled(name: string, guild: Guild, visits: readonly number[], source: Source): Settler {
  const arrival = source.integer(...SETTLING[guild]);
  let visit = visits.findIndex((day) => day >= arrival);
  while (source.real() >= DETECTION) visit++;
  const dayOf = (i: number): number => visits[Math.min(Math.max(i, 0), visits.length - 1)] ?? 1;
  return { name, guild, entry: dayOf(visit), earliest: dayOf(visit - 3), latest: dayOf(visit + 1) };
}

/** Draws every possible link by its chance; a species that would be seen with nothing gets one. */
function seenLinks(settlers: readonly Settler[], source: Source): [string, string][] {
  const links: [string, string][] = [];
  const linked = new Set<number>();
  const link = (i: number, j: number) => {
    links.push([idOf(i), idOf(j)]);
    linked.add(i).add(j);
  };
  const possible = settlers.map((one, i) =>
    settlers.flatMap((other, j) => {
      const rule = FEEDING.find(([eats, eaten]) => eats === one.guild && eaten === other.guild);
      return rule ? [{ i, j, chance: rule[2] }] : [];
    }),
  );
  for (const { i, j, chance } of possible.flat()) if (source.real() < chance) link(i, j);
  for (const [v] of settlers.entries()) {
    const either = possible.flat().filter(({ i, j }) => i === v || j === v);
    const chosen = either[source.integer(0, either.length - 1)];
    if (!linked.has(v) && chosen) link(chosen.i, chosen.j);
  }
  return links;
}
