import { quoted } from '../issues';
import { LineCount } from './lineCount';
import type { SourceLimits } from './types';
import { Unreadable } from './unreadable';

export type JsonKind = 'object' | 'array' | 'text' | 'number' | 'word';

const SPACE = /[ \t\n\r]*/y;
const NUMBER = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y;
const WORD = /true|false|null/y;
/** A stretch of a string without quotes, escapes and control characters. */
const PLAIN = /[^"\\\u0000-\u001f]*/y;
const ESCAPED: Readonly<Record<string, string>> = {
  '"': '"',
  '\\': '\\',
  '/': '/',
  b: '\b',
  f: '\f',
  n: '\n',
  r: '\r',
  t: '\t',
};

/**
 * Walks JSON (RFC 8259) value by value without building it, so that numbers are had as they are
 * written (past 2⁵³ as well), keys come one by one (`__proto__` is one like any other, a second of
 * the same name is wrong), and depth has a limit. Whoever walks has to take every value: by `text`,
 * `members`, `items` or `skip`.
 */
export class JsonText {
  private at = 0;
  private depth = 0;
  private readonly lines: LineCount;

  constructor(
    private readonly source: string,
    private readonly limits: SourceLimits,
  ) {
    this.lines = new LineCount(source);
  }

  /** Line of what comes next. */
  line(): number {
    this.spaces();
    return this.lines.at(this.at);
  }

  kind(): JsonKind {
    this.spaces();
    const next = this.source[this.at];
    if (next === '{') return 'object';
    if (next === '[') return 'array';
    if (next === '"') return 'text';
    if (next !== undefined && /[-\d]/.test(next)) return 'number';
    if (next !== undefined && /[tfn]/.test(next)) return 'word';
    return this.fail(
      next === undefined
        ? 'The file ends where a value is expected. It seems to be cut off.'
        : `There is ${quoted(next)} where a value is expected.`,
    );
  }

  /** A text, or a number or word as written. */
  text(): string {
    switch (this.kind()) {
      case 'text':
        return this.string();
      case 'number':
        return this.matched(NUMBER, 'This is no number as JSON has it.');
      case 'word':
        return this.matched(WORD, 'This is neither true, false nor null.');
      default:
        return this.fail('A text or a number is expected here.');
    }
  }

  /** Walks an object; `each` takes the value. */
  members(each: (key: string) => void): void {
    const seen = new Set<string>();
    this.walk('{', '}', () => {
      if (this.kind() !== 'text') this.fail('A name in double quotes is expected here.');
      const line = this.line();
      const key = this.string();
      if (seen.has(key)) {
        throw new Unreadable(
          line,
          `The key ${quoted(key)} stands twice in one object. Remove one of them.`,
        );
      }
      seen.add(key);
      this.expect(':');
      each(key);
    });
  }

  /** Walks an array; `each` takes the value. */
  items(each: () => void): void {
    this.walk('[', ']', each);
  }

  skip(): void {
    switch (this.kind()) {
      case 'object':
        return this.members(() => this.skip());
      case 'array':
        return this.items(() => this.skip());
      default:
        this.text();
    }
  }

  /** @throws Unreadable if anything follows */
  end(): void {
    this.spaces();
    if (this.at < this.source.length)
      this.fail('More follows after the end of the first value. A file holds one network.');
  }

  private walk(open: string, close: string, each: () => void): void {
    this.expect(open);
    if (++this.depth > this.limits.depth) {
      this.fail(`Values are nested more than ${this.limits.depth} deep. No network needs that.`);
    }
    this.spaces();
    if (this.source[this.at] === close) this.at++;
    else {
      for (;;) {
        each();
        this.spaces();
        if (this.source[this.at] === close) break;
        this.expect(',', `A comma or ${close} is expected here.`);
      }
      this.at++;
    }
    this.depth--;
  }

  private string(): string {
    const start = this.line();
    this.at++;
    let text = this.plain();
    for (;;) {
      const next = this.source[this.at];
      if (next === '"') break;
      if (next !== '\\') {
        throw new Unreadable(
          start,
          next === undefined
            ? 'A text is opened with a double quote and never closed.'
            : 'A line end or control character stands inside a text. Write it as \\n or \\u…, or close the quote.',
        );
      }
      text += this.escape() + this.plain();
      if (text.length > this.limits.lineCharacters) break;
    }
    this.at++;
    if (text.length > this.limits.lineCharacters)
      throw new Unreadable(
        start,
        `A text is longer than ${this.limits.lineCharacters} characters.`,
      );
    if (/[\0\p{Surrogate}]/u.test(text)) {
      throw new Unreadable(
        start,
        `${quoted(text)} holds a NUL character or half of a character (a lone surrogate). Remove it.`,
      );
    }
    return text;
  }

  private plain(): string {
    PLAIN.lastIndex = this.at;
    const [text = ''] = PLAIN.exec(this.source) ?? [];
    this.at += text.length;
    return text;
  }

  private escape(): string {
    const letter = this.source[this.at + 1] ?? '';
    if (letter === 'u') {
      const digits = this.source.slice(this.at + 2, this.at + 6);
      if (!/^[\da-fA-F]{4}$/.test(digits))
        this.fail('After \\u four hexadecimal digits are expected.');
      this.at += 6;
      return String.fromCharCode(parseInt(digits, 16));
    }
    const meant = Object.hasOwn(ESCAPED, letter) ? ESCAPED[letter] : undefined;
    if (meant === undefined)
      return this.fail('After a backslash one of " \\ / b f n r t u is expected.');
    this.at += 2;
    return meant;
  }

  private matched(pattern: RegExp, message: string): string {
    pattern.lastIndex = this.at;
    const [text = ''] = pattern.exec(this.source) ?? [];
    const after = this.source[this.at + text.length] ?? '';
    if (text === '' || /[\w.+-]/.test(after)) this.fail(message);
    this.at += text.length;
    return text;
  }

  private expect(mark: string, message = `${mark} is expected here.`): void {
    this.spaces();
    if (this.source[this.at] !== mark) this.fail(message);
    this.at++;
  }

  private spaces(): void {
    SPACE.lastIndex = this.at;
    this.at += SPACE.exec(this.source)?.[0].length ?? 0;
  }

  private fail(message: string): never {
    throw new Unreadable(this.line(), message);
  }
}
