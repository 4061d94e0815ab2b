import type { z } from 'zod';
import { problemSchema, type Issue } from '#contract/problems';

/** What the server refused, or that it could not be reached, in words a person can act on. */
export class ApiProblem extends Error {
  constructor(
    readonly status: number,
    /** Stable code of the problem, e.g. `runs.not_found`; `network.*` is made here. */
    readonly code: string,
    readonly detail: string,
    readonly issues: readonly Issue[] = [],
    readonly issuesLeftOut = 0,
    readonly requestId: string | null = null,
  ) {
    super(detail);
    this.name = 'ApiProblem';
  }

  /** The message for a form field, or undefined. */
  issueOf(field: string): string | undefined {
    return this.issues.find((issue) => issue.file === undefined && issue.field === field)?.message;
  }
}

/** Turns anything that was thrown into a problem; a programming error is thrown on. */
export function asProblem(error: unknown): ApiProblem {
  if (error instanceof ApiProblem) return error;
  throw error;
}

export const unreachable = (): ApiProblem =>
  new ApiProblem(
    0,
    'network.unreachable',
    'The server did not answer. Check the connection, then try again.',
  );

/** Reads a failed answer: problem+json as the contract says, anything else by its status. */
export function problemOf(status: number, text: string): ApiProblem {
  const parsed = problemSchema.safeParse(parseJson(text));
  if (parsed.success) {
    const { code, detail, issues, issuesLeftOut, requestId } = parsed.data;
    return new ApiProblem(status, code, detail, issues, issuesLeftOut, requestId);
  }
  return new ApiProblem(
    status,
    'network.unexpected',
    `The server answered with status ${status} and no explanation. Try again in a moment.`,
  );
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}

/** Parses an answer by its schema. @throws ApiProblem `network.unexpected` if it does not fit. */
export function parseAnswer<T>(schema: z.ZodType<T>, text: string): T {
  const parsed = schema.safeParse(parseJson(text));
  if (parsed.success) return parsed.data;
  const where = parsed.error.issues[0];
  throw new ApiProblem(
    200,
    'network.unexpected',
    'The server answered in a form this page does not know' +
      (where ? ` (at ${where.path.join('.') || 'the top'}: ${where.message}).` : '.') +
      ' Reload the page to get its current version.',
  );
}

export interface Options {
  readonly method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  /** Sent as JSON. */
  readonly body?: unknown;
  readonly signal?: AbortSignal | undefined;
  readonly headers?: Readonly<Record<string, string>>;
}

async function send(path: string, options: Options): Promise<Response> {
  const { method = 'GET', body, signal, headers = {} } = options;
  let response: Response;
  try {
    response = await fetch(path, {
      method,
      credentials: 'same-origin',
      headers: {
        accept: 'application/json',
        ...(method === 'GET' ? {} : { 'content-type': 'application/json' }),
        ...headers,
      },
      ...(method === 'GET' || body === undefined ? {} : { body: JSON.stringify(body) }),
      ...(signal ? { signal } : {}),
    });
  } catch (error) {
    if (signal?.aborted === true) throw error;
    throw unreachable();
  }
  if (!response.ok) throw problemOf(response.status, await response.text());
  return response;
}

/** Asks and parses. @throws ApiProblem */
export async function requestJson<T>(
  path: string,
  schema: z.ZodType<T>,
  options: Options = {},
): Promise<T> {
  const response = await send(path, options);
  return parseAnswer(schema, await response.text());
}

/** Asks where no body is answered. @throws ApiProblem */
export async function requestNothing(path: string, options: Options): Promise<void> {
  await send(path, options);
}

/** Asks for bytes, e.g. one block of a swap matrix. @throws ApiProblem */
export async function requestBytes(path: string, signal?: AbortSignal): Promise<ArrayBuffer> {
  const response = await send(path, { signal, headers: { accept: 'application/octet-stream' } });
  return response.arrayBuffer();
}

/** Asks whether a file can be taken and leaves its bytes. @throws ApiProblem with the reason why not */
export async function requestLeave(path: string): Promise<void> {
  const response = await send(path, {});
  await response.body?.cancel();
}

/** A path under a workspace, every part escaped. */
export function inWorkspace(workspaceId: string, ...parts: (string | number)[]): string {
  return ['/api/workspaces', workspaceId, ...parts]
    .map((part, i) => (i === 0 ? String(part) : encodeURIComponent(String(part))))
    .join('/');
}
