import { computed, ref } from 'vue';
import { defineStore } from 'pinia';
import type { Instance, Me, SignInRequest, SignUpRequest } from '#contract/accounts';
import { mayUse, type RouteName } from '#contract/access';
import type { Role } from '#contract/enums';
import * as accounts from '../api/accounts';
import { ApiProblem } from '../api/client';

/** Who is signed in, and what their role in a workspace lets them do. */
export const useSessionStore = defineStore('session', () => {
  const me = ref<Me | null>(null);
  const instance = ref<Instance | null>(null);
  const unreachable = ref(false);
  const loaded = ref(false);

  async function load(): Promise<void> {
    if (loaded.value) return;
    try {
      [instance.value, me.value] = await Promise.all([accounts.getInstance(), accounts.getMe()]);
      loaded.value = true;
      unreachable.value = false;
    } catch (error) {
      if (!(error instanceof ApiProblem)) throw error;
      unreachable.value = true;
    }
  }

  async function reload(): Promise<void> {
    loaded.value = false;
    await load();
  }

  async function signIn(body: SignInRequest): Promise<void> {
    me.value = await accounts.signIn(body);
  }

  async function signUp(body: SignUpRequest): Promise<void> {
    me.value = await accounts.signUp(body);
    if (instance.value) instance.value = { ...instance.value, hasAccounts: true };
  }

  async function signOut(): Promise<void> {
    await accounts.signOut();
    me.value = null;
  }

  /** The session has ended on the server. */
  function forget(): void {
    me.value = null;
  }

  const memberships = computed(() => me.value?.memberships ?? []);

  function roleIn(workspaceId: string): Role | null {
    return memberships.value.find((m) => m.workspaceId === workspaceId)?.role ?? null;
  }

  /** By the same table as the server's (contract/access). */
  function may(workspaceId: string, route: RouteName): boolean {
    const role = roleIn(workspaceId);
    return role !== null && mayUse(role, route);
  }

  return {
    me,
    instance,
    unreachable,
    memberships,
    load,
    reload,
    signIn,
    signUp,
    signOut,
    forget,
    roleIn,
    may,
  };
});
