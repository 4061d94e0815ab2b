import { z } from 'zod';
import { importDraft } from '#contract/imports';

/** What a reading found, as it is stored with the draft (imports.view) and shown. */
export const draftView = importDraft
  .pick({
    files: true,
    choices: true,
    guessed: true,
    questions: true,
    found: true,
    issues: true,
    issuesLeftOut: true,
    growth: true,
    ready: true,
    remembered: true,
  })
  .extend({
    /** SHA-256 (hexadecimal) of the sorted column names; null where there are none. */
    signature: z.string().nullable(),
  });
export type DraftView = z.infer<typeof draftView>;
