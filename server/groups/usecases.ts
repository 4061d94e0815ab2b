import type { z } from 'zod';
import type { createGroupRequest } from '#contract/groups';
import type { Db } from '../../db/client';
import {
  findRevisionOfRun,
  insertGroup,
  listGroups,
  type GroupRow,
} from '../../db/repositories/groups';
import { listNodes } from '../../db/repositories/revisions';
import type { Scope } from '../../db/repositories/scope';
import { invalid, notFound } from '../http/parse';

/** How many wrong ids are named. */
const NAMED = 20;

export async function groupsOfRun(db: Db, scope: Scope, runId: string): Promise<GroupRow[]> {
  if ((await findRevisionOfRun(db, scope, runId)) === null) throw notFound('runs');
  return listGroups(db, scope, runId);
}

/**
 * Saves a group of nodes of the run's revision, in row order.
 * @throws Failure `request.invalid` naming ids that the revision does not hold, or that repeat
 */
export async function createGroup(
  db: Db,
  scope: Scope,
  runId: string,
  request: z.output<typeof createGroupRequest>,
): Promise<GroupRow> {
  const revisionId = await findRevisionOfRun(db, scope, runId);
  if (revisionId === null) throw notFound('runs');
  const nodes = await listNodes(db, scope, revisionId);
  requireNodes(request.nodeIds, new Set(nodes.map(({ nodeId }) => nodeId)));
  const chosen = new Set(request.nodeIds);
  const nodeIds = nodes.map(({ nodeId }) => nodeId).filter((nodeId) => chosen.has(nodeId));
  const id = await insertGroup(db, scope, { ...request, runId, nodeIds });
  const row = (await listGroups(db, scope, runId)).find((group) => group.id === id);
  if (row === undefined) throw notFound('groups');
  return row;
}

function requireNodes(wanted: readonly string[], known: ReadonlySet<string>): void {
  const strangers = wanted.filter((nodeId) => !known.has(nodeId));
  if (strangers.length > 0) {
    throw invalid(
      strangers.slice(0, NAMED).map((nodeId) => ({
        field: 'nodeIds',
        message: `There is no node "${nodeId}" in the revision of this run.`,
      })),
      Math.max(0, strangers.length - NAMED),
    );
  }
  const seen = new Set<string>();
  for (const nodeId of wanted) {
    if (seen.has(nodeId)) {
      throw invalid([
        { field: 'nodeIds', message: `The node "${nodeId}" is named twice; name it once.` },
      ]);
    }
    seen.add(nodeId);
  }
}
