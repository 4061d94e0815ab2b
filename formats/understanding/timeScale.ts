import { UNIT_WORDS } from '../entries';
import { quoted, type IssueList } from '../issues';
import { isDateLike, isMissing, isNumber, plainNumber } from '../sources/cellKinds';
import { ownText } from '../sources/ownText';
import type { EntryUnit } from '../types';
import type { ImportChoices } from './choices';
import { dayEvidence, readTime, type ReadTime, type TimeCell, type TimeReading } from './times';

const DAY_SECONDS = 86_400;
const SHOWN = 5;
/** Texts that are remembered with what they say. */
const REMEMBERED = 4_096;
/** Numbers below are neither seconds nor milliseconds since 1970. */
const LARGE = 5e8;

/** Where a cell stands, for messages. */
export interface Place {
  readonly line: number;
  readonly field: string;
}

/** A time in the unit that all times of the network share. */
export interface ScaledTime {
  readonly value: number;
  readonly first: number | null;
  readonly last: number | null;
  readonly of: 'year' | 'month' | null;
}

interface Seen extends Place {
  readonly text: string;
}

/** What a text says; all null where it is missing. */
interface Noted {
  readonly evidence: ReturnType<typeof dayEvidence>;
  readonly yearLike: boolean;
  readonly time: TimeCell | null;
}

const MISSING: Noted = { evidence: null, yearLike: false, time: null };

/**
 * Finds out how the times of a network are written: every cell is `see`n once, then `settle` decides
 * for one unit, one order of day and month and what four digits are, and reports the cells that do
 * not fit; after that `scaled` reads.
 */
export class TimeScale {
  private readonly counts = { number: 0, yearLike: 0, days: 0, seconds: 0 };
  private readonly evidence = { day_first: 0, month_first: 0, either: 0 };
  private readonly examples: string[] = [];
  private readonly large: { seconds: Seen | null; milliseconds: Seen | null } = {
    seconds: null,
    milliseconds: null,
  };
  private zoned: Seen | null = null;
  private unzoned: Seen | null = null;
  private readonly known = new Map<string, Noted>();
  private reading: TimeReading;
  /** Tells what a cell is before the order of day and month is settled. */
  private readonly tentative: TimeReading;
  unit: EntryUnit = 'number';

  constructor(
    private readonly file: string,
    choices: Pick<ImportChoices, 'decimal' | 'dayOrder' | 'years'>,
  ) {
    const { decimal, dayOrder, years } = choices;
    this.reading = { decimal, dayOrder, years };
    this.tentative = { decimal, dayOrder: dayOrder ?? 'day_first', years };
  }

  /** What a text says, remembered: times of edges come again and again. */
  private noted(text: string, reading: TimeReading): Noted {
    const known = this.known.get(text);
    if (known) return known;
    if (this.known.size === REMEMBERED) this.known.clear();
    const noted = isMissing(text)
      ? null
      : { evidence: dayEvidence(text), yearLike: isYearLike(text), time: readTime(text, reading) };
    this.known.set(ownText(text), noted ?? MISSING);
    return noted ?? MISSING;
  }

  /** Takes account of a cell; missing ones count for nothing. */
  see(text: string, place: Place): void {
    const plain = this.reading.decimal === '.' && text.length !== 4 ? plainNumber(text) : NaN;
    if (plain < LARGE) {
      this.counts.number++;
      return;
    }
    const { evidence, yearLike, time } = this.noted(text, this.tentative);
    if (time === null) return;
    if (evidence !== null) {
      this.evidence[evidence]++;
      if (evidence === 'either' && this.examples.length < SHOWN) this.examples.push(text);
    }
    if (yearLike) {
      this.counts.yearLike++;
      return;
    }
    if (time.unit === null) {
      if (isDateLike(text)) this.counts.days++;
      return;
    }
    this.counts[time.unit]++;
    if (time.unit === 'seconds' && (time.zoned ? this.zoned : this.unzoned) === null) {
      const seen = { ...place, text };
      if (time.zoned) this.zoned = seen;
      else this.unzoned = seen;
    }
    if (time.unit === 'number') this.seeMagnitude(time.value, { ...place, text });
  }

  private seeMagnitude(value: number, seen: Seen): void {
    const size = Math.abs(value);
    if (size >= 5e8 && size < 1e10) this.large.seconds ??= seen;
    if (size >= 5e11 && size < 1e13) this.large.milliseconds ??= seen;
  }

  /**
   * Decides on unit, order of day and month, and years.
   * @returns cells of which only the order of day and month is unknown; empty if all can be read
   */
  settle(issues: IssueList): readonly string[] {
    this.known.clear();
    const { number, yearLike, days, seconds } = this.counts;
    const dates = days + seconds;
    const yearsAreDates =
      this.reading.years === 'dates' ? true : dates > 0 && dates + yearLike > number;
    this.reading = {
      ...this.reading,
      dayOrder: this.reading.dayOrder ?? this.orderByEvidence(),
      years: yearsAreDates ? 'dates' : 'numbers',
    };
    const numbers = number + (yearsAreDates ? 0 : yearLike);
    const allDates = dates + (yearsAreDates ? yearLike : 0);
    if (numbers >= allDates) this.unit = 'number';
    else this.unit = seconds > 0 ? 'seconds' : 'days';
    this.checkZones(issues);
    this.checkMagnitudes(issues);
    return this.reading.dayOrder === null && this.evidence.either > 0 ? this.examples : [];
  }

  /** Order of day and month as settled; null where nothing told it. */
  get dayOrder(): ImportChoices['dayOrder'] {
    return this.reading.dayOrder;
  }

  private orderByEvidence(): ImportChoices['dayOrder'] {
    const { day_first, month_first } = this.evidence;
    if (day_first === 0 && month_first === 0) return null;
    return day_first >= month_first ? 'day_first' : 'month_first';
  }

  private checkZones(issues: IssueList): void {
    const { zoned, unzoned, file } = this;
    if (!zoned || !unzoned || this.unit !== 'seconds') return;
    const [first, other] = zoned.line <= unzoned.line ? [zoned, unzoned] : [unzoned, zoned];
    issues.add({
      file,
      line: other.line,
      field: other.field,
      message: `Some times have a time zone and some do not (line ${first.line} differs). Write a zone on all of them, like 2024-02-01T09:30Z, or on none.`,
    });
  }

  private checkMagnitudes(issues: IssueList): void {
    const { seconds, milliseconds } = this.large;
    if (!seconds || !milliseconds || this.unit !== 'number') return;
    const [first, other] =
      seconds.line <= milliseconds.line ? [seconds, milliseconds] : [milliseconds, seconds];
    issues.add({
      file: this.file,
      line: other.line,
      field: other.field,
      message: `${quoted(seconds.text)} looks like seconds since 1970 and ${quoted(milliseconds.text)} like milliseconds (line ${first.line} differs). Use one of them throughout.`,
    });
  }

  /** Reads a cell after `settle`; null where it is missing or wrong, and then it says so if wrong. */
  scaled(text: string, place: Place, issues: IssueList): ScaledTime | null {
    const quick = this.unit === 'number' && this.reading.decimal === '.' && text.length !== 4;
    const plain = quick ? plainNumber(text) : NaN;
    if (!Number.isNaN(plain)) return { value: plain, first: null, last: null, of: null };
    const { time } = this.noted(text, this.reading);
    if (time === null) return null;
    if (time.unit === null) {
      // An unknown order is asked once, not reported in every row.
      if (!time.ambiguous) issues.add({ file: this.file, ...place, message: time.message });
      return null;
    }
    if (time.unit !== this.unit && !(this.unit === 'seconds' && time.unit === 'days')) {
      issues.add({
        file: this.file,
        ...place,
        message: `${quoted(text)} is ${UNIT_WORDS[time.unit]}, but most of the column has ${UNIT_WORDS[this.unit]}. Use one kind throughout.`,
      });
      return null;
    }
    return scaledTo(this.unit, time);
  }
}

const isYearLike = (text: string): boolean => /^\d{4}$/.test(text) && isNumber(text, '.');

/** A day among times of day counts from its midnight; an interval of days to its last second. */
function scaledTo(unit: EntryUnit, { unit: own, value, interval }: ReadTime): ScaledTime {
  const step = unit === 'seconds' && own === 'days' ? DAY_SECONDS : 1;
  return {
    value: value * step,
    first: interval ? interval.first * step : null,
    last: interval ? interval.last * step + step - 1 : null,
    of: interval?.of ?? null,
  };
}
