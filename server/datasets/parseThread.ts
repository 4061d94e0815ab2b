import { createReadStream } from 'node:fs';
import { UPLOAD_LIMITS } from '#contract/datasets';
import { contentHash } from '../../formats/canonical';
import { readNetwork } from '../../formats/nodesAndEdges';
import type { ReadOutcome, ReadRequest } from './readMessages';

/** What the reading thread does: two uploaded files to a network, or to all that is wrong with them. */
export default async function read({ nodesPath, edgesPath }: ReadRequest): Promise<ReadOutcome> {
  const outcome = await readNetwork(
    { name: 'nodes.csv', bytes: createReadStream(nodesPath) },
    { name: 'edges.csv', bytes: createReadStream(edgesPath) },
    UPLOAD_LIMITS,
  );
  if (!outcome.ok) return { issues: outcome.issues, leftOut: outcome.leftOut };
  const { nodes, edges, entryUnit, report } = outcome;
  return { nodes, edges, entryUnit, report, contentHash: contentHash({ nodes, edges, entryUnit }) };
}
