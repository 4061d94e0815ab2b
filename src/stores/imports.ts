import { ref, shallowRef } from 'vue';
import { defineStore } from 'pinia';
import type {
  ChangeImportRequest,
  ImportDraft,
  ImportList,
  ImportWeights,
  SavedImport,
  SaveImportRequest,
} from '#contract/imports';
import * as api from '../api/imports';
import type { Upload } from '../api/upload';

/** Imports begun in a workspace, and the one on screen. */
export const useImportsStore = defineStore('imports', () => {
  const list = shallowRef<ImportList['imports']>([]);
  const current = shallowRef<ImportDraft | null>(null);
  /** How many edges each threshold keeps; null where the edges have no weights, or not asked yet. */
  const weights = shallowRef<ImportWeights['weights']>(null);
  /** Bytes that have left, of all; null while nothing is sent. */
  const sent = ref<{ bytes: number; total: number } | null>(null);
  let running: Upload<ImportDraft> | null = null;

  async function loadList(workspaceId: string): Promise<void> {
    list.value = await api.getImports(workspaceId);
  }

  async function load(workspaceId: string, importId: string): Promise<void> {
    if (current.value?.id !== importId) current.value = weights.value = null;
    current.value = await api.getImport(workspaceId, importId);
  }

  async function begin(workspaceId: string, start: api.ImportStart): Promise<ImportDraft> {
    running = api.createImport(workspaceId, start, (bytes, total) => {
      sent.value = { bytes, total };
    });
    try {
      weights.value = null;
      current.value = await running.answer;
      return current.value;
    } finally {
      running = null;
      sent.value = null;
    }
  }

  async function change(workspaceId: string, body: ChangeImportRequest): Promise<void> {
    const draft = current.value;
    if (draft === null) return;
    current.value = await api.changeImport(workspaceId, draft.id, body);
  }

  async function loadWeights(workspaceId: string, importId: string): Promise<void> {
    weights.value = (await api.getWeights(workspaceId, importId)).weights;
  }

  const save = (
    workspaceId: string,
    importId: string,
    body: SaveImportRequest,
  ): Promise<SavedImport> => api.saveImport(workspaceId, importId, body);

  async function remove(workspaceId: string, importId: string): Promise<void> {
    await api.deleteImport(workspaceId, importId);
    list.value = list.value.filter(({ id }) => id !== importId);
  }

  const abort = (): void => running?.abort();

  return {
    ...{ list, current, weights, sent },
    ...{ loadList, load, begin, change, loadWeights, save, remove, abort },
    problemsPath: api.problemsPath,
  };
});
