import { UPLOAD_LIMITS } from '#contract/datasets';
import { Failure } from '../http/failure';

const MEBIBYTE = 1024 * 1024;

export function fileTooLarge(file: string, limit: number): Failure {
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
    `The upload is larger than its files may be, ${UPLOAD_LIMITS.fileBytes / MEBIBYTE} MiB each; send fewer or smaller files.`,
  );
}

export function uploadMalformed(): Failure {
  return new Failure(
    'malformed',
    'uploads.malformed',
    'The form is not a whole multipart/form-data message; send the files again.',
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

export function sameContent(number: number): Failure {
  return new Failure(
    'conflict',
    'revisions.same_content',
    `This is exactly what revision ${number} holds, so there is nothing new to save.`,
  );
}
