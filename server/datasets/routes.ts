import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { z } from 'zod';
import { createDatasetFields, datasetsQuery } from '#contract/datasets';
import { decodeUint32 } from '../../db/codecs/typedArrays';
import { findRevision, listNodes } from '../../db/repositories/revisions';
import type { Dependencies } from '../dependencies';
import { notFound, parseBody } from '../http/parse';
import { sourcesOf } from '../imports/receive';
import { created, ok, route, SENT, type RouteMap } from '../http/route';
import { networkFrom } from './readNetwork';
import { presentDataset, presentRevision } from './presenter';
import { bothFiles, TWO_FILES } from './twoFilesForm';
import { createDataset, createRevision, datasetOf, datasetsOf } from './usecases';

const oneDataset = z.strictObject({ workspaceId: z.uuid(), datasetId: z.uuid() });
const oneRevision = z.strictObject({ workspaceId: z.uuid(), revisionId: z.uuid() });
const noFields = z.strictObject({});

type DatasetRoutes = Pick<
  RouteMap,
  'datasets' | 'createDataset' | 'dataset' | 'createRevision' | 'revision'
>;

export function datasetRoutes({ database: { db }, reader, uploads }: Dependencies): DatasetRoutes {
  return {
    datasets: route('datasets', { query: datasetsQuery }, async ({ member, query }) =>
      ok({ datasets: (await datasetsOf(db, member, query.archived)).map(presentDataset) }),
    ),
    dataset: route('dataset', { params: oneDataset }, async ({ member, params }) =>
      ok(presentDataset(await datasetOf(db, member, params.datasetId))),
    ),
    createDataset: route('createDataset', { body: 'multipart' }, ({ member, request }) =>
      uploads.receive(request, TWO_FILES, async (received) => {
        const files = bothFiles(received);
        const fields = parseBody(createDatasetFields, received.fields);
        const network = networkFrom(await reader.read(files));
        const sources = await sourcesOf(received);
        const id = await createDataset(db, member, fields, network, sources);
        return created(presentDataset(await datasetOf(db, member, id)));
      }),
    ),
    createRevision: route(
      'createRevision',
      { params: oneDataset, body: 'multipart' },
      async ({ member, params, request }) => {
        await datasetOf(db, member, params.datasetId);
        return uploads.receive(request, TWO_FILES, async (received) => {
          const files = bothFiles(received);
          parseBody(noFields, received.fields);
          const network = networkFrom(await reader.read(files));
          const sources = await sourcesOf(received);
          await createRevision(db, member, params.datasetId, network, sources);
          return created(presentDataset(await datasetOf(db, member, params.datasetId)));
        });
      },
    ),
    revision: route('revision', { params: oneRevision }, async (input) => {
      const { member, params, response } = input;
      const row = await findRevision(db, member, params.revisionId);
      if (row === null) throw notFound('revisions');
      const nodes = await listNodes(db, member, params.revisionId);
      response.status(200).type('application/json').setHeader('Cache-Control', 'no-store');
      await pipeline(Readable.from(presentRevision(row, nodes, decodeUint32(row.edges))), response);
      return SENT;
    }),
  };
}
