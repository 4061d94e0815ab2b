import type { Barcode, Bars, Control, Limits } from '../types';
import type { DimensionChanges } from './changes';
import { Budget, type Memory } from './budget';
import { reduceLinks, type LinkColumns } from './links';
import { IntPool } from './pool';
import { Pulse } from './pulse';
import { reduceRecorded, type Recorded } from './recorded';
import { readRecordedBars, type RankedBars, type RecordedBars } from './recorded-bars';
import { makeScale, type Scale } from './scale';
import { settleColumns, type SettledColumns } from './settled';
import { buildTables, type LabelOrder, type Tables } from './tables';
import type { ZeroTests } from './zero-policy';

/** A foundation as plain data, so that it can be posted; arrays in shared memory are not copied. */
export interface FoundationData {
  readonly tables: Omit<Tables, 'budget'>;
  readonly scale: Scale;
  readonly recorded: Omit<Recorded, 'store'>;
  /** The reduced columns of K. */
  readonly store: Int32Array;
  readonly bars: RecordedBars;
  readonly links: readonly (LinkColumns | undefined)[];
  readonly settled: readonly (SettledColumns | undefined)[];
  readonly bytes: number;
  /** Most bytes held at once while it was laid. */
  readonly peak: number;
  readonly zeroTests: ZeroTests;
}

/** Nobody asks to stop and nobody listens. */
export const QUIET: Control = { shouldStop: () => false, onProgress: () => undefined };

/** The recorded complex, reduced: what every row of the matrix starts from. */
export interface Foundation {
  readonly tables: Tables;
  readonly scale: Scale;
  readonly recorded: Recorded;
  readonly bars: RecordedBars;
  /** Per dimension of columns; absent where zero columns are not told beforehand. */
  readonly links: readonly (LinkColumns | undefined)[];
  readonly settled: readonly (SettledColumns | undefined)[];
  readonly pulse: Pulse;
  /** Bytes held, the store of reduced columns not counted. */
  readonly bytes: number;
  readonly zeroTests: ZeroTests;
}

export interface FoundationRequest {
  /** f by arrival position, ascending. */
  readonly values: Float64Array;
  /** Two arrival positions per edge, every edge once. */
  readonly ends: Int32Array;
  /** D, 0..3. */
  readonly maxDimension: number;
  readonly limits: Limits;
  readonly control: Control;
  /** Which of several ways that give the same results; for tests and measurements. */
  readonly labels?: LabelOrder;
  readonly zeroTests?: ZeroTests;
  /** `shared` where other threads are to use it. */
  readonly memory?: Memory;
}

/**
 * Lists the cliques, builds the tables and reduces the recorded order.
 * @throws EngineLimitError past `limits`; EngineStopped when `control` says so
 */
export function layFoundation(request: FoundationRequest): Foundation {
  const { values, ends, maxDimension, limits, memory = 'own' } = request;
  const { labels = 'best', zeroTests = 'auto' } = request;
  const pulse = new Pulse(request.control);
  const tables = buildTables(
    { nodeCount: values.length, ends, maxDimension, limits, labels, memory },
    pulse,
  );
  const scale = makeScale(values);
  const recorded = reduceRecorded(tables, pulse);
  const bars = readRecordedBars(tables, recorded, scale);
  const links = tables.levels.map((_, d) =>
    d >= 2 && zeroTests !== 'never' ? reduceLinks(tables, d, pulse) : undefined,
  );
  const settled = tables.levels.map((_, d) => settleColumns(tables, links, d));
  pulse.begin(QUIET);
  const bytes = tables.budget.used - 4 * recorded.store.data.length;
  return { tables, scale, recorded, bars, links, settled, pulse, bytes, zeroTests };
}

export function foundationData(foundation: Foundation): FoundationData {
  const { tables, scale, recorded, bars, links, settled, bytes, zeroTests } = foundation;
  const { nodeCount, top, levels, stars, starColumns, columns, byFirstChild, neighbours } = tables;
  const { store, ...plainRecorded } = recorded;
  return {
    tables: { nodeCount, top, levels, stars, starColumns, columns, byFirstChild, neighbours },
    scale,
    recorded: plainRecorded,
    store: store.data.subarray(0, store.length),
    bars,
    links,
    settled,
    bytes,
    peak: tables.budget.peak,
    zeroTests,
  };
}

/**
 * A foundation over the tables of another thread, with an account of bytes and a store of columns of
 * its own. The tables count in every thread's account, though they are there only once.
 */
export function adoptFoundation(data: FoundationData, limits: Limits): Foundation {
  const budget = new Budget(limits);
  budget.take(data.bytes);
  budget.peak = data.peak;
  const tables = { ...data.tables, budget };
  const store = new IntPool(budget, data.store.length + 1024);
  store.data.set(data.store);
  store.length = data.store.length;
  return { ...data, tables, recorded: { ...data.recorded, store }, pulse: new Pulse(QUIET) };
}

/** The recorded barcode. */
export function recordedBars({ bars, scale }: Foundation): Barcode {
  return bars.bars.map(({ keys, infinite }) => toBars(keys, infinite, scale));
}

/** The barcode after a swap: the recorded one with the changes applied. */
export function changedBars(
  { bars, scale }: Foundation,
  changes: readonly DimensionChanges[],
): Barcode {
  return bars.bars.map((recorded, k) => {
    const change = changes[k]!;
    return toBars(changedKeys(recorded, change), changedInfinite(recorded, change), scale);
  });
}

function changedKeys(recorded: RankedBars, change: DimensionChanges): Float64Array {
  const keys: number[] = [...change.added.subarray(0, change.addedCount)];
  let next = 0;
  for (const key of recorded.keys) {
    if (next < change.removedCount && change.removed[next] === key) next++;
    else keys.push(key);
  }
  return Float64Array.from(keys).sort();
}

function changedInfinite(recorded: RankedBars, change: DimensionChanges): Int32Array {
  const count = new Map<number, number>();
  for (const rank of recorded.infinite) count.set(rank, (count.get(rank) ?? 0) + 1);
  for (let i = 0; i < change.rankCount; i++) {
    const rank = change.ranks[i]!;
    count.set(rank, (count.get(rank) ?? 0) + change.counts[i]!);
  }
  const ranks = [...count].flatMap(([rank, times]) => new Array<number>(times).fill(rank));
  return Int32Array.from(ranks).sort();
}

/** Bars by (birth, death), the infinite ones last among equal births. */
function toBars(keys: Float64Array, infinite: Int32Array, { value }: Scale): Bars {
  const births = new Float64Array(keys.length + infinite.length);
  const deaths = new Float64Array(keys.length + infinite.length);
  let i = 0;
  let k = 0;
  for (let at = 0; at < births.length; at++) {
    const birth = i < keys.length ? Math.floor(keys[i]! / value.length) : Infinity;
    if (k < infinite.length && infinite[k]! < birth) {
      births[at] = value[infinite[k++]!]!;
      deaths[at] = Infinity;
    } else {
      births[at] = value[birth]!;
      deaths[at] = value[keys[i++]! % value.length]!;
    }
  }
  return { births, deaths };
}
