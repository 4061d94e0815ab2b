import { createReadStream } from 'node:fs';
import { UPLOAD_LIMITS } from '#contract/datasets';
import { contentHash } from '../../formats/canonical';
import { readNetwork } from '../../formats/nodesAndEdges';
import { writeArray } from './arrayFiles';
import type { NetworkOnDisk, Problems, TwoFilesRequest } from './messages';

/** Two uploaded files to a network, or to all that is wrong with them. */
export async function readTwoFiles({
  folder,
  nodesPath,
  edgesPath,
}: TwoFilesRequest): Promise<NetworkOnDisk | Problems> {
  const outcome = await readNetwork(
    { name: 'nodes.csv', bytes: createReadStream(nodesPath) },
    { name: 'edges.csv', bytes: createReadStream(edgesPath) },
    UPLOAD_LIMITS,
  );
  if (!outcome.ok) return { issues: outcome.issues, leftOut: outcome.leftOut };
  const { nodes, edges, weights, entryUnit, report } = outcome;
  return {
    nodes,
    edges: writeArray(folder, edges),
    weights: weights && writeArray(folder, weights),
    entryUnit,
    report,
    contentHash: contentHash({ nodes, edges, entryUnit }),
  };
}
