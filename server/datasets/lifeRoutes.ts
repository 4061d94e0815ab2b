import { z } from 'zod';
import { purgeDatasetRequest, type DeletedDatasetList } from '#contract/datasets';
import {
  archiveDataset,
  deleteDataset,
  findNameToPurge,
  listDeletedDatasets,
  purgeDataset,
  restoreDataset,
} from '../../db/repositories/datasetLife';
import type { Dependencies } from '../dependencies';
import { invalid, notFound } from '../http/parse';
import { done, ok, route, type RouteMap } from '../http/route';
import { presentDataset } from './presenter';
import { datasetOf } from './usecases';

const params = z.strictObject({ workspaceId: z.uuid(), datasetId: z.uuid() });

type LifeRoutes = Pick<
  RouteMap,
  'deletedDatasets' | 'archiveDataset' | 'restoreDataset' | 'deleteDataset' | 'purgeDataset'
>;

/** How a dataset leaves the list and comes back. */
export function datasetLifeRoutes({ database: { db } }: Dependencies): LifeRoutes {
  return {
    deletedDatasets: route('deletedDatasets', {}, async ({ member }) => {
      const rows = await listDeletedDatasets(db, member);
      const list: DeletedDatasetList = {
        datasets: rows.map(({ deletedAt, restorableUntil, ...row }) => ({
          ...row,
          deletedAt: deletedAt.toISOString(),
          restorableUntil: restorableUntil.toISOString(),
        })),
      };
      return ok(list);
    }),
    archiveDataset: route(
      'archiveDataset',
      { params },
      async ({ member, params: { datasetId } }) => {
        if (!(await archiveDataset(db, member, datasetId))) throw notFound('datasets');
        return ok(presentDataset(await datasetOf(db, member, datasetId)));
      },
    ),
    restoreDataset: route(
      'restoreDataset',
      { params },
      async ({ member, params: { datasetId } }) => {
        if (!(await restoreDataset(db, member, datasetId))) throw notFound('datasets');
        return ok(presentDataset(await datasetOf(db, member, datasetId)));
      },
    ),
    deleteDataset: route('deleteDataset', { params }, async ({ member, params: { datasetId } }) => {
      if (!(await deleteDataset(db, member, datasetId))) throw notFound('datasets');
      return done;
    }),
    purgeDataset: route(
      'purgeDataset',
      { params, body: purgeDatasetRequest },
      async ({ member, params: { datasetId }, body }) => {
        const name = await findNameToPurge(db, member, datasetId);
        if (name === null) throw notFound('datasets');
        if (body.name !== name) {
          const message =
            'This is not the name of the dataset; type it exactly. Nothing was removed.';
          throw invalid([{ field: 'name', message }]);
        }
        if (!(await purgeDataset(db, member, datasetId))) throw notFound('datasets');
        return done;
      },
    ),
  };
}
