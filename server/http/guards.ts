import type { Request } from 'express';
import { z } from 'zod';
import { ROUTES, mayUse, type RouteName, type RouteRule } from '#contract/access';
import type { Role } from '#contract/enums';
import { Failure } from './failure';
import { notFound } from './parse';
import type { Actor, Member } from './route';

/** What the guards ask of the rest of the server. */
export interface AccessSource {
  /** The person of the request's session, or null. */
  actorOf(request: Request): Promise<Actor | null>;
  /** The role as it is now, or null without a membership. */
  roleOf(userId: string, workspaceId: string): Promise<Role | null>;
}

const workspaceParameter = z.uuid();

/** Who asks, decided by the row of the access table. */
export async function admit(
  name: RouteName,
  request: Request,
  source: AccessSource,
): Promise<{ readonly actor: Actor | null; readonly member: Member | null }> {
  const { access }: RouteRule = ROUTES[name];
  // Nobody is looked up for these: `/health` must answer while the database is away.
  if (access === 'public') return { actor: null, member: null };
  const actor = await source.actorOf(request);
  if (actor === null) throw signedOut();
  if (access === 'account') return { actor, member: null };
  const member = await memberOf(request, actor, source);
  if (member === null) throw notFound('workspaces');
  if (!mayUse(member.role, name)) throw forbidden(member.role, access);
  return { actor, member };
}

/** Reads session and membership again, for streams that outlive the request's start. */
export async function stillAllowed(
  name: RouteName,
  request: Request,
  source: AccessSource,
): Promise<boolean> {
  const actor = await source.actorOf(request);
  if (actor === null) return false;
  const member = await memberOf(request, actor, source);
  return member !== null && mayUse(member.role, name);
}

async function memberOf(
  request: Request,
  actor: Actor,
  source: AccessSource,
): Promise<Member | null> {
  const workspaceId = workspaceParameter.safeParse(request.params['workspaceId']);
  if (!workspaceId.success) return null;
  const role = await source.roleOf(actor.userId, workspaceId.data);
  return role === null ? null : { userId: actor.userId, workspaceId: workspaceId.data, role };
}

function signedOut(): Failure {
  return new Failure(
    'signed_out',
    'session.required',
    'Sign in first; the session may have ended.',
  );
}

function forbidden(role: Role, access: readonly Role[]): Failure {
  return new Failure(
    'forbidden',
    'access.wrong_role',
    `You are ${role} in this workspace; this is for ${access.join(' or ')}. Ask an owner.`,
  );
}
