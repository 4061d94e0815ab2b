import type { ImportReport } from '#contract/datasets';
import type { saveImportRequest, SavedImport } from '#contract/imports';
import type { z } from 'zod';
import type { Transaction } from '../../db/client';
import { remember } from '../../db/repositories/columnMemory';
import { dropImportEstimate } from '../../db/repositories/importEstimates';
import { lockImport, markSaved, type ImportRow } from '../../db/repositories/imports';
import { findRevisionNumber } from '../../db/repositories/revisions';
import type { Scope } from '../../db/repositories/scope';
import { networkFrom, type ReadNetwork } from '../datasets/readNetwork';
import { addDataset, addRevision } from '../datasets/usecases';
import { notFound } from '../http/parse';
import { draftView, type DraftView } from '../reading/draftView';
import { importChanged, notReady } from './errors';
import { withFiles, type ImportTools } from './reading';
import { importOf } from './usecases';

export type SaveWanted = z.output<typeof saveImportRequest>;

/**
 * Saves a draft as a dataset or as a revision of one: all of it or nothing, and once, however often
 * it is asked.
 *
 * @throws Failure `imports.changed`, `imports.not_ready`, `revisions.same_content`
 */
export async function saveImport(
  tools: ImportTools,
  scope: Scope,
  importId: string,
  wanted: SaveWanted,
): Promise<SavedImport> {
  const row = await importOf(tools, scope, importId);
  if (row.state === 'saved') return savedBefore(tools, scope, row);
  if (row.version !== wanted.version) throw importChanged();
  const view = draftView.parse(row.view);
  if (!view.ready) throw notReady();
  return withFiles(tools, scope, { id: row.id, choices: view.choices }, async (request) => {
    const read = networkFrom(await tools.reader.readDraftNetwork(request));
    const network = { ...read, report: reportOf(read.report, view) };
    return tools.db.transaction((transaction) =>
      saveOnce(transaction, scope, { row, view, network, wanted }),
    );
  });
}

interface Saving {
  readonly row: ImportRow;
  readonly view: DraftView;
  readonly network: ReadNetwork;
  readonly wanted: SaveWanted;
}

async function saveOnce(
  transaction: Transaction,
  scope: Scope,
  { row, view, network, wanted }: Saving,
): Promise<SavedImport> {
  const locked = await lockImport(transaction, scope, row.id);
  if (locked === null) throw notFound('imports');
  if (locked.state === 'saved') return savedBefore({ db: transaction }, scope, locked);
  if (locked.version !== wanted.version) throw importChanged();
  const saved =
    wanted.datasetId === undefined
      ? await addDataset(transaction, scope, named(wanted), network)
      : await addRevision(transaction, scope, wanted.datasetId, network);
  await markSaved(transaction, scope, row.id, saved);
  await dropImportEstimate(transaction, scope, row.id);
  if (view.signature !== null) await remember(transaction, scope, view.signature, view.choices);
  return saved;
}

function named({ name, description }: SaveWanted) {
  if (name === undefined) throw new Error('A new dataset has a name.');
  return { name, description };
}

async function savedBefore(
  { db }: Pick<ImportTools, 'db'> | { readonly db: Transaction },
  scope: Scope,
  { datasetId, revisionId }: Pick<ImportRow, 'datasetId' | 'revisionId'>,
): Promise<SavedImport> {
  if (datasetId === null || revisionId === null) throw new Error('A saved import has a revision.');
  const number = await findRevisionNumber(db, scope, revisionId);
  if (number === null) throw notFound('revisions');
  return { datasetId, revisionId, number };
}

/** The counts of any upload, and what was chosen and found. */
function reportOf(counts: ImportReport, { files, choices, found }: DraftView): ImportReport {
  return {
    ...counts,
    imported: {
      files: files.map(({ name, bytes, format, reading }) => ({ name, bytes, format, reading })),
      choices,
      found,
    },
  };
}
