import type { Delimiter } from './types';

/** What one line of a delimited table holds. */
export interface ScannedLine {
  /** Cells without quotes and surrounding spaces; meaningless if the line began inside a cell. */
  readonly cells: readonly string[];
  /** Whether the line ends inside a quoted cell, which then goes on in the next line. */
  readonly open: boolean;
  /** Whether a quote stands where none may be. */
  readonly bad: boolean;
}

/**
 * Splits one line as RFC 4180 has it, spaces around cells left out (those within quotes kept). With
 * the delimiter ' ' any run of spaces and tabs is one.
 * @param from 'inside' where the line before ended inside a quoted cell
 */
export function scanLine(
  text: string,
  delimiter: Delimiter,
  from: 'start' | 'inside' = 'start',
): ScannedLine {
  if (from === 'start' && !text.includes('"'))
    return { cells: plainCells(text, delimiter), open: false, bad: false };
  const cells: string[] = [];
  let at = from === 'inside' ? closingQuote(text, 0) + 1 : 0;
  if (from === 'inside') {
    if (at === 0) return { cells, open: true, bad: false };
    at = afterCell(text, at, delimiter);
    if (at < 0) return { cells, open: false, bad: true };
  } else if (delimiter === ' ') at = afterSpaces(text, 0);
  while (at <= text.length) {
    const start = delimiter === '\t' ? afterBlanks(text, at) : afterSpaces(text, at);
    if (text[start] === '"') {
      const close = closingQuote(text, start + 1);
      if (close < 0) return { cells, open: true, bad: false };
      cells.push(text.slice(start + 1, close).replaceAll('""', '"'));
      at = afterCell(text, close + 1, delimiter);
    } else {
      const end = delimiterAt(text, start, delimiter);
      const cell = text.slice(start, end);
      if (cell.includes('"')) return { cells, open: false, bad: true };
      if (delimiter !== ' ' || start < text.length) cells.push(cell.trim());
      at = delimiter === ' ' ? afterSpaces(text, end) : end + 1;
      if (delimiter === ' ' && at >= text.length) break;
    }
    if (at < 0) return { cells, open: false, bad: true };
    if (delimiter === ' ' && at >= text.length) break;
  }
  return { cells, open: false, bad: false };
}

function plainCells(text: string, delimiter: Delimiter): string[] {
  if (delimiter === ' ') {
    const trimmed = text.trim();
    return trimmed === '' ? [] : trimmed.split(/[ \t]+/);
  }
  return text.split(delimiter).map((cell) => cell.trim());
}

/** Index of the quote that ends a cell, doubled quotes passed over; -1 if there is none. */
function closingQuote(text: string, from: number): number {
  for (let at = text.indexOf('"', from); at >= 0; at = text.indexOf('"', at + 2)) {
    if (text[at + 1] !== '"') return at;
  }
  return -1;
}

/** Where the next cell begins after a closed one (past the end if it was the last), -1 where text follows. */
function afterCell(text: string, closed: number, delimiter: Delimiter): number {
  const at = delimiter === '\t' ? afterBlanks(text, closed) : afterSpaces(text, closed);
  if (at >= text.length) return text.length + 1;
  if (delimiter === ' ') return at > closed ? at : -1;
  return text[at] === delimiter ? at + 1 : -1;
}

function delimiterAt(text: string, from: number, delimiter: Delimiter): number {
  if (delimiter === ' ') {
    let at = from;
    while (at < text.length && text[at] !== ' ' && text[at] !== '\t') at++;
    return at;
  }
  const at = text.indexOf(delimiter, from);
  return at < 0 ? text.length : at;
}

const SPACE = /\s/;

function afterSpaces(text: string, from: number): number {
  let at = from;
  while (at < text.length && SPACE.test(text[at] ?? '')) at++;
  return at;
}

/** Spaces that are not themselves the delimiter TAB. */
function afterBlanks(text: string, from: number): number {
  let at = from;
  while (at < text.length && text[at] !== '\t' && SPACE.test(text[at] ?? '')) at++;
  return at;
}
