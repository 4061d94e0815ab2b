import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { growNetwork, TooManyEdges } from '../../models/index';
import type { GrowRequest, ReadAnswer } from './messages';
import { readTwoFiles } from './twoFiles';

/** Grows a network and reads its two texts exactly as uploaded ones. */
export async function readGrown({ folder, growth }: GrowRequest): Promise<ReadAnswer> {
  const grown = grow(growth);
  if ('refusal' in grown) {
    return {
      kind: 'problems',
      issues: [{ field: 'nodeCount', message: grown.refusal }],
      leftOut: 0,
    };
  }
  const nodesPath = join(folder, 'nodes.csv');
  const edgesPath = join(folder, 'edges.csv');
  writeFileSync(nodesPath, grown.nodesCsv);
  writeFileSync(edgesPath, grown.edgesCsv);
  const outcome = await readTwoFiles({ folder, nodesPath, edgesPath });
  if ('nodes' in outcome) {
    return { kind: 'grown', network: outcome, description: grown.description };
  }
  throw new Error(
    `A grown network was refused: ${outcome.issues[0]?.message ?? 'no reason given'}`,
  );
}

function grow(growth: GrowRequest['growth']) {
  try {
    return growNetwork(growth);
  } catch (error) {
    if (error instanceof TooManyEdges) return { refusal: error.message };
    throw error;
  }
}
