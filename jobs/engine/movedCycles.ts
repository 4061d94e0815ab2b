import { Cycles } from './fast/cycles';
import { reduceRecorded } from './fast/recorded';
import { makeScale } from './fast/scale';
import { listComplex } from './fast/tables';
import type { Prepared } from './prepared';
import type { BarCycle, BarMatch, MovedCycles } from './types';

/** Most cycles of one side and dimension, and most simplices of one that a reader could take in. */
const MOST_CYCLES = 40;
const MOST_SIMPLICES = 400;

/** Arrival positions of a swap, p < q. */
interface Swap {
  readonly p: number;
  readonly q: number;
}

type Side = 'recorded' | 'swapped';

/**
 * A cycle for every bar that moves, as far as they can be shown (see `Cycles`).
 * @param matchings per dimension, as in `PairDetail`
 * @throws EngineLimitError where the swapped complex does not fit
 */
export function movedCycles(
  prepared: Prepared,
  swap: Swap,
  matchings: readonly (readonly BarMatch[])[],
): MovedCycles[] {
  const recorded = movedBars(matchings, 'recorded');
  const swapped = movedBars(matchings, 'swapped');
  const before = cyclesOf(recorded, () => recordedCycles(prepared));
  const after = cyclesOf(swapped, () => swappedCycles(prepared, swap));
  for (const { simplices } of after.flat()) {
    simplices?.forEach((x, i) => (simplices[i] = exchanged(x, swap)));
  }
  return matchings.map((_, k) => ({ recorded: before[k]!, swapped: after[k]! }));
}

/** Per dimension the bars of one side that move, those that cost most first. */
function movedBars(matchings: readonly (readonly BarMatch[])[], side: Side): number[][] {
  return matchings.map((matches) =>
    matches
      .filter((match) => match.cost > 0 && match[side] >= 0)
      .sort((x, y) => y.cost - x.cost || x[side] - y[side])
      .slice(0, MOST_CYCLES)
      .map((match) => match[side]),
  );
}

/** `make` is asked only where a bar moves. */
function cyclesOf(bars: readonly number[][], make: () => Cycles): BarCycle[][] {
  if (bars.every((list) => list.length === 0)) return bars.map(() => []);
  const cycles = make();
  return bars.map((list, k) =>
    list.map((bar) => {
      const simplices = cycles.of(k, bar);
      const isShort = simplices !== null && simplices.length <= MOST_SIMPLICES * (k + 1);
      return { bar, simplices: isShort ? simplices : null };
    }),
  );
}

function recordedCycles({ foundation }: Prepared): Cycles {
  const { tables, recorded, scale, pulse } = foundation;
  return new Cycles(tables, recorded, scale, pulse);
}

/** The swapped order reduced anew: p and q exchange their places, every value keeps its own. */
function swappedCycles({ foundation, maxDimension, values }: Prepared, swap: Swap): Cycles {
  const { tables, pulse } = foundation;
  const complex = listComplex(
    {
      nodeCount: tables.nodeCount,
      ends: tables.levels[1]!.nodes.map((x) => exchanged(x, swap)),
      maxDimension,
      limits: tables.budget.limits,
      labels: 'best',
      memory: 'own',
    },
    pulse,
  );
  return new Cycles(complex, reduceRecorded(complex, pulse), makeScale(values), pulse);
}

const exchanged = (x: number, { p, q }: Swap): number => (x === p ? q : x === q ? p : x);
