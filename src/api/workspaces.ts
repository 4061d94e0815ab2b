import type { Role } from '#contract/enums';
import {
  member,
  memberList,
  workspace,
  type AddMemberRequest,
  type Member,
  type Workspace,
} from '#contract/workspaces';
import { inWorkspace, requestJson, requestNothing } from './client';

export const createWorkspace = (name: string): Promise<Workspace> =>
  requestJson('/api/workspaces', workspace, { method: 'POST', body: { name } });

export const getWorkspace = (workspaceId: string): Promise<Workspace> =>
  requestJson(inWorkspace(workspaceId), workspace);

export async function getMembers(workspaceId: string): Promise<Member[]> {
  return (await requestJson(inWorkspace(workspaceId, 'members'), memberList)).members;
}

export const addMember = (workspaceId: string, body: AddMemberRequest): Promise<Member> =>
  requestJson(inWorkspace(workspaceId, 'members'), member, { method: 'POST', body });

export const changeMember = (workspaceId: string, userId: string, role: Role): Promise<Member> =>
  requestJson(inWorkspace(workspaceId, 'members', userId), member, {
    method: 'PATCH',
    body: { role },
  });

export const removeMember = (workspaceId: string, userId: string): Promise<void> =>
  requestNothing(inWorkspace(workspaceId, 'members', userId), { method: 'DELETE' });
