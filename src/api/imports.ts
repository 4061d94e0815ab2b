import {
  importDraft,
  importList,
  importWeights,
  savedImport,
  type ChangeImportRequest,
  type ImportDraft,
  type ImportList,
  type ImportWeights,
  type SavedImport,
  type SaveImportRequest,
} from '#contract/imports';
import { inWorkspace, requestJson, requestNothing } from './client';
import { uploadForm, type Upload } from './upload';

/** What an import begins with. */
export interface ImportStart {
  readonly files: readonly File[];
  readonly pasted: string;
  /** Absent for a new dataset. */
  readonly datasetId?: string;
}

type OnBytes = (sent: number, total: number) => void;

export async function getImports(workspaceId: string): Promise<ImportList['imports']> {
  return (await requestJson(inWorkspace(workspaceId, 'imports'), importList)).imports;
}

export const getImport = (workspaceId: string, importId: string): Promise<ImportDraft> =>
  requestJson(inWorkspace(workspaceId, 'imports', importId), importDraft);

export function createImport(
  workspaceId: string,
  { files, pasted, datasetId }: ImportStart,
  onBytes: OnBytes,
): Upload<ImportDraft> {
  const form = new FormData();
  if (datasetId !== undefined) form.append('datasetId', datasetId);
  if (pasted !== '') form.append('pasted', pasted);
  for (const file of files) form.append('files', file, file.name);
  return uploadForm(inWorkspace(workspaceId, 'imports'), form, importDraft, onBytes);
}

export const changeImport = (
  workspaceId: string,
  importId: string,
  body: ChangeImportRequest,
): Promise<ImportDraft> =>
  requestJson(inWorkspace(workspaceId, 'imports', importId), importDraft, {
    method: 'PATCH',
    body,
  });

export const getWeights = (workspaceId: string, importId: string): Promise<ImportWeights> =>
  requestJson(inWorkspace(workspaceId, 'imports', importId, 'weights'), importWeights);

export const saveImport = (
  workspaceId: string,
  importId: string,
  body: SaveImportRequest,
): Promise<SavedImport> =>
  requestJson(inWorkspace(workspaceId, 'imports', importId, 'save'), savedImport, {
    method: 'POST',
    body,
  });

export const deleteImport = (workspaceId: string, importId: string): Promise<void> =>
  requestNothing(inWorkspace(workspaceId, 'imports', importId), { method: 'DELETE' });

/** Where every problem of an import can be downloaded. */
export const problemsPath = (workspaceId: string, importId: string): string =>
  inWorkspace(workspaceId, 'imports', importId, 'problems.csv');
