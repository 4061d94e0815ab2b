import { computed, ref, shallowRef } from 'vue';
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
import { withChanges, withOneMore } from './importChanges';

/** Imports begun in a workspace, and the one on screen. */
export const useImportsStore = defineStore('imports', () => {
  const list = shallowRef<ImportList['imports']>([]);
  /** As the server last told it. */
  const told = shallowRef<ImportDraft | null>(null);
  /** The change that is being read, and those behind it. */
  const sending = shallowRef<ChangeImportRequest | null>(null);
  const waiting = shallowRef<readonly ChangeImportRequest[]>([]);
  /** How many edges each threshold keeps; null where the edges have no weights, or not asked yet. */
  const weights = shallowRef<ImportWeights['weights']>(null);
  /** Bytes that have left, of all; null while nothing is sent. */
  const sent = ref<{ bytes: number; total: number } | null>(null);
  let upload: Upload<ImportDraft> | null = null;
  let reading: Promise<void> | null = null;

  const changing = computed(() => sending.value !== null || waiting.value.length > 0);
  /** The import on screen, with what was chosen since the server last told of it. */
  const current = computed(() => {
    const changes = sending.value === null ? waiting.value : [sending.value, ...waiting.value];
    return told.value && withChanges(told.value, changes);
  });

  async function loadList(workspaceId: string): Promise<void> {
    list.value = await api.getImports(workspaceId);
  }

  /** An answer that was overtaken by a change, or is about an import that was left, is passed over. */
  function keep(draft: ImportDraft): void {
    const known = told.value;
    if (known === null || (known.id === draft.id && known.version <= draft.version)) {
      told.value = draft;
    }
  }

  async function load(workspaceId: string, importId: string): Promise<void> {
    if (told.value?.id !== importId) {
      told.value = weights.value = null;
      waiting.value = [];
    }
    keep(await api.getImport(workspaceId, importId));
  }

  async function begin(workspaceId: string, start: api.ImportStart): Promise<ImportDraft> {
    upload = api.createImport(workspaceId, start, (bytes, total) => {
      sent.value = { bytes, total };
    });
    try {
      const draft = await upload.answer;
      weights.value = null;
      waiting.value = [];
      told.value = draft;
      return draft;
    } finally {
      upload = null;
      sent.value = null;
    }
  }

  /** Takes a change; it shows at once, and is read by the next `settle`. */
  function ask(change: ChangeImportRequest): void {
    waiting.value = withOneMore(waiting.value, change);
  }

  /** Sends what was asked, one after the other. @throws ApiProblem; what was not sent is forgotten then */
  function settle(workspaceId: string): Promise<void> {
    reading ??= sendAll(workspaceId).finally(() => {
      reading = null;
    });
    return reading;
  }

  async function sendAll(workspaceId: string): Promise<void> {
    try {
      for (;;) {
        const [change, ...rest] = waiting.value;
        if (change === undefined || told.value === null) return;
        waiting.value = rest;
        sending.value = change;
        keep(await api.changeImport(workspaceId, told.value.id, change));
        sending.value = null;
      }
    } catch (error) {
      waiting.value = [];
      throw error;
    } finally {
      sending.value = null;
    }
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

  const abort = (): void => upload?.abort();

  return {
    ...{ list, current, changing, weights, sent },
    ...{ loadList, load, begin, ask, settle, loadWeights, save, remove, abort },
    problemsPath: api.problemsPath,
  };
});
