import { UPLOAD_LIMITS } from '#contract/datasets';
import type { Issue } from '#contract/problems';
import { Failure } from '../http/failure';

export type UploadedFile = 'nodes.csv' | 'edges.csv';

const MEBIBYTE = 1024 * 1024;

export function fileTooLarge(file: UploadedFile, limit: number): Failure {
  const size =
    limit >= MEBIBYTE
      ? `${limit / MEBIBYTE} MiB (${limit.toLocaleString('en')} bytes)`
      : `${limit} bytes`;
  const message = `${file} is larger than ${size}, the limit of one file; send a smaller network.`;
  return new Failure('too_large', 'uploads.file_too_large', message, {
    issues: [{ file, message }],
  });
}

export function uploadTooLarge(): Failure {
  return new Failure(
    'too_large',
    'uploads.too_large',
    `The upload is larger than two files of ${UPLOAD_LIMITS.fileBytes / MEBIBYTE} MiB may be; send nodes.csv and edges.csv only.`,
  );
}

export function uploadMalformed(): Failure {
  return new Failure(
    'malformed',
    'uploads.malformed',
    'The form is not a whole multipart/form-data message; send the two files again.',
  );
}

export function uploadEncoded(): Failure {
  return new Failure(
    'unsupported',
    'uploads.encoded',
    'Send the files as they are, without Content-Encoding.',
  );
}

export function storageFull(cause: unknown): Failure {
  return new Failure(
    'unavailable',
    'uploads.storage_full',
    'The server has no room for the upload at the moment; nothing was saved. Try again later.',
    { cause, retryAfter: 60 },
  );
}

export function wrongFiles(issues: readonly Issue[], issuesLeftOut: number): Failure {
  const count = issues.length + issuesLeftOut;
  return new Failure(
    'invalid',
    'datasets.wrong_files',
    count === 1
      ? 'The files have one fault; nothing was saved. Correct it, then send them again.'
      : `The files have ${count} faults; nothing was saved. Correct them, then send them again.`,
    { issues, issuesLeftOut },
  );
}

export function readingTooSlow(seconds: number): Failure {
  return new Failure(
    'invalid',
    'datasets.too_slow_to_read',
    `Reading the files took longer than ${seconds} s and was stopped; send a smaller network.`,
  );
}

export function readingTooLarge(megabytes: number): Failure {
  return new Failure(
    'too_large',
    'datasets.too_large_to_read',
    `Reading the files took more than ${megabytes} MB of memory and was stopped; send a smaller network.`,
  );
}

export function tooManyReadings(): Failure {
  return new Failure(
    'unavailable',
    'service.busy',
    'Other uploads are being read at the moment; try again in a minute.',
    { retryAfter: 60 },
  );
}

export function sameContent(number: number): Failure {
  return new Failure(
    'conflict',
    'revisions.same_content',
    `The files hold exactly what revision ${number} holds, so there is nothing new to save.`,
  );
}
