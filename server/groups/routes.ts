import { z } from 'zod';
import { createGroupRequest, type Group } from '#contract/groups';
import { deleteGroup, type GroupRow } from '../../db/repositories/groups';
import type { Dependencies } from '../dependencies';
import { notFound } from '../http/parse';
import { created, done, ok, route, type RouteMap } from '../http/route';
import { createGroup, groupsOfRun } from './usecases';

const ofRun = z.strictObject({ workspaceId: z.uuid(), runId: z.uuid() });
const oneGroup = z.strictObject({ workspaceId: z.uuid(), groupId: z.uuid() });

export function groupRoutes({
  database: { db },
}: Dependencies): Pick<RouteMap, 'groups' | 'createGroup' | 'deleteGroup'> {
  return {
    groups: route('groups', { params: ofRun }, async ({ member, params }) =>
      ok({ groups: (await groupsOfRun(db, member, params.runId)).map(presentGroup) }),
    ),
    createGroup: route(
      'createGroup',
      { params: ofRun, body: createGroupRequest },
      async ({ member, params, body }) =>
        created(presentGroup(await createGroup(db, member, params.runId, body))),
    ),
    deleteGroup: route('deleteGroup', { params: oneGroup }, async ({ member, params }) => {
      if (!(await deleteGroup(db, member, params.groupId))) throw notFound('groups');
      return done;
    }),
  };
}

function presentGroup(row: GroupRow): Group {
  return {
    id: row.id,
    runId: row.runId,
    name: row.name,
    nodeIds: row.nodeIds,
    origin: row.origin,
    note: row.note,
    createdAt: row.createdAt.toISOString(),
    createdBy: row.createdBy,
  };
}
