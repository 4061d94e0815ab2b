import { z } from 'zod';
import { importWeights } from '#contract/imports';
import { correctionsRequest, madeRevision, thresholdRequest } from '#contract/revisions';
import type { Dependencies } from '../dependencies';
import { created, ok, route, type RouteMap } from '../http/route';
import { correctRevision, differenceToPrevious, thresholdRevision, weightsOf } from './usecases';

const params = z.strictObject({ workspaceId: z.uuid(), revisionId: z.uuid() });

type RevisionRoutes = Pick<
  RouteMap,
  'revisionDifference' | 'revisionWeights' | 'thresholdRevision' | 'correctRevision'
>;

export function revisionRoutes({ database: { db } }: Dependencies): RevisionRoutes {
  return {
    revisionDifference: route('revisionDifference', { params }, async (input) =>
      ok(await differenceToPrevious(db, input.member, input.params.revisionId)),
    ),
    revisionWeights: route('revisionWeights', { params }, async (input) =>
      ok(
        importWeights.parse({
          weights: await weightsOf(db, input.member, input.params.revisionId),
        }),
      ),
    ),
    thresholdRevision: route(
      'thresholdRevision',
      { params, body: thresholdRequest },
      async ({ member, params: { revisionId }, body }) =>
        created(madeRevision.parse(await thresholdRevision(db, member, revisionId, body))),
    ),
    correctRevision: route(
      'correctRevision',
      { params, body: correctionsRequest },
      async ({ member, params: { revisionId }, body }) =>
        created(madeRevision.parse(await correctRevision(db, member, revisionId, body))),
    ),
  };
}
