import { expect, it } from 'vitest';
import type { Network } from '../../jobs/engine/types';
import {
  constantProbability,
  preferentialAttachment,
  randomGeometric,
  risingProbability,
} from '../support/graphs';
import { fastMatrix } from './fastMatrix';

/** Every third value is shared with the next node. */
function tied(network: Network): Network {
  return { ...network, values: network.values.map((value) => value - (value % 3 === 2 ? 1 : 0)) };
}

const GRAPHS: readonly (readonly [string, Network])[] = [
  ['of constant probability', constantProbability(60, 0.35, 11)],
  ['of constant probability with ties', tied(constantProbability(50, 0.4, 12))],
  ['at the threshold of loops', constantProbability(90, 0.13, 13)],
  ['at the threshold of voids', constantProbability(55, 0.5, 14)],
  ['of rising probability', risingProbability(36, 15)],
  ['of preferential attachment', preferentialAttachment(120, 6, 16)],
  ['of points in a square', randomGeometric(80, 0.27, 17)],
];

it.each(GRAPHS)(
  'what the links settle and foresee leaves every value as it is: a graph %s',
  { timeout: 120_000 },
  (_, network) => {
    const plain = fastMatrix(network, { zeroTests: 'never' }).results;
    for (const zeroTests of ['auto', 'always'] as const) {
      const { distances, bettiGaps } = fastMatrix(network, { zeroTests }).results;
      expect(distances).toEqual(plain.distances);
      expect(bettiGaps).toEqual(plain.bettiGaps);
    }
  },
);
