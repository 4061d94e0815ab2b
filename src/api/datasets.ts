import {
  dataset,
  datasetList,
  deletedDatasetList,
  revision,
  type CreateDatasetFields,
  type Dataset,
  type DeletedDatasetList,
  type Revision,
} from '#contract/datasets';
import { inWorkspace, requestJson, requestNothing } from './client';
import { uploadForm, type Upload } from './upload';

/** The two files of a network and its arrival record. */
export interface NetworkFiles {
  readonly nodes: File;
  readonly edges: File;
}

type OnBytes = (sent: number, total: number) => void;

/** Whether the list holds archived datasets too. */
export type Archived = 'hidden' | 'shown';

export async function getDatasets(workspaceId: string, archived: Archived): Promise<Dataset[]> {
  const path = `${inWorkspace(workspaceId, 'datasets')}?archived=${archived}`;
  return (await requestJson(path, datasetList)).datasets;
}

export const getDataset = (workspaceId: string, datasetId: string): Promise<Dataset> =>
  requestJson(inWorkspace(workspaceId, 'datasets', datasetId), dataset);

export const getDeletedDatasets = async (
  workspaceId: string,
): Promise<DeletedDatasetList['datasets']> =>
  (await requestJson(inWorkspace(workspaceId, 'deleted-datasets'), deletedDatasetList)).datasets;

export const moveDataset = (
  workspaceId: string,
  datasetId: string,
  verb: 'archive' | 'restore',
): Promise<Dataset> =>
  requestJson(inWorkspace(workspaceId, 'datasets', datasetId, verb), dataset, { method: 'POST' });

export const deleteDataset = (workspaceId: string, datasetId: string): Promise<void> =>
  requestNothing(inWorkspace(workspaceId, 'datasets', datasetId), { method: 'DELETE' });

/** Removes a dataset at once. @param name as it must be typed: the server compares it */
export const purgeDataset = (workspaceId: string, datasetId: string, name: string): Promise<void> =>
  requestNothing(inWorkspace(workspaceId, 'datasets', datasetId, 'purge'), {
    method: 'POST',
    body: { name },
  });

export const getRevision = (workspaceId: string, revisionId: string): Promise<Revision> =>
  requestJson(inWorkspace(workspaceId, 'revisions', revisionId), revision);

function formOf(files: NetworkFiles, fields: Partial<CreateDatasetFields>): FormData {
  const form = new FormData();
  for (const [name, value] of Object.entries(fields)) form.append(name, value);
  form.append('nodes', files.nodes, 'nodes.csv');
  form.append('edges', files.edges, 'edges.csv');
  return form;
}

export function createDataset(
  workspaceId: string,
  fields: CreateDatasetFields,
  files: NetworkFiles,
  onBytes: OnBytes,
): Upload<Dataset> {
  const path = inWorkspace(workspaceId, 'datasets');
  return uploadForm(path, formOf(files, { ...fields }), dataset, onBytes);
}

export function createRevision(
  workspaceId: string,
  datasetId: string,
  files: NetworkFiles,
  onBytes: OnBytes,
): Upload<Dataset> {
  const path = inWorkspace(workspaceId, 'datasets', datasetId, 'revisions');
  return uploadForm(path, formOf(files, {}), dataset, onBytes);
}
