import type { UnwritableText } from '../../formats/writers/xmlText';
import { Failure } from '../http/failure';

/** The message names the text and what to take instead. */
export function unwritable(error: UnwritableText): Failure {
  return new Failure('conflict', 'revisions.unwritable', error.message);
}
