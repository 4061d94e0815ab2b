import { quoted } from '../issues';
import { readTime } from '../understanding/times';
import type { ElementRows } from './elementRows';
import type { GraphTables } from './graphTables';

/** When an element is there: text as written, '' where the end is open. */
export interface Interval {
  readonly start: string;
  readonly end: string;
}

/** What a file says about its times. */
export interface TimeFormat {
  /** `double`, `integer`, `date` or `dateTime`. */
  readonly written: string;
}

/** Ends that mean “always”. */
const UNBOUNDED = /^[+-]?inf(?:inity)?$/i;

/** The times of one node or edge while it is read. */
export class ElementTimes {
  private readonly intervals: Interval[] = [];
  private spells = 0;

  constructor(
    private readonly line: number,
    private readonly words: string,
  ) {}

  /** Takes the attributes of an element or spell; `startopen` and `endopen` leave the end out. */
  take(attributes: ReadonlyMap<string, string>, tables: GraphTables): boolean {
    const at = (name: string): string | undefined => attributes.get(name)?.trim();
    const point = at('timestamp');
    const start = point ?? at('start') ?? at('startopen');
    const end = point ?? at('end') ?? at('endopen');
    if (start === undefined && end === undefined) return false;
    if (at('startopen') !== undefined || at('endopen') !== undefined)
      tables.drop('open ends of intervals (read as closed)');
    this.add({ start: bounded(start ?? ''), end: bounded(end ?? '') });
    return true;
  }

  spell(attributes: ReadonlyMap<string, string>, tables: GraphTables): void {
    this.spells++;
    if (!this.take(attributes, tables)) this.add({ start: '', end: '' });
  }

  /** Takes lists like `<[1.0, 3.0]; [5.0, 6.0]>` (intervals) and `<[1.0, 2.0]>` (timestamps). */
  takeLists(attributes: ReadonlyMap<string, string>): void {
    const intervals = attributes.get('intervals') ?? '';
    for (const [, start = '', end = ''] of intervals.matchAll(
      /[[(]([^,;[\]()]*),([^,;[\]()]*)[\])]/g,
    ))
      this.listed({ start: bounded(start.trim()), end: bounded(end.trim()) });
    const stamps = attributes.get('timestamps') ?? '';
    for (const stamp of stamps.split(/[<>[\],;\s]+/)) {
      if (stamp !== '') this.listed({ start: stamp, end: stamp });
    }
  }

  private listed(interval: Interval): void {
    this.spells++;
    this.add(interval);
  }

  private add(interval: Interval): void {
    this.intervals.push(interval);
  }

  /** Sets the first start and the last end; spells past the first are counted. */
  finish(rows: ElementRows, row: number, format: TimeFormat, tables: GraphTables): void {
    if (this.intervals.length === 0) return;
    tables.drop('spells past the first of an element', Math.max(0, this.spells - 1));
    const start = this.outermost('start', format, tables);
    const end = this.outermost('end', format, tables);
    if (start !== '') rows.set(row, rows.own('start'), start);
    if (end !== '') rows.set(row, rows.own('end'), end);
  }

  /** The earliest start or the latest end; '' where one interval has none. */
  private outermost(side: 'start' | 'end', format: TimeFormat, tables: GraphTables): string {
    let best: { text: string; value: number } | null = null;
    let wrong = '';
    for (const interval of this.intervals) {
      const text = interval[side];
      if (text === '') return '';
      const value = this.value(text, side, format, tables);
      if (value === null) wrong = text;
      if (value === null) continue;
      const better = best === null || (side === 'start' ? value < best.value : value > best.value);
      if (better) best = { text, value };
    }
    return best?.text ?? wrong;
  }

  private value(
    text: string,
    side: 'start' | 'end',
    { written }: TimeFormat,
    tables: GraphTables,
  ): number | null {
    const dates = /^date/i.test(written);
    const read = readTime(text, {
      decimal: '.',
      dayOrder: null,
      years: dates ? 'dates' : 'numbers',
    });
    const fits = read.unit !== null && (read.unit === 'number') !== dates;
    if (fits) return read.unit === 'days' ? read.value * 86_400 : read.value;
    const wanted = dates ? 'a date like 2024-02-01' : 'a number';
    tables.issue(
      this.line,
      side,
      `The ${side} ${quoted(text)} of ${this.words} is not ${wanted}, as the time format ${quoted(written)} has it. Correct the time or the format.`,
    );
    return null;
  }
}

const bounded = (text: string): string => (UNBOUNDED.test(text) ? '' : text);
