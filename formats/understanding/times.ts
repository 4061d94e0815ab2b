import { readEntry } from '../entries';
import { quoted } from '../issues';
import { isNumber } from '../sources/cellKinds';
import type { DecimalMark } from '../sources/types';
import type { EntryUnit } from '../types';
import type { ImportChoices } from './choices';

/** How the texts of a time column are to be read. */
export interface TimeReading {
  readonly decimal: DecimalMark;
  readonly dayOrder: ImportChoices['dayOrder'];
  readonly years: ImportChoices['years'];
}

/** What one cell says about time. */
export type TimeCell = ReadTime | UnreadTime;

export interface ReadTime {
  readonly unit: EntryUnit;
  /** In its unit; of an interval its middle, a whole day, rounded down. */
  readonly value: number;
  /** First and last day that a year or a month means; null for a point in time. */
  readonly interval: {
    readonly of: 'year' | 'month';
    readonly first: number;
    readonly last: number;
  } | null;
  /** Whether a date with time names its zone. */
  readonly zoned: boolean;
}

export interface UnreadTime {
  readonly unit: null;
  readonly message: string;
  /** Whether only the order of day and month is missing. */
  readonly ambiguous: boolean;
}

const YEAR = /^\d{4}$/;
const YEAR_FIRST = /^(\d{4})([-/.])(\d{1,2})\2(\d{1,2})(?:(?:T| +)(.+))?$/;
const YEAR_LAST = /^(\d{1,2})([-/.])(\d{1,2})\2(\d{4})(?:(?:T|,? +)(.+))?$/;
const YEAR_MONTH = /^(\d{4})[-/](\d{1,2})$/;
const MONTH_YEAR = /^(\d{1,2})[-/](\d{4})$/;
const SHORT_YEAR = /^\d{1,2}([-/.])\d{1,2}\1\d{2}(?:[T ].*)?$/;
const DAY_NAMED = /^(\d{1,2})[ -]?(\p{L}{3,9})\.?[ -]?,? ?(\d{4})$/u;
const NAMED_DAY = /^(\p{L}{3,9})\.? (\d{1,2}),? (\d{4})$/u;
const NAMED_YEAR = /^(\p{L}{3,9})\.?[ -](\d{4})$/u;
const CLOCK =
  /^(\d{1,2}):(\d{2})(?::(\d{2})(?:[.,](\d{1,9}))?)? ?([AaPp]\.?[Mm]\.?)?(Z| ?UTC| ?[+-]\d{2}(?::?\d{2})?)?$/;

const MONTHS = ['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec'];
const LONG = [
  'january',
  'february',
  'march',
  'april',
  'may',
  'june',
  'july',
  'august',
  'september',
].concat(['october', 'november', 'december']);

/**
 * Reads a number, a date (2024-02-01, 1/2/2024, 1 Feb 2024), a date with time, or the interval of a
 * month (2024-02, 02/2024, Feb 2024) or, where years are dates, of a year.
 */
export function readTime(text: string, reading: TimeReading): TimeCell {
  if (YEAR.test(text) && reading.years === 'dates') return yearOf(text);
  if (isNumber(text, reading.decimal)) {
    const entry = readEntry(reading.decimal === ',' ? text.replace(',', '.') : text);
    return entry.unit === null ? unread(entry.message) : { ...entry, interval: null };
  }
  return readDate(text, reading) ?? unread(refusal(text, reading));
}

function readDate(text: string, reading: TimeReading): TimeCell | null {
  const first = YEAR_FIRST.exec(text);
  if (first) return dayWithClock(text, first[1], first[3], first[4], first[5]);
  const last = YEAR_LAST.exec(text);
  if (last) return yearLast(text, last, reading);
  const month = YEAR_MONTH.exec(text);
  if (month) return monthOf(text, month[1], month[2]);
  const reversed = MONTH_YEAR.exec(text);
  if (reversed) return monthOf(text, reversed[2], reversed[1]);
  const [, day, dayMonth, dayYear] = DAY_NAMED.exec(text) ?? [];
  if (dayMonth) return namedMonth(text, dayMonth, dayYear, day);
  const [, leadingMonth, leadingDay, leadingYear] = NAMED_DAY.exec(text) ?? [];
  if (leadingMonth) return namedMonth(text, leadingMonth, leadingYear, leadingDay);
  const [, aloneMonth, aloneYear] = NAMED_YEAR.exec(text) ?? [];
  if (aloneMonth) return namedMonth(text, aloneMonth, aloneYear, null);
  return null;
}

const unread = (message: string): UnreadTime => ({ unit: null, message, ambiguous: false });

/** Which of the first two numbers of 01/02/2024 has to be the day; null if both may be. */
export function dayEvidence(text: string): ImportChoices['dayOrder'] | 'either' {
  const parts = YEAR_LAST.exec(text);
  if (!parts || parts[2] === '.') return null;
  const [a, b] = [Number(parts[1]), Number(parts[3])];
  if (a > 12 && b <= 12) return 'day_first';
  if (b > 12 && a <= 12) return 'month_first';
  return a === b || a > 31 || b > 31 || (a > 12 && b > 12) ? null : 'either';
}

/** 01.02.2024 has the day first wherever it is written; with other marks that has to be known. */
function yearLast(text: string, parts: RegExpExecArray, { dayOrder }: TimeReading): TimeCell {
  const [, a, mark, b, year, clock] = parts;
  const order = mark === '.' ? 'day_first' : dayOrder;
  if (order === null && dayEvidence(text) === 'either') {
    return {
      unit: null,
      ambiguous: true,
      message: `${quoted(text)} can be read as two different days. Say whether the day or the month comes first.`,
    };
  }
  const dayFirst = order === null ? dayEvidence(text) !== 'month_first' : order === 'day_first';
  const [day, month] = dayFirst ? [a, b] : [b, a];
  if (Number(month) > 12) {
    return unread(
      `${quoted(text)} has no month ${month} with the ${dayFirst ? 'day' : 'month'} first. Use one order of day and month throughout.`,
    );
  }
  return dayWithClock(text, year, month, day, clock);
}

function dayWithClock(
  text: string,
  year = '',
  month = '',
  day = '',
  clock: string | undefined,
): TimeCell {
  const iso = `${year}-${month.padStart(2, '0')}-${day.padStart(2, '0')}`;
  const date = readEntry(iso);
  if (date.unit === null) return unread(`The calendar has no day ${quoted(text)}.`);
  if (clock === undefined) return { ...date, interval: null };
  const parts = CLOCK.exec(clock.trim());
  if (!parts) return unread(refusal(text, { decimal: '.' }));
  return withClock(text, iso, parts);
}

function withClock(text: string, iso: string, parts: RegExpExecArray): TimeCell {
  const [, hour = '', minute = '', second = '00', fraction = '', half, zone = ''] = parts;
  const hours = hourOf(Number(hour), half);
  const fullZone = zone
    .replace(/ ?UTC/, 'Z')
    .replace(/^ ?([+-]\d{2})$/, '$1:00')
    .trim();
  const short = fraction.length > 3 ? '' : fraction;
  const entry = readEntry(
    `${iso}T${String(hours).padStart(2, '0')}:${minute}:${second}${short === '' ? '' : `.${short}`}${fullZone}`,
  );
  if (entry.unit === null) {
    return unread(
      `${quoted(text)} is no time of day in a real zone: hours go from 00 to 23, minutes and seconds to 59, zones from -14:00 to +14:00.`,
    );
  }
  const value = fraction.length > 3 ? entry.value + Number(`0.${fraction}`) : entry.value;
  return { ...entry, value, interval: null };
}

/** 12 AM is 0 and 12 PM is 12; an hour past 12 has no half, and stays wrong. */
function hourOf(hour: number, half: string | undefined): number {
  if (half === undefined) return hour;
  if (hour < 1 || hour > 12) return 99;
  return (hour % 12) + (half.toLowerCase().startsWith('p') ? 12 : 0);
}

function namedMonth(
  text: string,
  name: string,
  year = '',
  day: string | null = null,
): TimeCell | null {
  const lower = name.toLowerCase();
  const at = Math.max(MONTHS.indexOf(lower), LONG.indexOf(lower), lower === 'sept' ? 8 : -1);
  if (at < 0) return null;
  const month = String(at + 1);
  return day === null
    ? monthOf(text, year, month)
    : dayWithClock(text, year, month, day, undefined);
}

function monthOf(text: string, year = '', month = ''): TimeCell {
  const padded = month.padStart(2, '0');
  const start = readEntry(`${year}-${padded}-01`);
  if (start.unit === null) return unread(`The calendar has no month ${quoted(text)}.`);
  const next =
    month === '12'
      ? `${String(Number(year) + 1).padStart(4, '0')}-01-01`
      : `${year}-${String(Number(month) + 1).padStart(2, '0')}-01`;
  return intervalOf('month', start.value, next, start.value + 30);
}

function yearOf(text: string): TimeCell {
  const start = readEntry(`${text}-01-01`);
  if (start.unit === null) return unread(`The calendar has no year ${quoted(text)}.`);
  const next = `${String(Number(text) + 1).padStart(4, '0')}-01-01`;
  return intervalOf('year', start.value, next, start.value + 364);
}

/** @param lastOfAll the last day where the next day has five digits of year (after December 9999) */
function intervalOf(
  of: 'year' | 'month',
  first: number,
  nextStart: string,
  lastOfAll: number,
): ReadTime {
  const next = readEntry(nextStart);
  const last = next.unit === null ? lastOfAll : next.value - 1;
  return {
    unit: 'days',
    value: Math.floor((first + last) / 2),
    interval: { of, first, last },
    zoned: false,
  };
}

function refusal(text: string, { decimal }: Pick<TimeReading, 'decimal'>): string {
  if (/^[+-]?\d*,\d+$/.test(text))
    return `${quoted(text)} has a decimal comma. Say that the file has decimal commas, or write ${quoted(text.replace(',', '.'))}.`;
  if (decimal === ',' && isNumber(text, '.'))
    return `${quoted(text)} has a decimal point, but the file is read with decimal commas. Use one of them throughout.`;
  if (/^[+-]?\d{1,3}(?:([.,' ])\d{3})+(?:[.,]\d+)?$/.test(text))
    return `${quoted(text)} has marks between its thousands. Write the digits without them.`;
  if (SHORT_YEAR.test(text))
    return `${quoted(text)} has a year of two digits. Write all four, like 2024-02-01.`;
  if (/^[+-]?(?:nan|inf(?:inity)?)$/i.test(text))
    return `${quoted(text)} is not a number that orders nodes. Write when the node arrived.`;
  return `${quoted(text)} is neither a plain number (12.5) nor a date (2024-02-01) nor a date with time (2024-02-01T09:30).`;
}
