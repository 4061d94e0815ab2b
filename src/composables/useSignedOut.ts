import { useRoute, useRouter } from 'vue-router';
import type { ApiProblem } from '../api/client';
import { useSessionStore } from '../stores/session';

/** @returns leads to the sign-in page, and back afterwards, where a problem says the session ended. */
export function useSignedOut() {
  const router = useRouter();
  const route = useRoute();
  const session = useSessionStore();

  return async function signedOut(problem: ApiProblem): Promise<void> {
    if (problem.status !== 401 || session.me === null) return;
    session.forget();
    await router.replace({ name: 'sign-in', query: { next: route.fullPath } });
  };
}
