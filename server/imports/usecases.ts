import { createImportFields, type ChangeImportRequest } from '#contract/imports';
import type { Db } from '../../db/client';
import { findDataset } from '../../db/repositories/datasets';
import { askImportEstimate, dropImportEstimate } from '../../db/repositories/importEstimates';
import {
  changeHint,
  insertImportFile,
  listImportFiles,
  type ImportFileRow,
} from '../../db/repositories/importFiles';
import {
  changeImport,
  countImports,
  deleteImport,
  findImport,
  insertImport,
  listImports,
  storeReading,
  type ImportHead,
  type ImportRow,
} from '../../db/repositories/imports';
import type { Scope } from '../../db/repositories/scope';
import { piecesOf } from '../datasets/arrayPieces';
import { filePieces } from '../datasets/filePieces';
import type { Received } from '../datasets/uploadForm';
import { invalid, notFound, parseBody } from '../http/parse';
import { draftView } from '../reading/draftView';
import type { Problems, ReadDraft } from '../reading/messages';
import { alreadySaved, importChanged, tooManyImports } from './errors';
import { readByMemory, withFiles, type ImportTools } from './reading';
import { sourcesOf } from './receive';

/** Open drafts of a workspace, and the bytes of their files. */
const MOST_OPEN = { drafts: 50, bytes: 1024 * 1024 * 1024 };

/** Stores what was sent as a draft and reads it. @returns the draft, whatever is wrong with the files */
export async function createImport(
  tools: ImportTools,
  scope: Scope,
  received: Received,
): Promise<ImportRow> {
  const { db } = tools;
  const { name, datasetId, pasted } = parseBody(createImportFields, received.fields);
  const sources = await sourcesOf(received, pasted);
  const named = name || sources[0]?.name.replace(/\.\w{1,8}$/, '') || 'Import';
  const id = await db.transaction(async (transaction) => {
    const open = await countImports(transaction, scope);
    if (open.drafts >= MOST_OPEN.drafts || open.bytes >= MOST_OPEN.bytes) {
      throw tooManyImports(open.drafts);
    }
    if (datasetId !== undefined && !(await findDataset(transaction, scope, datasetId))) {
      throw notFound('datasets');
    }
    const draft = { name: named, datasetId: datasetId ?? null };
    const made = await insertImport(transaction, scope, draft);
    for (const { path, ...file } of sources) {
      await insertImportFile(transaction, scope, made, file, filePieces(path));
    }
    return made;
  });
  try {
    const files = sources.map((source) => ({ ...source, hint: {} }));
    const request = { folder: received.folder, files, choices: null };
    await keep(db, scope, { id, version: 1 }, await readByMemory(tools, scope, request));
    return await importOf(tools, scope, id);
  } catch (error) {
    // Nobody was told of it, so nobody would come back to it.
    await deleteImport(db, scope, id);
    throw error;
  }
}

export interface ImportWithFiles {
  readonly head: ImportHead;
  readonly files: readonly ImportFileRow[];
}

/** The open drafts of the workspace. */
export async function importsOf({ db }: ImportTools, scope: Scope): Promise<ImportWithFiles[]> {
  const heads = await listImports(db, scope);
  const files = await listImportFiles(
    db,
    scope,
    heads.map(({ id }) => id),
  );
  return heads.map((head) => ({
    head,
    files: files.filter(({ importId }) => importId === head.id),
  }));
}

/**
 * An import with what its files mean; they are read anew where something changed since.
 * @throws Failure `imports.not_found`, or `imports.changed` where somebody changed it meanwhile
 */
export async function importOf(
  tools: ImportTools,
  scope: Scope,
  importId: string,
): Promise<ImportRow> {
  const row = await requireImport(tools, scope, importId);
  if (row.readVersion === row.version) return row;
  await withFiles(tools, scope, row, async (request) => {
    await keep(tools.db, scope, row, await readByMemory(tools, scope, request));
  });
  const read = await requireImport(tools, scope, importId);
  if (read.readVersion !== read.version) throw importChanged();
  return read;
}

/** Stores what was read, and asks a worker about the network; nothing of it where the draft changed. */
async function keep(
  db: Db,
  scope: Scope,
  { id, version }: Pick<ImportRow, 'id' | 'version'>,
  { view, weights, growth }: ReadDraft,
): Promise<void> {
  await db.transaction(async (transaction) => {
    const reading = { version, view, weights };
    if (!(await storeReading(transaction, scope, id, reading))) return;
    if (growth === null) return dropImportEstimate(transaction, scope, id);
    const arrays = { entries: piecesOf(growth.entries), edges: piecesOf(growth.edges) };
    await askImportEstimate(transaction, scope, { importId: id, version }, arrays);
  });
}

async function requireImport(
  { db }: ImportTools,
  scope: Scope,
  importId: string,
): Promise<ImportRow> {
  const row = await findImport(db, scope, importId);
  if (row === null) throw notFound('imports');
  return row;
}

/** Changes what was said about an open draft, and reads it by that. */
export async function changeDraft(
  tools: ImportTools,
  scope: Scope,
  importId: string,
  { name, choices, hints = [] }: ChangeImportRequest,
): Promise<ImportRow> {
  const row = await requireImport(tools, scope, importId);
  if (row.state === 'saved') throw alreadySaved();
  const back = choices === null && hints.length === 0;
  // Going back to the guess is a choice too: what is remembered would take its place otherwise.
  const chosen = back
    ? draftView.parse((await importOf(tools, scope, importId)).view).guessed
    : choices;
  const rereads = chosen !== undefined || hints.length > 0;
  await tools.db.transaction(async (transaction) => {
    const set = {
      ...(name === undefined ? {} : { name }),
      ...(rereads ? { choices: chosen ?? null } : {}),
      rereads,
    };
    if (!(await changeImport(transaction, scope, importId, set))) throw importChanged();
    for (const { position, hint } of hints) {
      if (!(await changeHint(transaction, scope, importId, position, hint))) {
        const message = `There is no file ${position}; they are counted from 0.`;
        throw invalid([{ field: 'hints', message }]);
      }
    }
  });
  return importOf(tools, scope, importId);
}

/** Everything that is wrong with the files of an import. */
export async function problemsOf(
  tools: ImportTools,
  scope: Scope,
  importId: string,
): Promise<{ readonly row: ImportRow; readonly problems: Problems }> {
  const row = await importOf(tools, scope, importId);
  const { choices, issues, issuesLeftOut } = draftView.parse(row.view);
  if (issuesLeftOut === 0) return { row, problems: { issues, leftOut: 0 } };
  // The list is longer than a draft shows: the files are read again for all of it.
  const problems = await withFiles(tools, scope, { id: row.id, choices }, (request) =>
    tools.reader.readProblems(request),
  );
  return { row, problems };
}

/** Removes a draft. @throws Failure `imports.not_found`, `imports.saved` */
export async function dropDraft(tools: ImportTools, scope: Scope, importId: string): Promise<void> {
  const { state } = await requireImport(tools, scope, importId);
  if (state === 'saved') throw alreadySaved();
  if (!(await deleteImport(tools.db, scope, importId))) throw notFound('imports');
}
