import { growDatasetRequest, type GrowthModelList } from '#contract/models';
import { GROWTH_LIMITS, GROWTH_MODELS } from '../../models/index';
import { presentDataset } from '../datasets/presenter';
import { datasetOf } from '../datasets/usecases';
import type { Dependencies } from '../dependencies';
import { created, ok, route, type RouteMap } from '../http/route';
import { growDataset } from './usecases';

export function modelRoutes({
  database: { db },
  reader,
  uploads,
}: Dependencies): Pick<RouteMap, 'growthModels' | 'growDataset'> {
  const list = presentModels();
  return {
    growthModels: route('growthModels', {}, () => Promise.resolve(ok(list))),
    growDataset: route('growDataset', { body: growDatasetRequest }, async ({ member, body }) => {
      const id = await growDataset({ db, reader, uploads }, member, body);
      return created(presentDataset(await datasetOf(db, member, id)));
    }),
  };
}

const presentModels = (): GrowthModelList => ({
  models: GROWTH_MODELS.map(({ name, title, rule, source, parameters }) => ({
    name,
    title,
    rule,
    source,
    parameters: parameters.map((one) => ({ ...one })),
  })),
  limits: { ...GROWTH_LIMITS },
});
