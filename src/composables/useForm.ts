import { ref } from 'vue';
import type { z } from 'zod';
import type { ApiProblem } from '../api/client';

/**
 * The messages under the fields of a form: by the contract's own schema before it is sent, then by
 * what the server said.
 */
export function useForm<T>(schema: z.ZodType<T>) {
  const messages = ref<Record<string, string>>({});

  /** @returns the parsed values, or null with `messages` filled. */
  function check(values: unknown): T | null {
    const parsed = schema.safeParse(values);
    messages.value = {};
    if (parsed.success) return parsed.data;
    for (const issue of parsed.error.issues) {
      const field = String(issue.path[0] ?? '');
      messages.value[field] ??= issue.message;
    }
    return null;
  }

  /** @returns what is wrong with a field, or undefined. */
  const messageOf = (field: string, problem: ApiProblem | null): string | undefined =>
    messages.value[field] ?? problem?.issueOf(field);

  return { check, messageOf };
}
