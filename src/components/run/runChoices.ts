import type { Scale } from '#contract/enums';

export const SCALE_CHOICES: readonly { value: Scale; label: string; meaning: string }[] = [
  {
    value: 'entry',
    label: 'recorded entries',
    meaning:
      'Births, deaths and distances are in the unit of the entries, so a long wait between two ' +
      'arrivals counts for more than a short one.',
  },
  {
    value: 'rank',
    label: 'arrival rank',
    meaning:
      'Steps 1, 2, … in the recorded order; nodes with equal entries share a step. For records ' +
      'where the order is trusted more than the values.',
  },
];

export const DIMENSION_CHOICES: readonly { value: number; label: string }[] = [
  { value: 0, label: '0 · components' },
  { value: 1, label: '1 · loops' },
  { value: 2, label: '2 · voids' },
  { value: 3, label: '3' },
];
