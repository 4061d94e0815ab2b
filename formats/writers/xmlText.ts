import { quoted } from '../issues';

/** A text that the chosen format cannot hold; the message says which, and what to do. */
export class UnwritableText extends Error {
  override readonly name = 'UnwritableText';
}

const ONLY_IN_1_1 = /[\u0001-\u0008\u000b\u000c\u000e-\u001f]/;
const NEVER = /[\0\ufffe\uffff\p{Surrogate}]/u;

const ESCAPED = /[&<>"\u0001-\u001f\u007f-\u009f\u2028]/g;
const NAMED: ReadonlyMap<string, string> = new Map([
  ['&', '&amp;'],
  ['<', '&lt;'],
  ['>', '&gt;'],
  ['"', '&quot;'],
]);

/**
 * The version of XML that holds the texts: 1.0, or 1.1 where there are control characters.
 * @throws UnwritableText for U+FFFE and U+FFFF, which no XML holds
 */
export function xmlVersionFor(texts: Iterable<string>): '1.0' | '1.1' {
  let version: '1.0' | '1.1' = '1.0';
  for (const text of texts) {
    if (NEVER.test(text)) {
      throw new UnwritableText(
        `${quoted(text)} holds a character (U+FFFE or U+FFFF) that XML cannot hold. Take JSON or CSV.`,
      );
    }
    if (ONLY_IN_1_1.test(text)) version = '1.1';
  }
  return version;
}

/** A text for an attribute or between tags; line ends, tabs and controls as references, so that they stay. */
export const xmlText = (text: string): string =>
  text.replace(ESCAPED, (letter) => NAMED.get(letter) ?? `&#${letter.charCodeAt(0)};`);
