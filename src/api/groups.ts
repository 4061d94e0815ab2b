import { group, groupList, type CreateGroupRequest, type Group } from '#contract/groups';
import { inWorkspace, requestJson, requestNothing } from './client';

export async function getGroups(workspaceId: string, runId: string): Promise<Group[]> {
  const path = inWorkspace(workspaceId, 'runs', runId, 'groups');
  return (await requestJson(path, groupList)).groups;
}

export const createGroup = (
  workspaceId: string,
  runId: string,
  body: CreateGroupRequest,
): Promise<Group> =>
  requestJson(inWorkspace(workspaceId, 'runs', runId, 'groups'), group, { method: 'POST', body });

export const deleteGroup = (workspaceId: string, groupId: string): Promise<void> =>
  requestNothing(inWorkspace(workspaceId, 'groups', groupId), { method: 'DELETE' });
