import { ref, shallowRef } from 'vue';
import { asProblem, type ApiProblem } from '../api/client';
import { useSignedOut } from './useSignedOut';

/** Something a person asks for: busy while it runs, with the problem if it was refused. */
export function useAction<A extends unknown[]>(act: (...args: A) => Promise<void>) {
  const busy = ref(false);
  const problem = shallowRef<ApiProblem | null>(null);
  const signedOut = useSignedOut();

  /** A second call while the first still runs is ignored. */
  async function run(...args: A): Promise<void> {
    if (busy.value) return;
    busy.value = true;
    problem.value = null;
    try {
      await act(...args);
    } catch (error) {
      if (error instanceof DOMException && error.name === 'AbortError') return;
      problem.value = asProblem(error);
      await signedOut(problem.value);
    } finally {
      busy.value = false;
    }
  }

  return { busy, problem, run };
}
