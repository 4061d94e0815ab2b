import type { ImportReport } from '#contract/datasets';
import { importReport } from '#contract/datasets';
import type { RevisionOrigin } from '#contract/revisions';
import type { Db } from '../../db/client';
import { decodeUint32 } from '../../db/codecs/typedArrays';
import { findWeights } from '../../db/repositories/revisionContent';
import { findRevision, listNodes, type NewNode } from '../../db/repositories/revisions';
import type { Scope } from '../../db/repositories/scope';
import { contentHashInTurns } from '../../formats/canonical';
import { connectivity, sharing } from '../../formats/description';
import type { EntryUnit } from '../../formats/types';
import type { ReadNetwork } from '../datasets/readNetwork';
import { notFound } from '../http/parse';

/** A stored revision with all that is in it. */
export interface RevisionContent {
  readonly id: string;
  readonly datasetId: string;
  readonly number: number;
  readonly entryUnit: EntryUnit;
  readonly report: ImportReport;
  /** In row order. */
  readonly nodes: readonly NewNode[];
  /** u32[2 m] and f64[m], as in db/schema/revisions.ts. */
  readonly edges: Uint32Array;
  readonly weights: Float64Array | null;
}

/** @throws Failure `revisions.not_found` */
export async function contentOf(
  db: Db,
  scope: Scope,
  revisionId: string,
): Promise<RevisionContent> {
  const row = await findRevision(db, scope, revisionId);
  if (row === null) throw notFound('revisions');
  const [nodes, weights] = await Promise.all([
    listNodes(db, scope, revisionId),
    findWeights(db, scope, revisionId),
  ]);
  return {
    id: row.id,
    datasetId: row.datasetId,
    number: row.number,
    entryUnit: row.entryUnit,
    report: importReport.parse(row.report),
    nodes: nodes.map(({ nodeId, row: _, ...rest }) => ({ id: nodeId, ...rest })),
    edges: decodeUint32(row.edges),
    weights,
  };
}

type Changed = Partial<Pick<RevisionContent, 'nodes' | 'edges' | 'weights'>>;

/** The network of a revision with these changes, as a network that can be saved. */
export async function changedNetwork(
  content: RevisionContent,
  changed: Changed,
  origin: RevisionOrigin,
): Promise<ReadNetwork> {
  const { nodes, edges, weights, entryUnit } = { ...content, ...changed };
  const { imported } = content.report;
  return {
    nodes,
    edges,
    weights,
    entryUnit,
    contentHash: await contentHashInTurns({ nodes, edges, entryUnit }),
    report: {
      nodeRows: nodes.length,
      edgeRows: edges.length / 2,
      ...{ selfLoops: 0, duplicateEdges: 0, reversedEdges: 0 },
      tiedNodes: sharing(nodes, ({ entry }) => entry),
      repeatedLabels: sharing(nodes, ({ label }) => label.normalize('NFC')),
      ...connectivity(nodes.length, edges),
      ignoredColumns: [],
      ...(imported && { imported }),
      origin,
    },
  };
}
