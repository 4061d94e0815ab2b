import { dataset, type Dataset } from '#contract/datasets';
import { growthModelList, type GrowDatasetRequest, type GrowthModelList } from '#contract/models';
import { inWorkspace, requestJson } from './client';

export const getGrowthModels = (workspaceId: string): Promise<GrowthModelList> =>
  requestJson(inWorkspace(workspaceId, 'growth-models'), growthModelList);

/** Grows a network and saves it as a new dataset. */
export const growDataset = (workspaceId: string, body: GrowDatasetRequest): Promise<Dataset> =>
  requestJson(inWorkspace(workspaceId, 'datasets', 'from-model'), dataset, {
    method: 'POST',
    body,
  });
