import { createWorkspaceRequest, type Workspace } from '#contract/workspaces';
import type { Role } from '#contract/enums';
import {
  findWorkspace,
  insertOwnedWorkspace,
  type WorkspaceRow,
} from '../../db/repositories/workspaces';
import type { Dependencies } from '../dependencies';
import { notFound } from '../http/parse';
import { created, ok, route, type RouteMap } from '../http/route';

export function workspaceRoutes({
  database: { db },
}: Dependencies): Pick<RouteMap, 'createWorkspace' | 'workspace'> {
  return {
    createWorkspace: route(
      'createWorkspace',
      { body: createWorkspaceRequest },
      async ({ actor, body }) => {
        const row = await db.transaction((transaction) =>
          insertOwnedWorkspace(transaction, body.name, actor.userId),
        );
        return created(presentWorkspace(row, 'owner'));
      },
    ),
    workspace: route('workspace', {}, async ({ member }) => {
      const row = await findWorkspace(db, member);
      if (row === null) throw notFound('workspaces');
      return ok(presentWorkspace(row, member.role));
    }),
  };
}

function presentWorkspace(row: WorkspaceRow, role: Role): Workspace {
  return { id: row.id, name: row.name, role, createdAt: row.createdAt.toISOString() };
}
