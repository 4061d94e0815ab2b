import { computeRows, planBlocks, prepare } from '../../jobs/engine/index';
import type { Network } from '../../jobs/engine/types';
import { risingProbability } from './graphs';

const LIMITS = { simplices: 1e8, bytes: 4 * 2 ** 30 };
const NEVER = { shouldStop: () => false, onProgress: () => undefined };

/**
 * A network whose matrix takes one thread at least so many seconds here and now, in 16 blocks or
 * more: a run of it can be met in the middle, however fast the engine is.
 */
export function networkTaking(seconds: number, secondsPerBlock = 0.05): Network {
  for (let nodeCount = 36; ; nodeCount += 6) {
    const network = risingProbability(nodeCount, 2);
    const prepared = prepare(network, 3, LIMITS, NEVER);
    const blocks = planBlocks(prepared, secondsPerBlock);
    const middle = blocks[blocks.length >> 1];
    if (!middle || blocks.length < 16) continue;
    const from = performance.now();
    computeRows(prepared, middle, NEVER);
    if (((performance.now() - from) / 1000) * blocks.length >= seconds) return network;
  }
}
