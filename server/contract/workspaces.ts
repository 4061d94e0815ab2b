import { z } from 'zod';
import { emailSchema } from './accounts';
import { roleSchema } from './enums';

export const createWorkspaceRequest = z.strictObject({
  name: z.string().trim().min(1, 'Give the workspace a name.').max(120),
});
export type CreateWorkspaceRequest = z.infer<typeof createWorkspaceRequest>;

export const workspace = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  /** The reader's own role. */
  role: roleSchema,
  createdAt: z.iso.datetime(),
});
export type Workspace = z.infer<typeof workspace>;

export const member = z.strictObject({
  userId: z.uuid(),
  name: z.string(),
  email: z.string(),
  role: roleSchema,
});
export type Member = z.infer<typeof member>;
export const memberList = z.strictObject({ members: z.array(member) });

/** The person must already have an account on this instance. */
export const addMemberRequest = z.strictObject({ email: emailSchema, role: roleSchema });
export type AddMemberRequest = z.infer<typeof addMemberRequest>;
export const changeMemberRequest = z.strictObject({ role: roleSchema });
export type ChangeMemberRequest = z.infer<typeof changeMemberRequest>;
