import type { CreateDatasetFields } from '#contract/datasets';
import type { Db, Transaction } from '../../db/client';
import {
  findDataset,
  insertDataset,
  listDatasets,
  listRunBriefs,
  lockDataset,
  type DatasetRow,
  type RunBriefRow,
} from '../../db/repositories/datasets';
import {
  findLatestRevision,
  insertRevision,
  listRevisions,
  type RevisionSummaryRow,
} from '../../db/repositories/revisions';
import type { Scope } from '../../db/repositories/scope';
import { notFound } from '../http/parse';
import { keepOriginals } from '../imports/originals';
import type { ReceivedSource } from '../imports/receive';
import { sameContent } from './errors';
import type { ReadNetwork } from './readNetwork';

export interface DatasetWithHistory {
  readonly dataset: DatasetRow;
  readonly revisions: readonly RevisionSummaryRow[];
  readonly runs: readonly RunBriefRow[];
}

export interface SavedRevision {
  readonly datasetId: string;
  readonly revisionId: string;
  readonly number: number;
}

/**
 * Saves a network as a new dataset with revision 1: all of it or nothing. @returns its id
 * @param sources the files it was read from, kept beside it
 */
export async function createDataset(
  db: Db,
  scope: Scope,
  fields: CreateDatasetFields & { readonly invented?: boolean },
  network: ReadNetwork,
  sources: readonly ReceivedSource[] = [],
): Promise<string> {
  return db.transaction(async (transaction) => {
    const made = await addDataset(transaction, scope, fields, network);
    await keepOriginals(transaction, scope, made, sources);
    return made.datasetId;
  });
}

/** The same within a transaction that does more. */
export async function addDataset(
  transaction: Transaction,
  scope: Scope,
  fields: CreateDatasetFields & { readonly invented?: boolean },
  network: ReadNetwork,
): Promise<SavedRevision> {
  const { id } = await insertDataset(transaction, scope, fields);
  return saveRevision(transaction, scope, id, 1, network);
}

/** Saves a network as the next revision. @throws Failure `revisions.same_content` */
export async function createRevision(
  db: Db,
  scope: Scope,
  datasetId: string,
  network: ReadNetwork,
  sources: readonly ReceivedSource[],
): Promise<void> {
  await db.transaction(async (transaction) => {
    const made = await addRevision(transaction, scope, datasetId, network);
    await keepOriginals(transaction, scope, made, sources);
  });
}

/** The same within a transaction that does more. */
export async function addRevision(
  transaction: Transaction,
  scope: Scope,
  datasetId: string,
  network: ReadNetwork,
): Promise<SavedRevision> {
  if ((await lockDataset(transaction, scope, datasetId)) === null) throw notFound('datasets');
  const latest = await findLatestRevision(transaction, scope, datasetId);
  if (latest?.contentHash === network.contentHash) throw sameContent(latest.number);
  return saveRevision(transaction, scope, datasetId, (latest?.number ?? 0) + 1, network);
}

async function saveRevision(
  transaction: Transaction,
  scope: Scope,
  datasetId: string,
  number: number,
  network: ReadNetwork,
): Promise<SavedRevision> {
  const { nodes, edges, weights, contentHash, entryUnit, report } = network;
  const revisionId = await insertRevision(transaction, scope, {
    datasetId,
    number,
    nodes,
    edges,
    weights,
    contentHash,
    entryUnit,
    report,
  });
  return { datasetId, revisionId, number };
}

export async function datasetsOf(
  db: Db,
  scope: Scope,
  archived: 'hidden' | 'shown',
): Promise<DatasetWithHistory[]> {
  return withHistory(db, scope, await listDatasets(db, scope, archived));
}

/** @throws Failure `datasets.not_found` */
export async function datasetOf(
  db: Db,
  scope: Scope,
  datasetId: string,
): Promise<DatasetWithHistory> {
  const row = await findDataset(db, scope, datasetId);
  const [dataset] = row === null ? [] : await withHistory(db, scope, [row]);
  if (dataset === undefined) throw notFound('datasets');
  return dataset;
}

async function withHistory(
  db: Db,
  scope: Scope,
  datasets: readonly DatasetRow[],
): Promise<DatasetWithHistory[]> {
  const ids = datasets.map(({ id }) => id);
  const [revisions, runs] = await Promise.all([
    listRevisions(db, scope, ids),
    listRunBriefs(db, scope, ids),
  ]);
  const revisionsOf = byDataset(revisions);
  const runsOf = byDataset(runs);
  return datasets.map((dataset) => ({
    dataset,
    revisions: revisionsOf.get(dataset.id) ?? [],
    runs: runsOf.get(dataset.id) ?? [],
  }));
}

function byDataset<T extends { readonly datasetId: string }>(rows: readonly T[]): Map<string, T[]> {
  const groups = new Map<string, T[]>();
  for (const row of rows) {
    const group = groups.get(row.datasetId);
    if (group) group.push(row);
    else groups.set(row.datasetId, [row]);
  }
  return groups;
}
