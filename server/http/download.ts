import type { Response } from 'express';

/** Characters that file systems or headers treat as their own. */
const UNSAFE = /[\p{Cc}\p{Cf}\p{Surrogate}"*/:<>?\\|]+/gu;
/** Letters of a name that are kept: of a longer one the first and the last, which tell files apart. */
const [FIRST, LAST] = [79, 40];

/**
 * Names an answer as a file to save. The only place that writes Content-Disposition (RFC 6266; the
 * framework encodes names beyond ASCII as RFC 8187 asks).
 *
 * @param name without its ending; characters unsafe in file names become spaces
 */
export function nameDownload(response: Response, name: string, ending: string): void {
  const safe = name
    .replace(UNSAFE, ' ')
    .replace(/\s+/g, ' ')
    .replace(/^[. ]+/, '')
    .trim();
  response.attachment(`${shortened(safe) || 'heddle'}.${ending}`);
}

function shortened(name: string): string {
  const letters = [...name];
  if (letters.length <= FIRST + 1 + LAST) return name;
  return `${letters.slice(0, FIRST).join('').trim()}…${letters.slice(-LAST).join('').trim()}`;
}
