import { quoted } from './issues';
import type { EntryUnit } from './types';

/** What one cell says about time: a value in its unit, or what is wrong with it. */
export type Entry =
  | { readonly unit: EntryUnit; readonly value: number; readonly zoned: boolean }
  | { readonly unit: null; readonly message: string };

const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const WHOLE = /^[+-]?\d+$/;
const DAY = /^(\d{4})-(\d{2})-(\d{2})$/;
const MOMENT =
  /^(\d{4}-\d{2}-\d{2})[T ](\d{2}):(\d{2})(?::(\d{2})(?:\.(\d{1,3}))?)?(Z|[+-]\d{2}:?\d{2})?$/;
const DAY_SECONDS = 86_400;

/** Reads a plain decimal number, an ISO 8601 date or an ISO 8601 date-time. */
export function readEntry(text: string): Entry {
  if (NUMBER.test(text)) return readNumber(text);
  const day = DAY.exec(text);
  if (day) return readDay(text, day);
  const moment = MOMENT.exec(text);
  if (moment) return readMoment(text, moment);
  return { unit: null, message: refusal(text) };
}

function readNumber(text: string): Entry {
  const value = Number(text);
  if (!Number.isFinite(value)) {
    return {
      unit: null,
      message: `${quoted(text)} is larger than a number can be (about 1.8e308).`,
    };
  }
  if (WHOLE.test(text) && !Number.isSafeInteger(value)) {
    return {
      unit: null,
      message: `${quoted(text)} is past 9007199254740991: whole numbers that large cannot be told apart exactly. Count from a later origin.`,
    };
  }
  return { unit: 'number', value: value === 0 ? 0 : value, zoned: false };
}

/** Days since 1970-01-01, or NaN where the calendar has no such day. */
function daysSinceEpoch(year: number, month: number, day: number): number {
  const date = new Date(0);
  date.setUTCFullYear(year, month - 1, day);
  const real = date.getUTCMonth() === month - 1 && date.getUTCDate() === day && year >= 1;
  return real ? date.getTime() / (DAY_SECONDS * 1000) : NaN;
}

function readDay(text: string, [, year, month, day]: RegExpExecArray): Entry {
  const value = daysSinceEpoch(Number(year), Number(month), Number(day));
  if (Number.isNaN(value))
    return { unit: null, message: `The calendar has no day ${quoted(text)}.` };
  return { unit: 'days', value, zoned: false };
}

function readMoment(text: string, parts: RegExpExecArray): Entry {
  const [, day = '', hour, minute, second = '0', fraction = '', zone] = parts;
  const date = readEntry(day);
  if (date.unit === null) return date;
  const [h, m, s] = [Number(hour), Number(minute), Number(second)];
  if (h > 23 || m > 59 || s > 59) {
    return {
      unit: null,
      message: `${quoted(text)} is no time of day: hours go from 00 to 23, minutes and seconds to 59.`,
    };
  }
  const offset = offsetSeconds(zone);
  if (offset === null) return { unit: null, message: `${quoted(text)} has no real time zone.` };
  // One division of whole milliseconds: the nearest double to the written second.
  const seconds = date.value * DAY_SECONDS + h * 3600 + m * 60 + s - offset;
  const value = (seconds * 1000 + Number(fraction.padEnd(3, '0'))) / 1000;
  return { unit: 'seconds', value, zoned: zone !== undefined };
}

function offsetSeconds(zone: string | undefined): number | null {
  if (zone === undefined || zone === 'Z') return 0;
  const digits = zone.slice(1).replace(':', '');
  const [hours, minutes] = [Number(digits.slice(0, 2)), Number(digits.slice(2))];
  if (hours > 14 || minutes > 59) return null;
  return (zone.startsWith('-') ? -1 : 1) * (hours * 3600 + minutes * 60);
}

function refusal(text: string): string {
  if (/^[+-]?\d+,\d+$/.test(text))
    return `${quoted(text)} has a decimal comma. Write ${quoted(text.replace(',', '.'))}.`;
  if (/^\d{1,2}[/.-]\d{1,2}[/.-]\d{2,4}$/.test(text)) {
    return `${quoted(text)} can be read as two different days. Write the date as year-month-day, like 2024-02-01.`;
  }
  if (/^[+-]?(?:nan|inf(?:inity)?)$/i.test(text))
    return `${quoted(text)} is not a number that orders nodes. Write when the node arrived.`;
  return `${quoted(text)} is neither a plain number (12.5) nor a date (2024-02-01) nor a date with time (2024-02-01T09:30).`;
}

/** The words for a unit in messages. */
export const UNIT_WORDS: Readonly<Record<EntryUnit, string>> = {
  number: 'a number',
  days: 'a date',
  seconds: 'a date with time',
};
