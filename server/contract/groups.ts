import { z } from 'zod';
import { groupOriginSchema } from './enums';

export const createGroupRequest = z.strictObject({
  name: z.string().trim().min(1, 'Give the group a name.').max(120),
  /** Node ids as in nodes.csv. */
  nodeIds: z.array(z.string()).min(2, 'A group needs at least two nodes.').max(5_000),
  origin: groupOriginSchema,
  note: z.string().trim().max(2000).default(''),
});
export type CreateGroupRequest = z.input<typeof createGroupRequest>;

export const group = z.strictObject({
  id: z.uuid(),
  runId: z.uuid(),
  name: z.string(),
  nodeIds: z.array(z.string()),
  origin: groupOriginSchema,
  note: z.string(),
  createdAt: z.iso.datetime(),
  createdBy: z.string().nullable(),
});
export type Group = z.infer<typeof group>;
export const groupList = z.strictObject({ groups: z.array(group) });
