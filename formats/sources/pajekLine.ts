/** A piece of a line: a word, or what stands in quotes or in square brackets. */
export interface PajekToken {
  readonly kind: 'word' | 'quoted' | 'interval';
  /** Without quotes and brackets. */
  readonly text: string;
}

const SPACES = /\s*/y;
const WORD = /[^\s"[]+/y;

/** Splits a line of a Pajek file; null where a quote or bracket is not closed. */
export function pajekTokens(line: string): PajekToken[] | null {
  const tokens: PajekToken[] = [];
  let at = 0;
  const matched = (pattern: RegExp): string => {
    pattern.lastIndex = at;
    const [text = ''] = pattern.exec(line) ?? [];
    at += text.length;
    return text;
  };
  for (;;) {
    matched(SPACES);
    const next = line[at];
    if (next === undefined) return tokens;
    if (next === '"' || next === '[') {
      const close = line.indexOf(next === '"' ? '"' : ']', at + 1);
      if (close < 0) return null;
      const kind = next === '"' ? 'quoted' : 'interval';
      tokens.push({ kind, text: line.slice(at + 1, close) });
      at = close + 1;
    } else tokens.push({ kind: 'word', text: matched(WORD) });
  }
}

/** The first start and the last end of intervals like 3-7,9,12-* ; '' where an end is open. */
export interface PajekTimes {
  readonly start: string;
  readonly end: string;
  readonly intervals: number;
}

const INTERVAL = /^(-?\d+(?:\.\d+)?|\*)(?:-(-?\d+(?:\.\d+)?|\*))?$/;

/** @returns null where it is no list of intervals */
export function pajekTimes(text: string): PajekTimes | null {
  let start: string | null = null;
  let end: string | null = null;
  const parts = text.split(',');
  for (const part of parts) {
    const [, from, until = from] = INTERVAL.exec(part.trim()) ?? [];
    if (from === undefined || until === undefined) return null;
    const begins = from === '*' ? '' : from;
    const ends = until === '*' ? '' : until;
    if (start === null || begins === '' || (start !== '' && Number(begins) < Number(start)))
      start = begins;
    if (end === null || ends === '' || (end !== '' && Number(ends) > Number(end))) end = ends;
  }
  return { start: start ?? '', end: end ?? '', intervals: parts.length };
}
