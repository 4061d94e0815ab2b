import { z } from 'zod';
import { roleSchema } from './enums';

export const PASSWORD_MIN = 15;
export const PASSWORD_MAX = 128;

export const emailSchema = z
  .string()
  .trim()
  .max(254)
  .pipe(z.email({ message: 'Write an e-mail address like name@example.org.' }));

export const signUpRequest = z.strictObject({
  name: z.string().trim().min(1, 'Write your name.').max(120),
  email: emailSchema,
  password: z
    .string()
    .min(PASSWORD_MIN, `Use at least ${PASSWORD_MIN} characters.`)
    .max(PASSWORD_MAX, `Use at most ${PASSWORD_MAX} characters.`),
  /** Name of the workspace made with the first account of an instance; ignored later. */
  workspaceName: z.string().trim().max(120).optional(),
});
export type SignUpRequest = z.infer<typeof signUpRequest>;

export const signInRequest = z.strictObject({
  email: emailSchema,
  password: z.string().min(1, 'Write your password.').max(PASSWORD_MAX),
});
export type SignInRequest = z.infer<typeof signInRequest>;

export const membershipSummary = z.strictObject({
  workspaceId: z.uuid(),
  workspaceName: z.string(),
  role: roleSchema,
});
export type MembershipSummary = z.infer<typeof membershipSummary>;

export const me = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  email: z.string(),
  memberships: z.array(membershipSummary),
});
export type Me = z.infer<typeof me>;

/** GET /api/instance: what a visitor may know before signing in. */
export const instance = z.strictObject({
  /** False until the first account exists: that account will own the instance's first workspace. */
  hasAccounts: z.boolean(),
  /** Accounts of the demo instance, invented; null everywhere else. */
  demoAccounts: z
    .array(
      z.strictObject({
        name: z.string(),
        email: z.string(),
        password: z.string(),
        role: roleSchema,
      }),
    )
    .nullable(),
});
export type Instance = z.infer<typeof instance>;
