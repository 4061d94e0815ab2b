/**
 * A copy of a text that was cut from a block of a file; the text itself would keep the whole block
 * in memory. Short texts are copies already.
 */
export const ownText = (text: string): string =>
  text.length < 13 ? text : Buffer.from(text, 'utf16le').toString('utf16le');
