import { UPLOAD_LIMITS } from '#contract/datasets';
import { formatBytes } from '../../composables/localeFormat';

/**
 * What can be said of a chosen file before it is sent.
 * @param expected the name the field asks for, e.g. `nodes.csv`
 * @returns what is wrong and what to do, or undefined
 */
export async function fileRefusal(
  expected: string,
  file: File | null,
): Promise<string | undefined> {
  if (file === null) return `Choose the file ${expected}.`;
  if (file.size === 0) return `${file.name} is empty. Choose another file.`;
  if (file.size > UPLOAD_LIMITS.fileBytes) {
    const most = formatBytes(UPLOAD_LIMITS.fileBytes);
    return `${file.name} has ${formatBytes(file.size)}; at most ${most} are taken. Choose a smaller file.`;
  }
  try {
    await file.slice(0, 1).arrayBuffer();
  } catch {
    // A browser refuses to read a file that was written to after it was chosen.
    return `${file.name} changed on disk after it was chosen. Choose it again.`;
  }
  return undefined;
}
