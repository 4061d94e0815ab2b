import type { Draw, GrowthModel, Join, Parameter } from './types';

/** Joins node i = 1..n to each earlier one with probability chance(i). O(n²). */
function joinByChance(
  nodeCount: number,
  chance: (i: number) => number,
  draw: Draw,
  join: Join,
): void {
  for (let later = 1; later < nodeCount; later++) {
    const probability = chance(later + 1);
    for (let earlier = 0; earlier < later; earlier++) {
      if (draw.real() < probability) join(earlier, later);
    }
  }
}

const share = (name: string, label: string, meaning: string, standard: number): Parameter => ({
  name,
  label,
  meaning,
  least: 0,
  most: 1,
  whole: false,
  standard,
});

export const constantProbability: GrowthModel = {
  name: 'constant_probability',
  title: 'Constant connection probability',
  rule: 'Node i joins each earlier node with probability p.',
  source:
    'Gilbert, Random graphs, Annals of Mathematical Statistics 30 (1959); the model of Erdős and Rényi, On random graphs I (1959), with independent edges',
  parameters: [share('p', 'Probability p', 'Chance of an edge between any two nodes.', 0.2)],
  conflict: () => null,
  grow: (nodeCount, { p = 0 }, draw, join) => joinByChance(nodeCount, () => p, draw, join),
};

export const risingProbability: GrowthModel = {
  name: 'rising_probability',
  title: 'Probability rising with arrival',
  rule: 'Node i of n joins each earlier node with probability peak · (i / n)^power.',
  source:
    'an inhomogeneous random graph in the sense of Bollobás, Janson and Riordan, The phase transition in inhomogeneous random graphs, Random Structures & Algorithms 31 (2007)',
  parameters: [
    share('peak', 'Peak', 'Chance for the last node.', 1),
    {
      name: 'power',
      label: 'Power',
      meaning: '1 rises evenly; a larger power rises late.',
      least: 0,
      most: 10,
      whole: false,
      standard: 1,
    },
  ],
  conflict: () => null,
  grow: (nodeCount, { peak = 0, power = 1 }, draw, join) =>
    joinByChance(nodeCount, (i) => peak * (i / nodeCount) ** power, draw, join),
};

export const oscillatingProbability: GrowthModel = {
  name: 'oscillating_probability',
  title: 'Probability oscillating with arrival',
  rule: 'Node i joins each earlier node with probability mean + amplitude · sin(2π i / period).',
  source:
    'an inhomogeneous random graph in the sense of Bollobás, Janson and Riordan, The phase transition in inhomogeneous random graphs, Random Structures & Algorithms 31 (2007)',
  parameters: [
    share('mean', 'Mean', 'Chance in the middle of the swing.', 0.25),
    share('amplitude', 'Amplitude', 'How far the chance swings up and down.', 0.2),
    {
      name: 'period',
      label: 'Period',
      meaning: 'Arrivals from one peak to the next.',
      least: 2,
      most: 5_000,
      whole: false,
      standard: 20,
    },
  ],
  conflict: (_, { mean = 0, amplitude = 0 }) =>
    mean - amplitude < 0 || mean + amplitude > 1
      ? {
          field: 'amplitude',
          message: `The probability would swing from ${mean - amplitude} to ${mean + amplitude}. Keep mean − amplitude at 0 or more and mean + amplitude at 1 or less.`,
        }
      : null,
  grow: (nodeCount, { mean = 0, amplitude = 0, period = 1 }, draw, join) =>
    joinByChance(
      nodeCount,
      (i) => mean + amplitude * Math.sin((2 * Math.PI * i) / period),
      draw,
      join,
    ),
};
