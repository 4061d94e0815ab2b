import { IMPORT_LIMITS } from '#contract/imports';
import { formatBytes, formatNoun } from '../../composables/localeFormat';
import { fileRefusal } from '../dataset/fileRefusal';

/** What is wrong with files and pasted rows before they are sent, by field; empty where nothing is. */
export async function beginRefusal(
  files: readonly File[],
  pasted: string,
): Promise<{ files?: string; pasted?: string }> {
  const { files: most, pastedBytes } = IMPORT_LIMITS;
  if (files.length === 0 && pasted.trim() === '')
    return { files: 'Choose a file here, or paste rows below.' };
  if (files.length > most) {
    return {
      files: `These are ${formatNoun(files.length, 'file')}; ${most} at most. Remove some.`,
    };
  }
  for (const file of files) {
    const refusal = await fileRefusal(file.name, file);
    if (refusal !== undefined) return { files: refusal };
  }
  const bytes = new Blob([pasted]).size;
  if (bytes <= pastedBytes) return {};
  return {
    pasted: `These rows are ${formatBytes(bytes)}; ${formatBytes(pastedBytes)} at most. Bring them as a file.`,
  };
}
