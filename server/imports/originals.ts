import type { Transaction } from '../../db/client';
import { insertImportFile } from '../../db/repositories/importFiles';
import { insertImport, markSaved } from '../../db/repositories/imports';
import type { Scope } from '../../db/repositories/scope';
import { filePieces } from '../datasets/filePieces';
import type { ReceivedSource } from './receive';

/** Keeps the files that a revision was read from beside it, as an import that was saved. */
export async function keepOriginals(
  transaction: Transaction,
  scope: Scope,
  saved: { readonly datasetId: string; readonly revisionId: string },
  sources: readonly ReceivedSource[],
): Promise<void> {
  if (sources.length === 0) return;
  const name = sources.map((source) => source.name).join(', ');
  const id = await insertImport(transaction, scope, { name, datasetId: saved.datasetId });
  for (const { path, ...file } of sources) {
    await insertImportFile(transaction, scope, id, file, filePieces(path));
  }
  await markSaved(transaction, scope, id, saved);
}
