import { decodeUint32 } from '../db/codecs/typedArrays';
import type { Db } from '../db/client';
import { readNetwork, type WorkRun } from '../db/repositories/runWork';
import type { Network } from './engine/types';
import { valuesOn } from './scales';

function sharedUint32(source: Uint32Array): Uint32Array {
  const shared = new Uint32Array(new SharedArrayBuffer(source.byteLength));
  shared.set(source);
  return shared;
}

function sharedFloat64(source: Float64Array): Float64Array {
  const shared = new Float64Array(new SharedArrayBuffer(source.byteLength));
  shared.set(source);
  return shared;
}

/** Which network, on which scale. */
export type NetworkWanted = Pick<WorkRun, 'workspaceId' | 'revisionId' | 'scale'>;

/** Revisions never change, so a network is read once; the latest few are kept, in shared memory. */
export class Networks {
  readonly #kept = new Map<string, Promise<Network | null>>();

  constructor(
    private readonly db: Db,
    private readonly most = 8,
  ) {}

  /** @returns the network on the run's scale, or null if its dataset was deleted. */
  async of(run: NetworkWanted): Promise<Network | null> {
    const key = `${run.revisionId} ${run.scale}`;
    const found = this.#kept.get(key) ?? this.#read(run);
    this.#kept.delete(key);
    this.#kept.set(key, found);
    if (this.#kept.size > this.most) this.#kept.delete(this.#kept.keys().next().value ?? '');
    try {
      const network = await found;
      if (!network) this.#kept.delete(key);
      return network;
    } catch (error) {
      this.#kept.delete(key);
      throw error;
    }
  }

  async #read({ workspaceId, revisionId, scale }: NetworkWanted): Promise<Network | null> {
    const stored = await readNetwork(this.db, workspaceId, revisionId);
    if (!stored) return null;
    return {
      nodeCount: stored.entries.length,
      edges: sharedUint32(decodeUint32(stored.edges)),
      values: sharedFloat64(valuesOn(scale, stored.entries)),
    };
  }
}
