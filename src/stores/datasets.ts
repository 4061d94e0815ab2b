import { ref, shallowRef } from 'vue';
import { defineStore } from 'pinia';
import type { CreateDatasetFields, Dataset, DeletedDatasetList } from '#contract/datasets';
import * as api from '../api/datasets';
import type { Upload } from '../api/upload';

/** The datasets of a workspace, and the one on screen. */
export const useDatasetsStore = defineStore('datasets', () => {
  const list = shallowRef<Dataset[]>([]);
  const current = shallowRef<Dataset | null>(null);
  /** What was deleted and can be restored. */
  const deleted = shallowRef<DeletedDatasetList['datasets']>([]);
  /** Bytes of the running upload that have left, of all; null while none runs. */
  const sent = ref<{ bytes: number; total: number } | null>(null);
  let running: Upload<Dataset> | null = null;

  async function loadList(workspaceId: string, archived: api.Archived = 'hidden'): Promise<void> {
    list.value = await api.getDatasets(workspaceId, archived);
  }

  async function loadDeleted(workspaceId: string): Promise<void> {
    deleted.value = await api.getDeletedDatasets(workspaceId);
  }

  async function move(
    workspaceId: string,
    datasetId: string,
    verb: 'archive' | 'restore',
  ): Promise<void> {
    current.value = await api.moveDataset(workspaceId, datasetId, verb);
  }

  const remove = api.deleteDataset;
  const purge = api.purgeDataset;

  async function load(workspaceId: string, datasetId: string): Promise<void> {
    if (current.value?.id !== datasetId) current.value = null;
    current.value = await api.getDataset(workspaceId, datasetId);
  }

  async function follow(upload: Upload<Dataset>): Promise<Dataset> {
    running = upload;
    try {
      current.value = await upload.answer;
      return current.value;
    } finally {
      running = null;
      sent.value = null;
    }
  }

  const onBytes = (bytes: number, total: number): void => {
    sent.value = { bytes, total };
  };

  const create = (
    workspaceId: string,
    fields: CreateDatasetFields,
    files: api.NetworkFiles,
  ): Promise<Dataset> => follow(api.createDataset(workspaceId, fields, files, onBytes));

  const createRevision = (
    workspaceId: string,
    datasetId: string,
    files: api.NetworkFiles,
  ): Promise<Dataset> => follow(api.createRevision(workspaceId, datasetId, files, onBytes));

  function abort(): void {
    running?.abort();
  }

  return {
    ...{ list, current, deleted, sent },
    ...{ loadList, loadDeleted, load, create, createRevision, abort, move, remove, purge },
  };
});
