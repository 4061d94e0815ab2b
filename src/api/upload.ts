import type { z } from 'zod';
import { parseAnswer, problemOf, unreachable } from './client';

export interface Upload<T> {
  readonly answer: Promise<T>;
  readonly abort: () => void;
}

/**
 * Sends a multipart form and tells how many of its bytes have left. XMLHttpRequest, because fetch
 * cannot tell.
 */
export function uploadForm<T>(
  path: string,
  form: FormData,
  schema: z.ZodType<T>,
  onBytes: (sent: number, total: number) => void,
): Upload<T> {
  const request = new XMLHttpRequest();
  const answer = new Promise<T>((resolve, reject) => {
    request.open('POST', path);
    request.setRequestHeader('accept', 'application/json');
    request.upload.addEventListener('progress', (event) => onBytes(event.loaded, event.total));
    request.addEventListener('error', () => reject(unreachable()));
    request.addEventListener('abort', () =>
      reject(new DOMException('The upload was stopped.', 'AbortError')),
    );
    request.addEventListener('load', () => {
      if (request.status < 200 || request.status > 299) {
        reject(problemOf(request.status, request.responseText));
        return;
      }
      try {
        resolve(parseAnswer(schema, request.responseText));
      } catch (error) {
        reject(error instanceof Error ? error : new Error(String(error)));
      }
    });
    request.send(form);
  });
  return { answer, abort: () => request.abort() };
}
