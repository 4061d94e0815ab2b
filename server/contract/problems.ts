import { z } from 'zod';

/** One thing that is wrong, and where: shown under the field, or in the list of a wrong file. */
export const issueSchema = z.strictObject({
  /** `nodes.csv`, `edges.csv`; absent for a form field. */
  file: z.string().optional(),
  /** 1-based line of the file, the header being line 1. */
  line: z.number().int().positive().optional(),
  /** Column name of the file, or name of the form field. */
  field: z.string().optional(),
  /** Says what was wrong and what to do. */
  message: z.string(),
});
export type Issue = z.infer<typeof issueSchema>;

/** Every error leaves as application/problem+json (RFC 9457) in this shape. */
export const problemSchema = z.strictObject({
  type: z.literal('about:blank'),
  title: z.string(),
  status: z.number().int(),
  /** Stable, e.g. `runs.not_found`. */
  code: z.string(),
  detail: z.string(),
  requestId: z.string(),
  issues: z.array(issueSchema).optional(),
  /** How many more issues there are than `issues` lists. */
  issuesLeftOut: z.number().int().nonnegative().optional(),
});
export type Problem = z.infer<typeof problemSchema>;
