import { z } from 'zod';
import type { Issue } from '#contract/problems';
import { Failure } from './failure';

const NOUN_OF_PARAMETER: Readonly<Record<string, string>> = {
  workspaceId: 'workspaces',
  datasetId: 'datasets',
  revisionId: 'revisions',
  runId: 'runs',
  groupId: 'groups',
  importId: 'imports',
  userId: 'members',
  block: 'blocks',
  a: 'pairs',
  b: 'pairs',
};

const MOST_ISSUES = 50;
const nothing = z.strictObject({});

/** An id that cannot exist answers like one that does not. */
export function parseParams(schema: z.ZodType | undefined, params: unknown): unknown {
  if (schema === undefined) return undefined;
  const parsed = schema.safeParse(params);
  if (parsed.success) return parsed.data;
  const parameter = String(parsed.error.issues[0]?.path[0]);
  throw notFound(NOUN_OF_PARAMETER[parameter] ?? 'addresses');
}

export function parseQuery(schema: z.ZodType | undefined, query: unknown): unknown {
  const parsed = (schema ?? nothing).safeParse(query);
  if (parsed.success) return schema === undefined ? undefined : parsed.data;
  throw new Failure('malformed', 'request.wrong_query', 'The address carries a wrong parameter.', {
    issues: issuesOf(parsed.error),
  });
}

export function parseBody<S extends z.ZodType>(schema: S, body: unknown): z.output<S> {
  refuseWrongText(body);
  const parsed = schema.safeParse(body);
  if (parsed.success) return parsed.data;
  const all = issuesOf(parsed.error);
  throw invalid(all.slice(0, MOST_ISSUES), all.length - Math.min(all.length, MOST_ISSUES));
}

export function invalid(issues: readonly Issue[], issuesLeftOut = 0): Failure {
  const detail = issues.length === 1 ? issues[0]?.message : undefined;
  return new Failure(
    'invalid',
    'request.invalid',
    detail ?? 'Some fields need another value; each is named below.',
    { issues, issuesLeftOut },
  );
}

/** The answer for an id that is missing, of another workspace, or no id at all. */
export function notFound(noun: string): Failure {
  return new Failure(
    'not_found',
    `${noun}.not_found`,
    'It does not exist here, or is not shared with you.',
  );
}

function issuesOf(error: z.ZodError): Issue[] {
  return error.issues.flatMap((issue) => {
    if (issue.code === 'unrecognized_keys') {
      return issue.keys.map((key) => ({
        field: shortened([...issue.path, key].map(String).join('.')),
        message: 'This field is not known here; leave it out.',
      }));
    }
    const field = issue.path.map(String).join('.');
    return [{ ...(field === '' ? {} : { field: shortened(field) }), message: issue.message }];
  });
}

const shortened = (text: string) => (text.length > 100 ? `${text.slice(0, 100)}…` : text);

/** NUL cannot be stored and a lone surrogate is not text: both are refused by name. Iterative. */
function refuseWrongText(body: unknown): void {
  const waiting: { readonly value: unknown; readonly field: string }[] = [
    { value: body, field: '' },
  ];
  for (let next = waiting.pop(); next !== undefined; next = waiting.pop()) {
    const { value, field } = next;
    if (typeof value === 'string') {
      const message = wrongText(value);
      if (message !== null) throw invalid([{ field: shortened(field), message }]);
    } else if (typeof value === 'object' && value !== null) {
      for (const [key, inner] of Object.entries(value)) {
        waiting.push({ value: inner, field: field === '' ? key : `${field}.${key}` });
      }
    }
  }
}

/** @returns what is wrong with the text, or null. */
export function wrongText(value: string): string | null {
  if (value.includes('\u0000')) return 'It holds a NUL character; take it out.';
  if (/\p{Surrogate}/u.test(value))
    return 'It holds half of a surrogate pair; write the character again.';
  return null;
}
