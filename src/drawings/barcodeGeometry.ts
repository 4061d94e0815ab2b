import type { BarCycle, PairDetail, WireBars } from '#contract/runs';
import type { Bar } from './barWords';

/** One line of the barcode of a dimension. */
export interface BarRow {
  readonly recorded: Bar | null;
  /** Null for a bar that goes to the diagonal; the same as `recorded` where nothing moves. */
  readonly swapped: Bar | null;
  readonly moved: boolean;
  /** What the match costs, in the unit of the scale. */
  readonly cost: number;
  /** This match costs the whole bottleneck distance. */
  readonly realising: boolean;
  /** One cycle of many for each bar, as node rows, where the engine gives one. */
  readonly cycles?: { readonly recorded: BarSimplices; readonly swapped: BarSimplices };
}

/** Null where it is too long to show, or there is no such bar. */
export type BarSimplices = BarCycle['simplices'];

export interface BarBand {
  readonly dimension: number;
  /** Sorted by first birth, then death. */
  readonly rows: readonly BarRow[];
  /** Null without a swap. */
  readonly distance: number | null;
}

/** A row of a band with its place. */
export interface PlacedRow extends BarRow {
  readonly y: number;
  readonly height: number;
}

export interface PlacedBand {
  readonly band: BarBand;
  readonly top: number;
  readonly rows: readonly PlacedRow[];
  /** Bars left out of the drawing: the shortest unchanged and the cheapest moved; the table has them. */
  readonly leftOut: number;
  readonly movedLeftOut: number;
  readonly height: number;
}

const barOf = ([birth, death]: WireBars[number]): Bar => ({ birth, death: death ?? Infinity });

const firstBirth = (row: BarRow): number => row.recorded?.birth ?? row.swapped?.birth ?? 0;
const lastDeath = (row: BarRow): number => row.recorded?.death ?? row.swapped?.death ?? 0;

const byBirth = (a: BarRow, b: BarRow): number =>
  firstBirth(a) - firstBirth(b) || (lastDeath(a) < lastDeath(b) ? -1 : 1);

/** The recorded barcode of one dimension, no swap laid over. */
export function recordedBand(dimension: number, bars: WireBars): BarBand {
  const rows = bars.map((wire): BarRow => {
    const bar = barOf(wire);
    return { recorded: bar, swapped: bar, moved: false, cost: 0, realising: false };
  });
  return { dimension, rows: rows.sort(byBirth), distance: null };
}

/** Recorded and swapped barcode of one dimension, joined by the optimal matching of the engine. */
export function swappedBand(detail: PairDetail['dimensions'][number]): BarBand {
  const cycleOf = (side: 'recorded' | 'swapped', bar: number): BarSimplices =>
    detail.cycles[side].find((cycle) => cycle.bar === bar)?.simplices ?? null;
  const rows = detail.matching.map(([r, s, cost], index): BarRow => {
    const from = detail.recorded[r];
    const to = detail.swapped[s];
    const recorded = from === undefined ? null : barOf(from);
    const swapped = to === undefined ? null : barOf(to);
    const same = recorded?.birth === swapped?.birth && recorded?.death === swapped?.death;
    const ends = { recorded, swapped, moved: !same, cost, realising: index === detail.realising };
    if (same) return ends;
    const cycles = { recorded: cycleOf('recorded', r), swapped: cycleOf('swapped', s) };
    return { ...ends, cycles };
  });
  return { dimension: detail.dimension, rows: rows.sort(byBirth), distance: detail.distance };
}

const HEADING = 20;
const GAP = 8;
const MOVED_PITCH = 17;
const SMALL_MOVED_PITCH = 6;
/** Moved bars of one dimension that are drawn; past it the costliest. */
export const MOST_MOVED = 80;
const WIDEST_PITCH = 11;
const NARROWEST_PITCH = 2;
/** Height that the unchanged bars of one dimension share. */
const QUIET_HEIGHT = 110;
/** Past this many moved bars their words would not be read; only the costliest are named. */
export const MOST_NAMED = 14;

/** Stacks the bands, with as many bars of each as can be told apart. */
export function placeBands(bands: readonly BarBand[]): {
  readonly bands: readonly PlacedBand[];
  readonly height: number;
} {
  let top = 0;
  const placed = bands.map((band) => {
    const result = placeBand(band, top);
    top += result.height;
    return result;
  });
  return { bands: placed, height: Math.max(HEADING, top) };
}

function placeBand(band: BarBand, top: number): PlacedBand {
  const quiet = band.rows.filter((row) => !row.moved);
  const most = Math.floor(QUIET_HEIGHT / NARROWEST_PITCH);
  const kept = new Set(longest(quiet, most));
  const pitch = Math.min(WIDEST_PITCH, QUIET_HEIGHT / Math.max(1, kept.size));
  const moved = band.rows.filter((row) => row.moved).sort((a, b) => b.cost - a.cost);
  const keptMoved = new Set(moved.slice(0, MOST_MOVED));
  const movedPitch = moved.length > MOST_NAMED ? SMALL_MOVED_PITCH : MOVED_PITCH;
  let y = top + HEADING;
  const rows: PlacedRow[] = [];
  for (const row of band.rows) {
    if (!(row.moved ? keptMoved : kept).has(row)) continue;
    const height = row.moved ? movedPitch : pitch;
    rows.push({ ...row, y: y + height / 2, height });
    y += height;
  }
  const leftOut = quiet.length - kept.size;
  const movedLeftOut = moved.length - keptMoved.size;
  return { band, top, rows, leftOut, movedLeftOut, height: y - top + GAP };
}

function longest(rows: readonly BarRow[], most: number): readonly BarRow[] {
  if (rows.length <= most) return rows;
  return [...rows]
    .sort((a, b) => lastDeath(b) - firstBirth(b) - (lastDeath(a) - firstBirth(a)) || byBirth(a, b))
    .slice(0, most);
}

/** Moved bars whose words are written: all, or the costliest. */
export function namedRows(rows: readonly PlacedRow[]): ReadonlySet<PlacedRow> {
  const moved = rows.filter((row) => row.moved);
  if (moved.length <= MOST_NAMED) return new Set(moved);
  return new Set(moved.filter((row) => row.realising));
}
