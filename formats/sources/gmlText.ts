import { quoted } from '../issues';
import { LineCount } from './lineCount';
import type { SourceLimits } from './types';
import { Unreadable } from './unreadable';

/** What stands behind a key: a list in brackets, or a number, text or word. */
export type GmlValue =
  { readonly kind: 'list' } | { readonly kind: 'number' | 'text' | 'word'; readonly text: string };

const SPACE = /\s*/y;
const KEY = /[A-Za-z_][\w.-]*/y;
const NUMBER = /[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?(?![\w.])/y;
/** Words that programs write for numbers and truth values. */
const WORD = /(?:[+-]?inf(?:inity)?|nan|true|false|none)(?![\w.])/iy;
/** One letter more than any entity that is known, so that a lone & ends the search soon. */
const ENTITY = /&(?:#(\d{1,7})|#x([\da-f]{1,6})|([A-Za-z]{2,8}));/gi;
const BASIC: ReadonlyMap<string, string> = new Map([
  ['quot', '"'],
  ['amp', '&'],
  ['lt', '<'],
  ['gt', '>'],
  ['apos', "'"],
]);
/** Entities of ISO 8859-1 (HTML 2.0), from U+00A0 on. */
const LATIN =
  `nbsp iexcl cent pound curren yen brvbar sect uml copy ordf laquo not shy reg macr deg plusmn sup2
   sup3 acute micro para middot cedil sup1 ordm raquo frac14 frac12 frac34 iquest Agrave Aacute Acirc
   Atilde Auml Aring AElig Ccedil Egrave Eacute Ecirc Euml Igrave Iacute Icirc Iuml ETH Ntilde Ograve
   Oacute Ocirc Otilde Ouml times Oslash Ugrave Uacute Ucirc Uuml Yacute THORN szlig agrave aacute acirc
   atilde auml aring aelig ccedil egrave eacute ecirc euml igrave iacute icirc iuml eth ntilde ograve
   oacute ocirc otilde ouml divide oslash ugrave uacute ucirc uuml yacute thorn yuml`.split(/\s+/);

/**
 * Walks GML (Himsolt 1997) key by key: lists in brackets, numbers as written, texts in quotes over
 * any number of lines with entities for what is not ASCII, comments from # at the start of a line.
 */
export class GmlText {
  private at = 0;
  private depth = 0;
  private readonly lines: LineCount;
  comments = 0;

  constructor(
    private readonly source: string,
    private readonly limits: SourceLimits,
  ) {
    this.lines = new LineCount(source);
  }

  line(): number {
    return this.lines.at(this.at);
  }

  /**
   * Walks the keys up to the end of the list (or of the file, at the top); `each` takes a list by
   * calling `entries` or `skip`.
   */
  entries(each: (key: string, value: GmlValue, line: number) => void): void {
    const opened = this.line();
    if (this.depth > this.limits.depth) {
      throw new Unreadable(
        opened,
        `Lists are nested more than ${this.limits.depth} deep. No network needs that.`,
      );
    }
    for (;;) {
      this.spaces();
      const next = this.source[this.at];
      if (next === undefined) {
        if (this.depth === 0) return;
        throw new Unreadable(opened, 'A list is opened with [ and never closed.');
      }
      if (next === ']') {
        if (this.depth === 0) throw new Unreadable(this.line(), 'A ] closes nothing.');
        this.at++;
        return;
      }
      const line = this.line();
      const key = this.matched(KEY);
      if (key === '') {
        throw new Unreadable(line, `There is ${quoted(next)} where a name like id is expected.`);
      }
      const value = this.value(key);
      if (value.kind === 'list') this.depth++;
      each(key, value, line);
      if (value.kind === 'list') this.depth--;
    }
  }

  /** Passes over the list that was just opened. */
  skip(): void {
    this.entries((_, { kind }) => {
      if (kind === 'list') this.skip();
    });
  }

  private value(key: string): GmlValue {
    this.spaces();
    const next = this.source[this.at];
    if (next === '[') {
      this.at++;
      return { kind: 'list' };
    }
    if (next === '"') return { kind: 'text', text: this.string() };
    const number = this.matched(NUMBER);
    if (number !== '') return { kind: 'number', text: number };
    const word = this.matched(WORD);
    if (word !== '') return { kind: 'word', text: word };
    throw new Unreadable(
      this.line(),
      `The value of ${quoted(key)} is neither a number nor a text in double quotes nor a list in [ and ].`,
      key.slice(0, 100),
    );
  }

  private string(): string {
    const opened = this.line();
    const close = this.source.indexOf('"', this.at + 1);
    if (close < 0)
      throw new Unreadable(opened, 'A text is opened with a double quote and never closed.');
    const raw = this.source.slice(this.at + 1, close);
    if (raw.length > this.limits.lineCharacters) {
      throw new Unreadable(
        opened,
        `A text is longer than ${this.limits.lineCharacters} characters. Look for a quote that is not closed.`,
      );
    }
    this.at = close + 1;
    return raw.includes('&') ? unescaped(raw, opened) : raw;
  }

  private matched(pattern: RegExp): string {
    pattern.lastIndex = this.at;
    const [text = ''] = pattern.exec(this.source) ?? [];
    this.at += text.length;
    return text;
  }

  /** Passes over white space and lines that begin with #. */
  private spaces(): void {
    for (;;) {
      const before = this.at;
      this.matched(SPACE);
      const lineStart = this.at === 0 || /[\n\r]/.test(this.source.slice(before, this.at));
      if (this.source[this.at] !== '#' || !lineStart) return;
      this.comments++;
      const feed = this.source.indexOf('\n', this.at);
      this.at = feed < 0 ? this.source.length : feed;
    }
  }
}

/** Entities that are not known stay as they are written. */
function unescaped(raw: string, line: number): string {
  return raw.replace(ENTITY, (whole, decimal?: string, hexadecimal?: string, name?: string) => {
    if (name !== undefined) {
      const at = LATIN.indexOf(name);
      return BASIC.get(name.toLowerCase()) ?? (at < 0 ? whole : String.fromCharCode(160 + at));
    }
    const code = decimal === undefined ? parseInt(hexadecimal ?? '', 16) : Number(decimal);
    if (code === 0 || code > 0x10ffff || (code >= 0xd800 && code < 0xe000)) {
      throw new Unreadable(line, `${quoted(whole)} names no character. Remove it.`);
    }
    return String.fromCodePoint(code);
  });
}
