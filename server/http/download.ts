import type { Response } from 'express';

/** Characters that file systems or headers treat as their own. */
const UNSAFE = /[\p{Cc}\p{Cf}"*/:<>?\\|]+/gu;

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
  response.attachment(`${safe.slice(0, 120).trim() || 'heddle'}.${ending}`);
}
