import type { ErrorRequestHandler } from 'express';
import type { Problem } from '#contract/problems';
import { Failure, type FailureKind } from './failure';
import { databaseFailure } from './databaseFailure';

const STATUS: Readonly<Record<FailureKind, readonly [number, string]>> = {
  malformed: [400, 'Bad request'],
  signed_out: [401, 'Not signed in'],
  forbidden: [403, 'Not allowed'],
  not_found: [404, 'Not found'],
  wrong_method: [405, 'Method not allowed'],
  timed_out: [408, 'Took too long'],
  conflict: [409, 'Conflict'],
  too_large: [413, 'Too large'],
  unsupported: [415, 'Unsupported content'],
  invalid: [422, 'Not valid'],
  throttled: [429, 'Too many attempts'],
  unavailable: [503, 'Not available'],
};

/** Express and its body reader raise errors of their own, with a `type` or a status below 500. */
const REQUEST_FAILURES: Readonly<Record<string, Failure>> = {
  'entity.parse.failed': new Failure(
    'malformed',
    'request.malformed_json',
    'The body is not JSON; send what the field names and values say as one JSON object.',
  ),
  'entity.too.large': new Failure(
    'too_large',
    'request.too_large',
    'The body is too large; send less at once.',
  ),
  'charset.unsupported': new Failure(
    'unsupported',
    'request.unsupported_charset',
    'Send the body as UTF-8.',
  ),
  'encoding.unsupported': new Failure(
    'unsupported',
    'request.unsupported_encoding',
    'Send the body without compression, or as gzip, deflate or br.',
  ),
  'request.aborted': new Failure('malformed', 'request.aborted', 'The request ended early.'),
};
const MALFORMED = new Failure(
  'malformed',
  'request.malformed',
  'The request could not be read; check its address and length.',
);

/** @returns the refusal that an error means, or null where it is a fault of ours. */
export function failureOf(error: unknown): Failure | null {
  if (error instanceof Failure) return error;
  const database = databaseFailure(error);
  if (database !== null) return database;
  if (typeof error !== 'object' || error === null) return null;
  if ('type' in error && typeof error.type === 'string') {
    const known = REQUEST_FAILURES[error.type];
    if (known !== undefined) return known;
  }
  const status = 'status' in error ? error.status : null;
  return typeof status === 'number' && status >= 400 && status < 500 ? MALFORMED : null;
}

/** The only place that turns an error into an answer: application/problem+json (RFC 9457). */
export const answerProblem: ErrorRequestHandler = (error: unknown, request, response, _next) => {
  const failure = failureOf(error);
  if (failure === null) request.log.error({ err: error }, 'request failed');
  else if (failure.kind === 'unavailable') {
    const { code, detail, cause } = failure;
    request.log.warn({ code, cause }, detail);
  }
  if (response.headersSent) {
    response.destroy();
    return;
  }
  const [status, title] = failure === null ? [500, 'Fault'] : STATUS[failure.kind];
  const problem: Problem = {
    type: 'about:blank',
    title,
    status,
    code: failure?.code ?? 'service.fault',
    detail:
      failure?.detail ??
      'Something broke on the server. Nothing was saved; try again, and give the request id to whoever runs it.',
    requestId: response.get('X-Request-Id') ?? '',
    ...(failure?.options.issues === undefined ? {} : { issues: [...failure.options.issues] }),
    ...(failure?.options.issuesLeftOut ? { issuesLeftOut: failure.options.issuesLeftOut } : {}),
  };
  if (failure?.options.retryAfter !== undefined) {
    response.setHeader('Retry-After', String(failure.options.retryAfter));
  }
  if (failure?.options.allow !== undefined) {
    response.setHeader('Allow', failure.options.allow.join(', '));
  }
  response.setHeader('Cache-Control', 'no-store');
  response.status(status).type('application/problem+json').send(JSON.stringify(problem));
};
