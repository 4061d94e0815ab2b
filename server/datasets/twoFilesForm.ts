import { UPLOAD_LIMITS } from '#contract/datasets';
import { invalid } from '../http/parse';
import type { TwoFilesRequest } from '../reading/messages';
import type { FormRules, Received } from './uploadForm';

/** Form names of the two files, and how they are called in messages. */
const FILES = new Map([
  ['nodes', 'nodes.csv'],
  ['edges', 'edges.csv'],
]);

/** The form with nodes.csv and edges.csv. */
export const TWO_FILES: FormRules = {
  fileFields: [...FILES.keys()],
  files: FILES.size,
  fileBytes: UPLOAD_LIMITS.fileBytes,
  fieldBytes: 16 * 1024,
  admit: (field, _filename, before) => {
    const label = FILES.get(field);
    if (label === undefined)
      return { refusal: 'A file under this name is not known; send `nodes` and `edges`.' };
    if (before.some((file) => file.field === field))
      return { refusal: 'This file came twice; send it once.' };
    return { label };
  },
};

/** @throws Failure naming each file that is missing */
export function bothFiles({ folder, files }: Received): TwoFilesRequest {
  const pathOf = (field: string) => files.find((file) => file.field === field)?.path;
  const nodesPath = pathOf('nodes');
  const edgesPath = pathOf('edges');
  if (nodesPath === undefined || edgesPath === undefined) {
    const missing = [...FILES].filter(([field]) => pathOf(field) === undefined);
    throw invalid(
      missing.map(([field, file]) => ({ field, message: `${file} is missing; choose the file.` })),
    );
  }
  return { folder, nodesPath, edgesPath };
}
