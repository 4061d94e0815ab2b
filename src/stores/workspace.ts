import { ref } from 'vue';
import { defineStore } from 'pinia';
import type { Role } from '#contract/enums';
import type { Member, Workspace } from '#contract/workspaces';
import * as api from '../api/workspaces';

/** The workspace on screen and its members. */
export const useWorkspaceStore = defineStore('workspace', () => {
  const workspace = ref<Workspace | null>(null);
  const members = ref<Member[]>([]);

  /** Fetches the workspace unless it is already here. */
  async function ensure(workspaceId: string): Promise<Workspace> {
    if (workspace.value?.id !== workspaceId) {
      workspace.value = null;
      members.value = [];
      workspace.value = await api.getWorkspace(workspaceId);
    }
    return workspace.value;
  }

  async function loadMembers(workspaceId: string): Promise<void> {
    members.value = await api.getMembers(workspaceId);
  }

  async function create(name: string): Promise<Workspace> {
    const made = await api.createWorkspace(name);
    workspace.value = made;
    members.value = [];
    return made;
  }

  async function addMember(workspaceId: string, email: string, role: Role): Promise<void> {
    await api.addMember(workspaceId, { email, role });
    await loadMembers(workspaceId);
  }

  async function changeMember(workspaceId: string, userId: string, role: Role): Promise<void> {
    await api.changeMember(workspaceId, userId, role);
    await loadMembers(workspaceId);
  }

  async function removeMember(workspaceId: string, userId: string): Promise<void> {
    await api.removeMember(workspaceId, userId);
    members.value = members.value.filter((member) => member.userId !== userId);
  }

  return {
    workspace,
    members,
    ensure,
    loadMembers,
    create,
    addMember,
    changeMember,
    removeMember,
  };
});
