import { ref } from 'vue';
import { defineStore } from 'pinia';
import type { RevisionNode } from '#contract/datasets';
import type { ImportWeights } from '#contract/imports';
import type { RevisionDifference } from '#contract/revisions';
import { getRevision } from '../api/datasets';
import * as api from '../api/revisions';

/** What was asked about revisions, by their ids; a revision never changes, so it is asked once. */
export const useRevisionsStore = defineStore('revisions', () => {
  const differences = ref<Record<string, RevisionDifference>>({});
  /** Null where the edges have no weights. */
  const weights = ref<Record<string, ImportWeights['weights']>>({});
  const nodes = ref<Record<string, readonly RevisionNode[]>>({});

  async function loadDifference(workspaceId: string, revisionId: string): Promise<void> {
    differences.value[revisionId] ??= await api.getDifference(workspaceId, revisionId);
  }

  async function loadWeights(workspaceId: string, revisionId: string): Promise<void> {
    if (revisionId in weights.value) return;
    weights.value[revisionId] = await api.getRevisionWeights(workspaceId, revisionId);
  }

  async function loadNodes(workspaceId: string, revisionId: string): Promise<void> {
    nodes.value[revisionId] ??= (await getRevision(workspaceId, revisionId)).nodes;
  }

  return {
    ...{ differences, weights, nodes, loadDifference, loadWeights, loadNodes },
    makeThreshold: api.makeThreshold,
    makeCorrections: api.makeCorrections,
  };
});
