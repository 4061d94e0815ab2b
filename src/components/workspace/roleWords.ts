import { ROLES, type Role } from '#contract/enums';

/** What a role may do, in words; contract/access.ts decides. */
export const ROLE_WORDS: Record<Role, string> = {
  owner: 'leads the workspace: members, datasets, runs, groups',
  analyst: 'brings networks in, starts and stops runs, marks groups',
  recorder: 'timed the arrivals: reads datasets and runs',
  reviewer: 'co-author or referee: reads datasets and runs',
};

export const ROLE_OPTIONS = ROLES.map((role) => ({ value: role, label: role }));
