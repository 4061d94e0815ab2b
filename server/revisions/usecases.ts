import type { z } from 'zod';
import type { ImportWeights } from '#contract/imports';
import type {
  correctionsRequest,
  RevisionDifference,
  RevisionOrigin,
  ThresholdRequest,
} from '#contract/revisions';
import type { Db } from '../../db/client';
import { decodeUint32 } from '../../db/codecs/typedArrays';
import { findRevisionBefore, findWeights } from '../../db/repositories/revisionContent';
import {
  findRevision,
  findRevisionSize,
  listNodes,
  type RevisionRow,
} from '../../db/repositories/revisions';
import type { Scope } from '../../db/repositories/scope';
import { keepHeavy } from '../../formats/understanding/weights';
import { sameContent } from '../datasets/errors';
import { addRevision, type SavedRevision } from '../datasets/usecases';
import { invalid, notFound } from '../http/parse';
import { weightSteps } from '../reading/weightSteps';
import { changedNetwork, contentOf, type RevisionContent } from './content';
import { correctedNodes, entryRulesOf } from './corrections';
import { differenceOf, type ComparedRevision } from './difference';
import { noWeights } from './errors';

/** What a revision has otherwise than the one before it. @throws Failure `revisions.not_found` */
export async function differenceToPrevious(
  db: Db,
  scope: Scope,
  revisionId: string,
): Promise<RevisionDifference> {
  const row = await revisionOf(db, scope, revisionId);
  const beforeId = await findRevisionBefore(db, scope, row);
  if (beforeId === null) return { number: row.number, previous: null, difference: null };
  const before = await revisionOf(db, scope, beforeId);
  return {
    number: row.number,
    previous: { id: before.id, number: before.number },
    difference: differenceOf(await compared(db, scope, before), await compared(db, scope, row)),
  };
}

async function revisionOf(db: Db, scope: Scope, revisionId: string): Promise<RevisionRow> {
  const row = await findRevision(db, scope, revisionId);
  if (row === null) throw notFound('revisions');
  return row;
}

async function compared(db: Db, scope: Scope, row: RevisionRow): Promise<ComparedRevision> {
  const nodes = await listNodes(db, scope, row.id);
  return { entryUnit: row.entryUnit, nodes, edges: decodeUint32(row.edges) };
}

/** How many edges each threshold would keep; null where the edges have no weights. */
export async function weightsOf(
  db: Db,
  scope: Scope,
  revisionId: string,
): Promise<ImportWeights['weights']> {
  const nodes = await findRevisionSize(db, scope, revisionId);
  if (nodes === null) throw notFound('revisions');
  const weights = await findWeights(db, scope, revisionId);
  return weights && weightSteps(weights, nodes);
}

/**
 * Saves the edges of weight ≥ least as the next revision of the dataset.
 * @throws Failure `revisions.no_weights`, `revisions.same_content`
 */
export async function thresholdRevision(
  db: Db,
  scope: Scope,
  revisionId: string,
  { least }: ThresholdRequest,
): Promise<SavedRevision> {
  const content = await contentOf(db, scope, revisionId);
  if (content.weights === null) throw noWeights(content.number);
  const choice = { kind: 'threshold', least } as const;
  const kept = keepHeavy(content.edges, content.weights, content.nodes.length, choice);
  if (kept.edges.length === content.edges.length) throw sameContent(content.number);
  const { edges, weights, below, withoutWeight } = kept;
  return saveChanged(
    db,
    scope,
    content,
    { edges, weights },
    {
      kind: 'threshold',
      from: content.number,
      ...{ least, below, withoutWeight },
    },
  );
}

/**
 * Saves the revision with corrected entries as the next of its dataset.
 * @throws Failure `request.invalid` by field, `revisions.same_content`
 */
export async function correctRevision(
  db: Db,
  scope: Scope,
  revisionId: string,
  { corrections }: z.output<typeof correctionsRequest>,
): Promise<SavedRevision> {
  const content = await contentOf(db, scope, revisionId);
  const rules = entryRulesOf(content.entryUnit, content.nodes, content.report);
  const { nodes, issues } = correctedNodes(content.nodes, corrections, rules);
  if (issues.length > 0) throw invalid(issues);
  if (JSON.stringify(nodes) === JSON.stringify(content.nodes)) throw sameContent(content.number);
  return saveChanged(
    db,
    scope,
    content,
    { nodes },
    {
      kind: 'corrections',
      from: content.number,
      corrections: corrections.map(({ row, entry, note }) => ({
        id: nodes[row]?.id ?? '',
        before: content.nodes[row]?.entryRaw ?? '',
        after: entry,
        note,
      })),
    },
  );
}

async function saveChanged(
  db: Db,
  scope: Scope,
  content: RevisionContent,
  changed: Parameters<typeof changedNetwork>[1],
  origin: RevisionOrigin,
): Promise<SavedRevision> {
  const network = await changedNetwork(content, changed, origin);
  return db.transaction((transaction) =>
    addRevision(transaction, scope, content.datasetId, network),
  );
}
