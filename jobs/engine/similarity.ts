import { EngineInputError } from './types';

/**
 * Similarity of a swap: 1 - max over the chosen dimensions of d_k / bound, and 1 where the bound
 * is 0. In [0, 1] by stability (Cohen-Steiner, Edelsbrunner, Harer 2007).
 * @param distances d_k by dimension k, in the unit of f
 * @param bound abs(f(a) - f(b)), in the unit of f
 * @param dimensions the chosen dimensions, at least one, each with a distance
 */
export function similarity(
  distances: ArrayLike<number>,
  bound: number,
  dimensions: readonly number[],
): number {
  if (dimensions.length === 0) throw new EngineInputError('Choose at least one dimension.');
  let largest = 0;
  for (const k of dimensions) {
    const distance = distances[k];
    if (distance === undefined) throw new EngineInputError(`Dimension ${k} was not computed.`);
    largest = Math.max(largest, distance);
  }
  return bound === 0 ? 1 : 1 - largest / bound;
}
