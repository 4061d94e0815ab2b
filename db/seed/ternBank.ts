import { sourceOf, tableText, type DemoNetwork, type Source } from './source';

/** Chosen among 500 seeds for one component, lasting bars in dimension 1 and a mix of safe and consequential pairs. */
const SEED = 34;

const STATIONS = 60;
/** The bank, in kilometres from west to east and from south to north; the harbour is at the west end. */
const WIDTH = 30;
const HEIGHT = 14;
/** Kilometres that a station's radio reaches over open water. */
const REACH = 4.4;
/** Least distance in kilometres between two stations. */
const APART = 1.5;
/** The wreck field in the middle, where no station may be anchored: centre and radius in kilometres. */
const WRECKS = { x: 17, y: 7, radius: 3 };

/** First working day of the invented campaign, days since 1970-01-01 (2023-03-06). */
const FIRST_DAY = 19_422;
/** Kilometres by which the crews work outwards in a day, and the scatter of a commissioning in days. */
const KILOMETRES_A_DAY = 0.14;
const SCATTER = 110;

interface Place {
  readonly x: number;
  readonly y: number;
}

interface Station extends Place {
  /** Days since 1970-01-01. */
  readonly commissioned: number;
}

/**
 * Invented: 60 sea-state stations, commissioned roughly outwards from the harbour and joined where
 * they are within radio reach (a random geometric graph, Gilbert 1961). The date of every third is
 * known to a window only, because its first message came days after the anchor was dropped.
 */
export function ternBank(seed = SEED): DemoNetwork {
  const source = sourceOf(seed);
  const stations = placed(source).sort((a, b) => a.commissioned - b.commissioned);
  return {
    name: 'Tern Bank mesh',
    description:
      'Invented data. 60 sea-state stations that join a radio mesh on a sand bank; entry is the ' +
      'commissioning date, with a window where it is not certain; an edge is radio contact.',
    invented: true,
    nodesCsv: tableText(
      'id,label,entry,earliest,latest',
      stations.map((station, i) => [idOf(i), nameOf(station, i), ...dates(station, source)]),
    ),
    edgesCsv: tableText(
      'source,target,weight',
      stations.flatMap((one, i) =>
        stations.slice(0, i).flatMap((other, j) => {
          const distance = between(one, other);
          return distance <= REACH ? [[idOf(j), idOf(i), distance.toFixed(2)]] : [];
        }),
      ),
    ),
  };
}

/** Kilometres; from operations whose rounding IEEE 754 fixes, which that of Math.hypot is not. */
const between = (a: Place, b: Place): number => Math.sqrt((a.x - b.x) ** 2 + (a.y - b.y) ** 2);

const idOf = (i: number): string => `tb${String(i + 1).padStart(2, '0')}`;

function nameOf({ x, y }: Station, i: number): string {
  const along = ['Harbour', 'Inner', 'Middle', 'Outer', 'Far'][Math.floor((5 * x) / WIDTH)];
  const across = y < HEIGHT / 3 ? 'south' : y < (2 * HEIGHT) / 3 ? 'ridge' : 'north';
  return `${along} ${across} ${i + 1}`;
}

function placed(source: Source): Station[] {
  const stations: Station[] = [];
  while (stations.length < STATIONS) {
    const x = WIDTH * source.real();
    const y = HEIGHT * source.real();
    const taken = stations.some((other) => between({ x, y }, other) < APART);
    if (taken || between({ x, y }, WRECKS) < WRECKS.radius) continue;
    const day = x / KILOMETRES_A_DAY + SCATTER * source.real();
    stations.push({ x, y, commissioned: FIRST_DAY + Math.floor(day) });
  }
  return stations;
}

/** Entry, earliest, latest as ISO dates; the last two are empty where the date is certain. */
function dates({ commissioned }: Station, source: Source): [string, string, string] {
  const iso = (day: number) => new Date(day * 86_400_000).toISOString().slice(0, 10);
  const uncertain = source.integer(1, 3) === 1;
  if (!uncertain) return [iso(commissioned), '', ''];
  const earliest = commissioned - source.integer(2, 12);
  const latest = commissioned + source.integer(0, 6);
  return [iso(commissioned), iso(earliest), iso(latest)];
}
