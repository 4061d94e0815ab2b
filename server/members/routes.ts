import { z } from 'zod';
import { addMemberRequest, changeMemberRequest, type Member } from '#contract/workspaces';
import { listMembers, type MemberRow } from '../../db/repositories/memberships';
import type { Dependencies } from '../dependencies';
import { notFound } from '../http/parse';
import { created, done, ok, route, type RouteMap } from '../http/route';
import { addMember, changeRole, removeMember } from './usecases';

const params = z.strictObject({ workspaceId: z.uuid(), userId: z.uuid() });

type MemberRoutes = Pick<RouteMap, 'members' | 'addMember' | 'changeMember' | 'removeMember'>;

export function memberRoutes({ database: { db } }: Dependencies): MemberRoutes {
  return {
    members: route('members', {}, async ({ member }) =>
      ok({ members: (await listMembers(db, member)).map(presentMember) }),
    ),
    addMember: route('addMember', { body: addMemberRequest }, async ({ member, body }) =>
      created(presentMember(await addMember(db, member, body))),
    ),
    changeMember: route(
      'changeMember',
      { params, body: changeMemberRequest },
      async ({ member, params, body }) => {
        await changeRole(db, member, params.userId, body.role);
        const rows = await listMembers(db, member);
        const row = rows.find(({ userId }) => userId === params.userId);
        if (row === undefined) throw notFound('members');
        return ok(presentMember(row));
      },
    ),
    removeMember: route('removeMember', { params }, async ({ member, params }) => {
      await removeMember(db, member, params.userId);
      return done;
    }),
  };
}

function presentMember({ userId, name, email, role }: MemberRow): Member {
  return { userId, name, email, role };
}
