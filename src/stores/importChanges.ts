import type { ChangeImportRequest, ImportDraft, ImportFile } from '#contract/imports';

/** Of an import what is changed by it: its name, the choices, how files are read. */
type Kind = keyof ChangeImportRequest;
const KINDS: readonly Kind[] = ['name', 'choices', 'hints'];

const kindsOf = (change: ChangeImportRequest): string =>
  KINDS.filter((kind) => change[kind] !== undefined).join();

/**
 * Changes that wait to be sent, with one more. It joins the last one where both are of one kind; else
 * it waits behind it, because a changed reading guesses the columns anew and choices after it stay.
 */
export function withOneMore(
  waiting: readonly ChangeImportRequest[],
  change: ChangeImportRequest,
): readonly ChangeImportRequest[] {
  const last = waiting.at(-1);
  if (last === undefined || kindsOf(last) !== kindsOf(change)) return [...waiting, change];
  return [...waiting.slice(0, -1), { ...last, ...change, ...hintsOf(last, change) }];
}

function hintsOf(last: ChangeImportRequest, { hints }: ChangeImportRequest) {
  if (hints === undefined) return {};
  const changed = new Set(hints.map(({ position }) => position));
  const kept = (last.hints ?? []).filter(({ position }) => !changed.has(position));
  return { hints: [...kept, ...hints] };
}

/** The draft as it will be once the changes are read: its fields show at once what was chosen. */
export function withChanges(
  draft: ImportDraft,
  changes: readonly ChangeImportRequest[],
): ImportDraft {
  return changes.reduce((shown, { name, choices, hints = [] }) => {
    const hinted = new Map(hints.map(({ position, hint }) => [position, hint]));
    return {
      ...shown,
      name: name ?? shown.name,
      choices: choices === null ? shown.guessed : (choices ?? shown.choices),
      files: shown.files.map((file) => withHint(file, hinted.get(file.position))),
    };
  }, draft);
}

function withHint(file: ImportFile, hint: ImportFile['hint'] | undefined): ImportFile {
  if (hint === undefined) return file;
  const { reading } = file;
  return {
    ...file,
    hint,
    format: hint.format ?? file.format,
    reading: reading && { ...reading, ...hint.reading },
  };
}
