import {
  dataset,
  datasetList,
  revision,
  type CreateDatasetFields,
  type Dataset,
  type Revision,
} from '#contract/datasets';
import { inWorkspace, requestJson } from './client';
import { uploadForm, type Upload } from './upload';

/** The two files of a network and its arrival record. */
export interface NetworkFiles {
  readonly nodes: File;
  readonly edges: File;
}

type OnBytes = (sent: number, total: number) => void;

export async function getDatasets(workspaceId: string): Promise<Dataset[]> {
  return (await requestJson(inWorkspace(workspaceId, 'datasets'), datasetList)).datasets;
}

export const getDataset = (workspaceId: string, datasetId: string): Promise<Dataset> =>
  requestJson(inWorkspace(workspaceId, 'datasets', datasetId), dataset);

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
