import {
  importReport,
  type Dataset,
  type Revision,
  type RevisionNode,
  type RevisionSummary,
  type RunBrief,
} from '#contract/datasets';
import type { RunBriefRow } from '../../db/repositories/datasets';
import type { NodeRow, RevisionRow, RevisionSummaryRow } from '../../db/repositories/revisions';
import type { DatasetWithHistory } from './usecases';

export function presentDataset({ dataset, revisions, runs }: DatasetWithHistory): Dataset {
  return {
    id: dataset.id,
    name: dataset.name,
    description: dataset.description,
    invented: dataset.invented,
    createdAt: dataset.createdAt.toISOString(),
    archivedAt: dataset.archivedAt?.toISOString() ?? null,
    revisions: revisions.map(presentSummary),
    runs: runs.map(presentRunBrief),
  };
}

function presentSummary(row: RevisionSummaryRow): RevisionSummary {
  return {
    id: row.id,
    datasetId: row.datasetId,
    number: row.number,
    contentHash: row.contentHash,
    nodeCount: row.nodeCount,
    edgeCount: row.edgeCount,
    entryUnit: row.entryUnit,
    createdAt: row.createdAt.toISOString(),
    createdBy: row.createdBy,
    report: importReport.parse(row.report),
  };
}

function presentRunBrief(row: RunBriefRow): RunBrief {
  return {
    id: row.id,
    number: row.number,
    revisionNumber: row.revisionNumber,
    scale: row.scale,
    dimensions: row.dimensions,
    part: row.part,
    state: row.state,
    createdAt: row.createdAt.toISOString(),
  };
}

function presentNode(row: NodeRow): RevisionNode {
  return {
    id: row.nodeId,
    label: row.label,
    entryRaw: row.entryRaw,
    entry: row.entry,
    earliestRaw: row.earliestRaw,
    earliest: row.earliest,
    latestRaw: row.latestRaw,
    latest: row.latest,
  };
}

/** Edges written in one piece of text. */
const EDGES_AT_ONCE = 20_000;

/**
 * A revision (contract: `revision`) as pieces of JSON text: with two million edges one string would
 * hold the thread that answers everybody for most of a second.
 */
export function* presentRevision(
  row: RevisionRow,
  nodes: readonly NodeRow[],
  edges: Uint32Array,
): Generator<string> {
  const head: Omit<Revision, 'edges'> = {
    ...presentSummary(row),
    datasetName: row.datasetName,
    invented: row.invented,
    nodes: nodes.map(presentNode),
  };
  yield `${JSON.stringify(head).slice(0, -1)},"edges":[`;
  for (let from = 0; from < edges.length; from += 2 * EDGES_AT_ONCE) {
    const pairs: string[] = [];
    const end = Math.min(edges.length, from + 2 * EDGES_AT_ONCE);
    for (let i = from; i < end; i += 2) pairs.push(`[${edges[i]},${edges[i + 1]}]`);
    yield `${from === 0 ? '' : ','}${pairs.join(',')}`;
  }
  yield ']}';
}
