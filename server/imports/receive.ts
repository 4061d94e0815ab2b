import { stat, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { IMPORT_LIMITS } from '#contract/imports';
import type { NewImportFile } from '../../db/repositories/importFiles';
import type { FormRules, Received } from '../datasets/uploadForm';
import { invalid } from '../http/parse';

/** The form of an import: `files` under any names, and text. */
export const IMPORT_FORM: FormRules = {
  fileFields: ['files'],
  files: IMPORT_LIMITS.files,
  fileBytes: IMPORT_LIMITS.fileBytes,
  fieldBytes: IMPORT_LIMITS.pastedBytes,
  admit: (field, filename, before) => {
    if (field !== 'files') {
      return { refusal: 'A file under this name is not known; send all of them as `files`.' };
    }
    if (before.length >= IMPORT_LIMITS.files) {
      return { refusal: `At most ${IMPORT_LIMITS.files} files make one import; send fewer.` };
    }
    return { label: cleanName(filename) || `File ${before.length + 1}` };
  },
};

const PASTED = 'Pasted text';
/** Characters of a file's name that are kept. */
const NAME = 120;

/** Lies in the folder of what was received. */
export interface ReceivedSource extends NewImportFile {
  readonly path: string;
}

/** What is to be read, in the order sent, pasted text last; each has a name of its own. */
export async function sourcesOf(
  { folder, files }: Received,
  pasted?: string,
): Promise<ReceivedSource[]> {
  const text = pasted === undefined ? null : Buffer.from(pasted);
  const count = files.length + (text === null ? 0 : 1);
  if (count === 0) {
    throw invalid([{ field: 'files', message: 'Choose a file, or paste a table.' }]);
  }
  if (count > IMPORT_LIMITS.files) {
    const message = `At most ${IMPORT_LIMITS.files} files make one import, pasted text among them.`;
    throw invalid([{ field: 'files', message }]);
  }
  const names = new Set<string>();
  const sources: ReceivedSource[] = [];
  for (const [position, { filename, path }] of files.entries()) {
    sources.push({
      position,
      name: ownName(cleanName(filename) || `File ${position + 1}`, names),
      bytes: (await stat(path)).size,
      pasted: false,
      path,
    });
  }
  if (text !== null) {
    const path = join(folder, 'pasted');
    await writeFile(path, text, { mode: 0o600 });
    const name = ownName(PASTED, names);
    sources.push({ position: files.length, name, bytes: text.length, pasted: true, path });
  }
  return sources;
}

/** A name as somebody sent it, without folders, control characters and half characters. */
function cleanName(filename: string): string {
  const base = filename.split(/[/\\]/).at(-1) ?? '';
  const clean = base
    .replace(/[\p{Cc}\p{Cf}\p{Surrogate}]/gu, ' ')
    .replace(/\s+/g, ' ')
    .trim();
  return [...clean].slice(0, NAME).join('').trim();
}

function ownName(name: string, taken: Set<string>): string {
  let own = name;
  for (let copy = 2; taken.has(own); copy++) own = `${name} (${copy})`;
  taken.add(own);
  return own;
}
