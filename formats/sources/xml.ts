import { SaxesParser, type SaxesAttributePlain } from 'saxes';
import { quoted } from '../issues';
import { LineCount } from './lineCount';
import { loneAmpersand } from './loneAmpersand';
import type { SourceLimits } from './types';
import { Unreadable } from './unreadable';

/** An element whose start has been read. */
export interface XmlElement {
  /** Without its prefix. */
  readonly name: string;
  /** Whether its prefix is another than that of the first element. */
  readonly foreign: boolean;
  /** By name as written, `xml:space` with its prefix. */
  readonly attributes: ReadonlyMap<string, string>;
  readonly line: number;
  readonly parent: XmlElement | null;
  /** Whether `xml:space="preserve"` holds for it. */
  readonly preserve: boolean;
}

export interface XmlReader {
  open(element: XmlElement): void;
  /** @param text what stands directly in the element after its last child, CDATA with the rest */
  close(element: XmlElement, text: string): void;
}

interface Open extends XmlElement {
  text: string;
}

/** Characters that are parsed at a time. */
const PIECE = 65_536;
/** Attributes of one element. */
const MOST_ATTRIBUTES = 256;

/**
 * Reads XML 1.0 with saxes, which is strict about well-formedness, keeps to the five entities of XML
 * and numbers, and holds no document. A DOCTYPE is refused, so that nothing can be defined to
 * expand; depth, attributes and the length of texts have limits.
 * @throws Unreadable with the line of the first thing that is wrong
 */
export function readXml(text: string, limits: SourceLimits, reader: XmlReader): void {
  new XmlWalk(text, limits, reader).read();
}

class XmlWalk {
  private readonly parser = new SaxesParser();
  /** Elements that are open, the innermost last. */
  private readonly stack: Open[] = [];
  private lastClosed: Open | null = null;
  private rootPrefix: string | null = null;
  private startLine = 1;
  private attributes = new Map<string, string>();

  constructor(
    private readonly source: string,
    private readonly limits: SourceLimits,
    private readonly reader: XmlReader,
  ) {
    const { parser } = this;
    parser.on('error', (error) => this.fail(error.message));
    parser.on('doctype', (text) => {
      const above = text.split('\n').length - 1;
      throw new Unreadable(parser.line - above, DOCTYPE);
    });
    parser.on('opentagstart', () => this.start());
    parser.on('attribute', (one) => this.attribute(one));
    parser.on('opentag', ({ name }) => this.opened(name));
    parser.on('text', (piece) => this.text(piece));
    parser.on('cdata', (piece) => this.text(piece));
    parser.on('closetag', () => this.closed());
  }

  read(): void {
    const { source, parser } = this;
    for (let at = 0; at < source.length; at += PIECE) parser.write(source.slice(at, at + PIECE));
    this.parser.close();
  }

  private start(): void {
    const { parser } = this;
    // The name ends with the character before, which may have been a line end.
    this.startLine = parser.column === 0 ? parser.line - 1 : parser.line;
    this.attributes = new Map();
    if (this.stack.length === this.limits.depth) {
      throw new Unreadable(
        this.startLine,
        `Elements are nested more than ${this.limits.depth} deep. No network needs that; look for elements that are not closed.`,
      );
    }
  }

  private attribute({ name, value }: SaxesAttributePlain): void {
    if (this.attributes.size === MOST_ATTRIBUTES) {
      throw new Unreadable(
        this.startLine,
        `An element has more than ${MOST_ATTRIBUTES} attributes. Leave the others out.`,
      );
    }
    if (this.attributes.has(name)) this.fail(`duplicate attribute: ${name}.`);
    this.checkLength(value.length, this.startLine);
    this.attributes.set(name, value);
  }

  private opened(tag: string): void {
    const colon = tag.indexOf(':');
    const prefix = colon < 0 ? '' : tag.slice(0, colon);
    this.rootPrefix ??= prefix;
    const parent = this.stack.at(-1) ?? null;
    const space = this.attributes.get('xml:space');
    const open: Open = {
      name: tag.slice(colon + 1),
      foreign: prefix !== this.rootPrefix,
      attributes: this.attributes,
      line: this.startLine,
      parent,
      preserve: space === undefined ? (parent?.preserve ?? false) : space === 'preserve',
      text: '',
    };
    // Only layout stands between elements; it would grow with their number.
    const above = this.stack.at(-1);
    if (above) above.text = '';
    this.stack.push(open);
    this.reader.open(open);
  }

  private text(piece: string): void {
    const open = this.stack.at(-1);
    if (!open) return;
    this.checkLength(open.text.length + piece.length, open.line);
    open.text += piece;
  }

  private checkLength(length: number, line: number): void {
    const most = this.limits.lineCharacters;
    if (length > most)
      throw new Unreadable(line, `A text is longer than ${most} characters. Shorten it.`);
  }

  private closed(): void {
    const open = this.stack.pop();
    if (!open) return;
    this.lastClosed = open;
    this.reader.close(open, open.text);
  }

  private fail(message: string): never {
    const said = message.replace(/^\d+:\d+: /, '');
    const { parser } = this;
    if (/^(?:unclosed tag|unexpected end|disallowed character in entity)/.test(said)) {
      // saxes looks for the end of a reference that never ends, through everything that follows.
      const at = loneAmpersand(this.source);
      if (at >= 0) throw new Unreadable(new LineCount(this.source).at(at), LONE);
    }
    // saxes tells of a wrong end after it has closed the element.
    const open = said.startsWith('unexpected close tag') ? this.lastClosed : this.stack.at(-1);
    if (open && /^(?:unclosed tag|unexpected close tag|unexpected end)/.test(said)) {
      throw new Unreadable(open.line, `The element ${quoted(open.name)} is never closed.`);
    }
    const words = WORDS.find(([pattern]) => pattern.test(said))?.[1];
    throw new Unreadable(parser.line, words ?? `It is not well-formed XML: ${said}`);
  }
}

const LONE = 'An “&” stands alone. Write &amp; where it belongs to the text.';
const DOCTYPE =
  'It has a DOCTYPE, which can define entities, so it is not read. Remove the <!DOCTYPE …> and bring the file again.';

/** What saxes says, in plain words. */
const WORDS: readonly (readonly [RegExp, string])[] = [
  [
    /^undefined entity/,
    'An entity is used that is not one of &amp;, &lt;, &gt;, &quot; and &apos;. Write the character itself.',
  ],
  [
    /^malformed character entity/,
    'A character reference (&#…;) names no character that XML allows. Remove it.',
  ],
  [/^disallowed character in entity|^empty entity/, LONE],
  [
    /^disallowed character\./,
    'There is a character that XML does not allow (a control character, or “<” in a value). Remove it.',
  ],
  [/^duplicate attribute/, 'An element has the same attribute twice. Remove one of them.'],
  [/^document must contain a root/, 'There is no element in it.'],
  [/^documents may contain only one root/, 'More follows after the end of the first element.'],
  [/^unexpected end/, 'The file ends within a tag or a comment. It seems to be cut off.'],
  [/^text data outside/, 'There is text outside of the first element.'],
  [/^unmatched closing tag/, 'An element is closed that was never opened.'],
];
