/** A line with its own end (LF, CRLF, CR or, at the end of the file, none). */
export interface SourceLine {
  /** 1-based. */
  readonly line: number;
  readonly text: string;
  readonly end: string;
}

/** A line, or a row over several lines, that is longer than is read. */
export class TooLong extends Error {
  override readonly name = 'TooLong';
  constructor(readonly line: number) {
    super('A line is too long.');
  }
}

/**
 * Lines of a text that comes in blocks; line ends may be mixed.
 * @throws TooLong past `lineCharacters`; what `blocks` throws
 */
export function* linesOf(blocks: Iterable<string>, lineCharacters: number): Generator<SourceLine> {
  let carry = '';
  let line = 1;
  for (const block of blocks) {
    const text = carry + block;
    let from = 0;
    let feed = text.indexOf('\n');
    let carriage = text.indexOf('\r');
    for (;;) {
      const at = carriage < 0 || (feed >= 0 && feed < carriage) ? feed : carriage;
      // A carriage return that ends the block may be half of a line end.
      if (at < 0 || (at === carriage && at === text.length - 1)) break;
      const end = at === carriage ? (feed === at + 1 ? '\r\n' : '\r') : '\n';
      if (at - from > lineCharacters) throw new TooLong(line);
      yield { line, text: text.slice(from, at), end };
      line++;
      from = at + end.length;
      if (feed >= 0 && feed < from) feed = text.indexOf('\n', from);
      if (carriage >= 0 && carriage < from) carriage = text.indexOf('\r', from);
    }
    carry = text.slice(from);
    if (carry.length > lineCharacters) throw new TooLong(line);
  }
  if (carry.endsWith('\r')) yield { line, text: carry.slice(0, -1), end: '\r' };
  else if (carry !== '') yield { line, text: carry, end: '' };
}
