import type { ReadNetwork } from '../types';

/** What is written of a network that was read: all but the counts of its import. */
export type WrittenNetwork = Omit<ReadNetwork, 'report'>;
