import type { Issue } from '#contract/problems';
import { Failure } from '../http/failure';

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

/** Our fault, not the file's; what can be done about it is to send something else. */
export function readingBroken(): Failure {
  return new Failure(
    'invalid',
    'datasets.not_readable',
    'Reading the files ended unexpectedly; nothing was saved. Save them in another format, e.g. as CSV, and send them again.',
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
