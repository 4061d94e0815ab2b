import type { ImportDraft } from '#contract/imports';
import { formatNoun } from '../../composables/localeFormat';
import { columnNeeds } from './columnFields';
import { orderFault } from './orderChoices';

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

/** What one step still needs before there is a network, each in a sentence. */
export function stepNeeds(step: ImportStep, draft: ImportDraft): string[] {
  switch (step) {
    case 'files':
      return draft.files
        .filter(({ nodes, edges }) => nodes === null && edges === null)
        .map(({ name }) => `“${name}” cannot be read as it is.`);
    case 'columns':
      return (['nodes', 'edges'] as const).flatMap((part) => columnNeeds(draft, part));
    case 'order': {
      const fault = orderFault(draft);
      const open = draft.questions.filter(({ blocking }) => blocking).map(({ text }) => text);
      return fault === undefined ? open : [fault, ...open];
    }
    case 'found': {
      const problems = draft.issues.length + draft.issuesLeftOut;
      return problems > 0 ? [`${formatNoun(problems, 'problem')} in the files.`] : [];
    }
    case 'save':
      return [];
  }
}

/** The same in a few words beside the step's name; empty where nothing is needed. */
export function shortNeeds(step: ImportStep, draft: ImportDraft): string {
  const needs = stepNeeds(step, draft).length;
  if (needs === 0) return '';
  switch (step) {
    case 'files':
      return `${formatNoun(needs, 'file')} not read`;
    case 'columns':
      return `${formatNoun(needs, 'column')} to choose`;
    case 'order':
      return formatNoun(needs, 'question');
    case 'found':
      return formatNoun(draft.issues.length + draft.issuesLeftOut, 'problem');
    case 'save':
      return '';
  }
}
