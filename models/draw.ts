import { uniformFloat64 } from 'pure-rand/distribution/uniformFloat64';
import { uniformInt } from 'pure-rand/distribution/uniformInt';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import type { Draw } from './types';

/** Named with every network that is drawn with it. */
export const GENERATOR = 'xoroshiro128+';

/** xoroshiro128+ (Blackman, Vigna 2018). */
export function drawFrom(seed: number): Draw {
  const generator = xoroshiro128plus(seed);
  return {
    real: () => uniformFloat64(generator),
    integer: (from, to) => uniformInt(generator, from, to),
  };
}
