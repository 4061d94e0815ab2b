import type { ImportDraft } from '#contract/imports';
import { formatNoun } from '../../composables/localeFormat';

export const IMPORT_STEPS = ['files', 'columns', 'order', 'found', 'save'] as const;
export type ImportStep = (typeof IMPORT_STEPS)[number];

export const STEP_TITLES: Record<ImportStep, string> = {
  files: 'Files',
  columns: 'Columns',
  order: 'Order',
  found: 'What was found',
  save: 'Save',
};

export const isStep = (text: string): text is ImportStep =>
  (IMPORT_STEPS as readonly string[]).includes(text);

/** What a step still needs, in a few words; empty where nothing. */
export function stepNeeds(step: ImportStep, draft: ImportDraft): string {
  switch (step) {
    case 'files':
      return draft.files.some(({ nodes, edges }) => nodes === null && edges === null)
        ? 'a file cannot be read'
        : '';
    case 'order': {
      const open = draft.questions.filter(({ blocking }) => blocking).length;
      return open > 0 ? formatNoun(open, 'question') : '';
    }
    case 'found': {
      const problems = draft.issues.length + draft.issuesLeftOut;
      return problems > 0 ? formatNoun(problems, 'problem') : '';
    }
    case 'columns':
    case 'save':
      return '';
  }
}
