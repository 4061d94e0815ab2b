import { MEASURES, type Measure } from '../graphs/measures';
import { ORDERINGS, type Ordering } from '../graphs/ordering';
import type { Pair } from '../graphs/swapMatrix';

export const FORMS = ['cloth', 'arcs', 'square'] as const;
export type Form = (typeof FORMS)[number];
export const FACES = ['pair', 'node', 'group'] as const;
export type Face = (typeof FACES)[number];

/** Which nodes are marked: a community by its place in the list, a saved group, or some by hand. */
export type GroupChoice =
  | { readonly kind: 'community'; readonly index: number }
  | { readonly kind: 'saved'; readonly id: string }
  | { readonly kind: 'hand'; readonly positions: readonly number[] };

/** Everything about the bench that a link brings back. Positions count from 0 here, from 1 in links. */
export interface BenchView {
  readonly form: Form;
  readonly measure: Measure;
  /** One dimension, or null for the largest over the chosen ones. */
  readonly dimension: number | null;
  /** Measure under the diagonal of the square. */
  readonly lower: Measure;
  readonly order: Ordering;
  readonly arcs: 'safe' | 'moved';
  /** Least share of the ceiling for an arc, 0.05..1. */
  readonly threshold: number;
  readonly pair: Pair | null;
  readonly node: number | null;
  readonly group: GroupChoice | null;
  readonly face: Face;
  /** Arrivals shown, or null for all. */
  readonly window: readonly [number, number] | null;
}

export const PLAIN_VIEW: BenchView = {
  form: 'cloth',
  measure: 'change',
  dimension: null,
  lower: 'change',
  order: 'arrival',
  arcs: 'moved',
  threshold: 0.5,
  pair: null,
  node: null,
  group: null,
  face: 'pair',
  window: null,
};

/** Values of a query as the router gives them. */
export type Query = Readonly<Record<string, unknown>>;

const one = <T extends string>(choices: readonly T[], value: unknown, plain: T): T =>
  choices.find((choice) => choice === value) ?? plain;

const numbers = (value: unknown, separator: string): number[] =>
  typeof value === 'string' ? value.split(separator).map(Number) : [];

function pairOf(value: unknown, nodeCount: number): Pair | null {
  const [a = NaN, b = NaN] = numbers(value, '-').map((number) => number - 1);
  const fits = (p: number): boolean => Number.isInteger(p) && p >= 0 && p < nodeCount;
  return fits(a) && fits(b) && a !== b ? { p: Math.min(a, b), q: Math.max(a, b) } : null;
}

function groupOf(value: unknown, nodeCount: number): GroupChoice | null {
  if (typeof value !== 'string' || value === '') return null;
  const community = /^community-(\d+)$/.exec(value);
  if (community) return { kind: 'community', index: Number(community[1]) - 1 };
  const hand = /^nodes-([\d.]*)$/.exec(value);
  if (!hand) return { kind: 'saved', id: value };
  const positions = numbers(hand[1], '.')
    .map((number) => number - 1)
    .filter((p) => p >= 0 && p < nodeCount);
  return { kind: 'hand', positions: [...new Set(positions)].sort((a, b) => a - b) };
}

function windowOf(value: unknown): readonly [number, number] | null {
  const [from = NaN, to = NaN] = numbers(value, '-');
  return from >= 1 && to > from ? [from - 1.5, to - 0.5] : null;
}

/** Reads a link; whatever does not fit this network falls back to the plain view. */
export function readView(query: Query, nodeCount: number): BenchView {
  const dimension = Number(query['dimension'] ?? NaN);
  const threshold = Number(query['threshold'] ?? NaN);
  const measure = one(MEASURES, query['measure'], 'change');
  const node = Number(query['node'] ?? NaN) - 1;
  return {
    form: one(FORMS, query['form'], 'cloth'),
    measure,
    dimension: [0, 1, 2, 3].includes(dimension) ? dimension : null,
    lower: one(MEASURES, query['lower'], measure),
    order: one(ORDERINGS, query['order'], 'arrival'),
    arcs: query['arcs'] === 'safe' ? 'safe' : 'moved',
    threshold: threshold >= 0.05 && threshold <= 1 ? threshold : PLAIN_VIEW.threshold,
    pair: pairOf(query['pair'], nodeCount),
    node: Number.isInteger(node) && node >= 0 && node < nodeCount ? node : null,
    group: groupOf(query['group'], nodeCount),
    face: one(FACES, query['face'], 'pair'),
    window: windowOf(query['window']),
  };
}

function writeGroup(group: GroupChoice): string {
  switch (group.kind) {
    case 'community':
      return `community-${group.index + 1}`;
    case 'saved':
      return group.id;
    case 'hand':
      return `nodes-${group.positions.map((p) => p + 1).join('.')}`;
  }
}

/** Writes a view as a link, leaving out what is plain. */
export function writeView(view: BenchView): Record<string, string> {
  const parts: [string, string | null][] = [
    ['form', view.form === PLAIN_VIEW.form ? null : view.form],
    ['measure', view.measure === PLAIN_VIEW.measure ? null : view.measure],
    ['dimension', view.dimension === null ? null : String(view.dimension)],
    ['lower', view.lower === view.measure ? null : view.lower],
    ['order', view.order === PLAIN_VIEW.order ? null : view.order],
    ['arcs', view.arcs === PLAIN_VIEW.arcs ? null : view.arcs],
    ['threshold', view.threshold === PLAIN_VIEW.threshold ? null : String(view.threshold)],
    ['pair', view.pair && `${view.pair.p + 1}-${view.pair.q + 1}`],
    ['node', view.node === null ? null : String(view.node + 1)],
    ['group', view.group && writeGroup(view.group)],
    ['face', view.face === PLAIN_VIEW.face ? null : view.face],
    [
      'window',
      view.window && `${Math.round(view.window[0] + 1.5)}-${Math.round(view.window[1] + 0.5)}`,
    ],
  ];
  return Object.fromEntries(parts.filter((part): part is [string, string] => part[1] !== null));
}
