import { Router, type Request, type RequestHandler, type Response } from 'express';
import { ROUTES, type RouteName, type RouteRule } from '#contract/access';
import { readJson, requireJson, requireMultipart, requireNoBody } from './body';
import { Failure } from './failure';
import { admit, stillAllowed, type AccessSource } from './guards';
import { parseBody, parseParams, parseQuery } from './parse';
import { send } from './send';
import type { Route, RouteMap } from './route';
import { z } from 'zod';

const METHODS = new Set(['get', 'post', 'put', 'patch', 'delete']);
const workspaceOnly = z.strictObject({ workspaceId: z.uuid() });

/**
 * Mounts every row of the access table with its handler: method → guard → content type → parse →
 * handle → send.
 * @throws Error if a row has no handler or a handler has no row
 */
export function buildRouter(routes: RouteMap, source: AccessSource, closing: AbortSignal): Router {
  const missing = Object.keys(ROUTES).filter((name) => !Object.hasOwn(routes, name));
  const strangers = Object.keys(routes).filter((name) => !Object.hasOwn(ROUTES, name));
  if (missing.length > 0) throw new Error(`No handler for the routes ${missing.join(', ')}.`);
  if (strangers.length > 0) {
    throw new Error(`Not in the access table: ${strangers.join(', ')}.`);
  }
  const router = Router({ strict: true, caseSensitive: true });
  for (const [name, rule] of Object.entries(ROUTES)) {
    if (!isRouteName(name) || !METHODS.has(rule.method)) throw new Error(`Wrong row: ${name}.`);
    const route: Route = routes[name];
    if (route.name !== name) throw new Error(`The handler of ${route.name} stands under ${name}.`);
    router[rule.method](rule.path, ...pipeline(name, rule, route, source, closing));
  }
  answerOtherMethods(router);
  return router;
}

function isRouteName(name: string): name is RouteName {
  return Object.hasOwn(ROUTES, name);
}

function pipeline(
  name: RouteName,
  rule: RouteRule,
  route: Route,
  source: AccessSource,
  closing: AbortSignal,
): RequestHandler[] {
  const guard: RequestHandler = async (request, response, next) => {
    response.locals['admitted'] = await admit(name, request, source);
    next();
  };
  const run: RequestHandler = async (request, response) => {
    const input = {
      ...(response.locals['admitted'] as object),
      params: parseParams(route.params ?? defaultParams(rule), request.params),
      query: parseQuery(route.query, request.query),
      body: route.body instanceof z.ZodType ? parseBody(route.body, request.body) : undefined,
      request,
      response,
      log: request.log,
      signal: AbortSignal.any([closing, goneSignal(response)]),
      stillAllowed: () => stillAllowed(name, request, source),
    };
    send(response, await route.handle(input as never));
  };
  return [guard, ...bodyReaders(rule, route), run];
}

function bodyReaders(rule: RouteRule, route: Route): RequestHandler[] {
  if (rule.method === 'get') return [];
  if (route.body === undefined) return [requireNoBody];
  return route.body === 'multipart' ? [requireMultipart] : [requireJson, readJson];
}

function defaultParams(rule: RouteRule): z.ZodType | undefined {
  return rule.path.includes(':workspaceId') ? workspaceOnly : undefined;
}

function goneSignal(response: Response): AbortSignal {
  const gone = new AbortController();
  response.once('close', () => gone.abort());
  return gone.signal;
}

/** An address of the table with another method answers 405 and says which methods it has. */
function answerOtherMethods(router: Router): void {
  const methods = new Map<string, string[]>();
  for (const { path, method } of Object.values(ROUTES)) {
    methods.set(path, [...(methods.get(path) ?? []), method.toUpperCase()]);
  }
  for (const [path, allow] of methods) {
    router.all(path, (request: Request) => {
      throw new Failure(
        'wrong_method',
        'request.wrong_method',
        `${request.method} is not known at this address.`,
        { allow },
      );
    });
  }
}
