import { shallowRef } from 'vue';
import { defineStore } from 'pinia';
import type { GrowDatasetRequest, GrowthModelList } from '#contract/models';
import * as api from '../api/models';

/** The models that a network can be grown from. */
export const useModelsStore = defineStore('models', () => {
  const list = shallowRef<GrowthModelList | null>(null);

  async function load(workspaceId: string): Promise<void> {
    list.value = await api.getGrowthModels(workspaceId);
  }

  /** @returns the id of the new dataset */
  async function grow(workspaceId: string, request: GrowDatasetRequest): Promise<string> {
    return (await api.growDataset(workspaceId, request)).id;
  }

  return { list, load, grow };
});
