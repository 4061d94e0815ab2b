import { ref, shallowRef } from 'vue';
import { defineStore } from 'pinia';
import type { CreateGroupRequest, Group } from '#contract/groups';
import { asProblem, type ApiProblem } from '../api/client';
import { createGroup, deleteGroup, getGroups } from '../api/groups';

/** The saved groups of the run on the bench. */
export const useBenchGroupsStore = defineStore('benchGroups', () => {
  const groups = shallowRef<readonly Group[]>([]);
  const busy = ref(false);
  const problem = shallowRef<ApiProblem | null>(null);

  async function attempt<T>(work: () => Promise<T>): Promise<T | null> {
    busy.value = true;
    problem.value = null;
    try {
      return await work();
    } catch (error) {
      problem.value = asProblem(error);
      return null;
    } finally {
      busy.value = false;
    }
  }

  async function load(workspaceId: string, runId: string): Promise<void> {
    groups.value = [];
    const found = await attempt(() => getGroups(workspaceId, runId));
    if (found !== null) groups.value = found;
  }

  /** @returns the saved group, or null if the server refused (see `problem`). */
  async function save(
    workspaceId: string,
    runId: string,
    body: CreateGroupRequest,
  ): Promise<Group | null> {
    const saved = await attempt(() => createGroup(workspaceId, runId, body));
    if (saved !== null) groups.value = [...groups.value, saved];
    return saved;
  }

  async function remove(workspaceId: string, groupId: string): Promise<boolean> {
    const done = await attempt(async () => {
      await deleteGroup(workspaceId, groupId);
      return true;
    });
    if (done === true) groups.value = groups.value.filter((group) => group.id !== groupId);
    return done === true;
  }

  return { groups, busy, problem, load, save, remove };
});
