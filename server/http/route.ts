import type { Request, Response } from 'express';
import type { Logger } from 'pino';
import type { z } from 'zod';
import type { ROUTES, RouteName } from '#contract/access';
import type { Role } from '#contract/enums';

/** The person behind a request. */
export interface Actor {
  readonly userId: string;
  readonly name: string;
  readonly email: string;
}

/** The person in the workspace of the path, with the role read for this very request. */
export interface Member {
  readonly userId: string;
  readonly workspaceId: string;
  readonly role: Role;
}

interface Raw {
  /** For streams, headers and cookies only; parameters, query and body arrive parsed. */
  readonly request: Request;
  readonly response: Response;
  readonly log: Logger;
  /** Aborts when the client goes away or the server closes. */
  readonly signal: AbortSignal;
}

export interface AccountScope extends Raw {
  readonly actor: Actor;
}

export interface MemberScope extends AccountScope {
  readonly member: Member;
  /** Reads session and role again: whether an open stream may go on. */
  readonly stillAllowed: () => Promise<boolean>;
}

type AccessOf<N extends RouteName> = (typeof ROUTES)[N]['access'];
export type ScopeOf<N extends RouteName> =
  AccessOf<N> extends 'public' ? Raw : AccessOf<N> extends 'account' ? AccountScope : MemberScope;

/** What a handler answers; `SENT` where it wrote to the response by itself. */
export type Reply =
  | { readonly status: 200 | 201 | 202; readonly json: object; readonly headers?: Headers }
  | {
      readonly status: 200;
      readonly bytes: Uint8Array;
      readonly contentType: string;
      readonly headers?: Headers;
    }
  | { readonly status: 204; readonly headers?: Headers }
  | typeof SENT;
type Headers = Readonly<Record<string, string>>;

export const SENT = Symbol('sent');
export const ok = (json: object, headers?: Headers): Reply => ({ status: 200, json, headers });
export const created = (json: object): Reply => ({ status: 201, json });
export const done: Reply = { status: 204 };

/** The body a route reads: JSON of a schema, a multipart stream that the handler reads, or none. */
type BodyKind = z.ZodType | 'multipart' | undefined;
type Parsed<S> = S extends z.ZodType ? z.output<S> : undefined;

export interface RouteParts<
  P extends z.ZodType | undefined,
  Q extends z.ZodType | undefined,
  B extends BodyKind,
> {
  readonly params?: P;
  readonly query?: Q;
  readonly body?: B;
}

/** One route as the router mounts it. */
export interface Route<N extends RouteName = RouteName> {
  readonly params?: z.ZodType;
  readonly query?: z.ZodType;
  readonly body?: BodyKind;
  readonly handle: (input: never) => Promise<Reply>;
  readonly name: N;
}

export type RouteMap = { readonly [N in RouteName]: Route<N> };

/**
 * Declares the handler of a row of the access table: parsed input in, reply out.
 * Without a schema, params beyond `workspaceId`, query and body must be empty.
 */
export function route<
  N extends RouteName,
  P extends z.ZodType | undefined = undefined,
  Q extends z.ZodType | undefined = undefined,
  B extends BodyKind = undefined,
>(
  name: N,
  parts: RouteParts<P, Q, B>,
  handle: (
    input: ScopeOf<N> & {
      readonly params: Parsed<P>;
      readonly query: Parsed<Q>;
      readonly body: Parsed<B>;
    },
  ) => Promise<Reply>,
): Route<N> {
  return { ...parts, handle, name };
}
