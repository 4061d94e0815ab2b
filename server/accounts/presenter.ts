import type { Instance, Me } from '#contract/accounts';
import type { MembershipRow } from '../../db/repositories/memberships';

interface Person {
  readonly id: string;
  readonly name: string;
  readonly email: string;
}

export function presentMe(person: Person, memberships: readonly MembershipRow[]): Me {
  return {
    id: person.id,
    name: person.name,
    email: person.email,
    memberships: memberships.map(({ workspaceId, workspaceName, role }) => ({
      workspaceId,
      workspaceName,
      role,
    })),
  };
}

export function presentInstance(
  hasAccounts: boolean,
  demoAccounts: Instance['demoAccounts'],
): Instance {
  return { hasAccounts, demoAccounts };
}
