import type { DimensionChanges } from './changes';
import { lowerBound } from './sort';

/**
 * The infinite part of the bottleneck distance: births of both sides sorted and matched in order,
 * the largest difference. Only what changes is walked over: births that wait for a partner queue up
 * (all of one side), and a common birth passes the queue on by one place.
 *
 * @param recorded birth ranks of the recorded infinite bars, ascending
 * @param value f by rank
 */
export function infiniteDistance(
  recorded: Int32Array,
  value: Float64Array,
  changes: DimensionChanges,
  queue: number[],
): number {
  const { ranks, counts, rankCount } = changes;
  queue.length = 0;
  let head = 0;
  let waiting = 0;
  let largest = 0;
  let i = 0;
  const meet = (rank: number) => {
    largest = Math.max(largest, value[rank]! - value[queue[head++]!]!);
  };
  for (let t = 0; t < rankCount; t++) {
    const rank = ranks[t]!;
    if (waiting === 0) i = lowerBound(recorded, recorded.length, rank);
    for (; i < recorded.length && recorded[i]! < rank; i++) {
      meet(recorded[i]!);
      queue.push(recorded[i]!);
    }
    const sign = Math.sign(counts[t]!);
    for (let n = Math.abs(counts[t]!); n > 0; n--) {
      if (sign < 0) i++;
      if (waiting * sign < 0) meet(rank);
      else queue.push(rank);
      waiting += sign;
    }
  }
  if (waiting !== 0) throw new Error('A swap changed the number of infinite bars.');
  return largest;
}
