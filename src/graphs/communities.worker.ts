import { communitiesOf } from './communities';
import { swapSafeGraph } from './swapSafeGraph';

/** What the page asks: the safe pairs of a matrix (1 by pair index). */
export interface CommunitiesQuestion {
  readonly nodeCount: number;
  readonly safe: Uint8Array;
}

export interface CommunitiesAnswer {
  /** Arrival positions of every community, ascending; largest community first. */
  readonly communities: readonly (readonly number[])[];
  readonly modularity: number;
}

self.addEventListener('message', (event: MessageEvent<CommunitiesQuestion>) => {
  const { nodeCount, safe } = event.data;
  const { communities, modularity } = communitiesOf(swapSafeGraph(nodeCount, safe));
  const answer: CommunitiesAnswer = {
    communities: communities.map((members) => members.map(Number).sort((a, b) => a - b)),
    modularity,
  };
  self.postMessage(answer);
});
