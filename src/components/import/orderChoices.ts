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
  { value: 'numbers', label: 'are numbers' },
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

/** A tolerance counts in these. */
export const UNIT_WORDS = { number: 'units', days: 'days', seconds: 'seconds' } as const;
