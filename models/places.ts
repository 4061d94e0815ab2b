import type { Draw, GrowthModel, Join, Parameter } from './types';

/** Side of the square on which nodes lie is 1: no two are farther apart than this. */
const FARTHEST = Math.SQRT2;

const WRAP: Parameter = {
  name: 'wrap',
  label: 'Opposite sides joined',
  meaning: '0: nodes lie on a square; 1: on a torus, so that no node is at a border.',
  least: 0,
  most: 1,
  whole: true,
  standard: 0,
};

/**
 * Nodes lie evenly at random on the unit square in the order of arrival; each pair is joined with
 * the chance of its distance. O(n²). Every pair draws one number, needed or not.
 */
function joinByDistance(
  nodeCount: number,
  wrap: boolean,
  chance: (distance: number) => number,
  draw: Draw,
  join: Join,
): void {
  const x = new Float64Array(nodeCount);
  const y = new Float64Array(nodeCount);
  for (let i = 0; i < nodeCount; i++) {
    x[i] = draw.real();
    y[i] = draw.real();
  }
  const apart = (a: number, b: number): number => {
    const gap = Math.abs(a - b);
    return wrap ? Math.min(gap, 1 - gap) : gap;
  };
  for (let later = 1; later < nodeCount; later++) {
    for (let earlier = 0; earlier < later; earlier++) {
      const distance = Math.hypot(
        apart(x[earlier] ?? 0, x[later] ?? 0),
        apart(y[earlier] ?? 0, y[later] ?? 0),
      );
      if (draw.real() < chance(distance)) join(earlier, later);
    }
  }
}

export const randomGeometric: GrowthModel = {
  name: 'random_geometric',
  title: 'Random geometric',
  rule: 'Nodes lie evenly at random on a square of side 1; a node joins the earlier ones within the radius.',
  source:
    'Gilbert, Random plane networks, Journal of the Society for Industrial and Applied Mathematics 9 (1961); Penrose, Random Geometric Graphs (2003)',
  parameters: [
    {
      name: 'radius',
      label: 'Radius',
      meaning: 'Farthest that two joined nodes may lie apart, in sides of the square.',
      least: 0,
      most: FARTHEST,
      whole: false,
      standard: 0.2,
    },
    WRAP,
  ],
  conflict: () => null,
  grow: (nodeCount, { radius = 0, wrap = 0 }, draw, join) =>
    joinByDistance(nodeCount, wrap === 1, (d) => (d <= radius ? 1 : 0), draw, join),
};

export const distanceDecay: GrowthModel = {
  name: 'distance_decay',
  title: 'Growth by distance to earlier nodes',
  rule: 'Nodes lie evenly at random on a square of side 1; a node joins each earlier one with probability near · exp(−distance / scale).',
  source:
    'Waxman, Routing of multipoint connections, IEEE Journal on Selected Areas in Communications 6 (1988)',
  parameters: [
    {
      name: 'near',
      label: 'Chance when near',
      meaning: 'Chance of an edge between nodes at one place.',
      least: 0,
      most: 1,
      whole: false,
      standard: 0.9,
    },
    {
      name: 'scale',
      label: 'Scale',
      meaning: 'Distance over which the chance falls to 37 %, in sides of the square.',
      least: 0.001,
      most: 100,
      whole: false,
      standard: 0.1,
    },
    WRAP,
  ],
  conflict: () => null,
  grow: (nodeCount, { near = 0, scale = 1, wrap = 0 }, draw, join) =>
    joinByDistance(nodeCount, wrap === 1, (d) => near * Math.exp(-d / scale), draw, join),
};
