import type { ImportDraft } from '#contract/imports';
import { formatCount } from '../../composables/localeFormat';

export const ORDERS = [
  {
    value: 'column',
    label: 'The entry column',
    meaning: 'Numbers or dates; equal entries arrive together.',
  },
  {
    value: 'rows',
    label: 'The order of the rows',
    meaning: 'The first row arrives first. Only if the file was kept in that order.',
  },
  {
    value: 'first_edge',
    label: 'The first time of any edge of the node',
    meaning: 'Needs a time column of the edges. A node arrives when it is first seen in one.',
  },
] as const;

export const DAYS = [
  { value: 'day_first', label: 'day / month / year' },
  { value: 'month_first', label: 'month / day / year' },
] as const;

export const YEARS = [
  { value: 'numbers', label: 'are numbers', meaning: 'Each is one point on the axis.' },
  {
    value: 'dates',
    label: 'are years',
    meaning: 'Each becomes the window from 1 January to 31 December, its middle the entry.',
  },
] as const;

export const MISSING = [
  {
    value: 'refuse',
    label: 'are a fault',
    meaning: 'The import cannot be saved until each has one.',
  },
  { value: 'leave_out', label: 'are left out', meaning: 'With their edges.' },
  {
    value: 'last',
    label: 'are placed last',
    meaning: 'All at one step after the last entry; their windows reach back to the first.',
  },
] as const;

/** What a tolerance counts in; until there is a network the unit of the entries is not known. */
export const UNIT_WORDS = {
  number: 'the unit of the entries',
  days: 'days',
  seconds: 'seconds',
  unknown: 'the unit of the entries: days where they are dates',
} as const;

/** Why the order cannot be taken from where it was chosen, or undefined. */
export function orderFault(draft: ImportDraft): string | undefined {
  const { order, columns } = draft.choices;
  if (order.kind === 'column' && columns.nodes.entry === null) {
    return 'No column is chosen that says when the nodes arrived. Choose one in the step Columns, or another order here.';
  }
  if (order.kind === 'first_edge' && columns.edges.time === null) {
    return 'The edges have no column of times. Choose one in the step Columns, or another order here.';
  }
  return undefined;
}

/** Whether the entries cannot be read until the order of day and month is known. */
export const awaitsDayOrder = ({ questions }: ImportDraft): boolean =>
  questions.some(({ kind, blocking }) => kind === 'day_order' && blocking);

/** How many nodes have no entry; no number while their dates cannot be read. */
export function missingLabel(draft: ImportDraft): string {
  if (awaitsDayOrder(draft) || draft.found.nodes === 0) return 'Nodes without an entry';
  const { nodesWithoutEntry, placedLast, nodesLeftOut } = draft.found;
  const count = Math.max(nodesWithoutEntry, placedLast, nodesLeftOut);
  return `Nodes without an entry: ${formatCount(count)}`;
}
