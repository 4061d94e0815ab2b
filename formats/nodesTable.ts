import { readEntry, UNIT_WORDS, type Entry } from './entries';
import { quoted, type IssueList } from './issues';
import { readTable } from './table';
import type { EntryUnit, FormatLimits, NetworkNode, SourceFile } from './types';

export interface NodesTable {
  readonly nodes: readonly NetworkNode[];
  readonly entryUnit: EntryUnit;
  /** Row of every id, the key being the id in NFC. */
  readonly rowOf: ReadonlyMap<string, number>;
  readonly ignoredColumns: readonly string[];
}

const SHAPE = { required: ['id', 'entry'], optional: ['label', 'earliest', 'latest'] };
const TIMES = ['entry', 'earliest', 'latest'] as const;
type TimeField = (typeof TIMES)[number];

interface RawNode {
  readonly line: number;
  readonly id: string;
  readonly label: string;
  readonly raw: Readonly<Record<TimeField, string>>;
  readonly read: Readonly<Record<TimeField, Entry | null>>;
}

/** Reads nodes.csv: `id,label,entry` and optionally `earliest,latest`. */
export async function readNodesTable(
  file: SourceFile,
  limits: FormatLimits,
  issues: IssueList,
): Promise<NodesTable> {
  const ignoredColumns: string[] = [];
  const rows: RawNode[] = [];
  const rowOf = new Map<string, number>();
  let past = 0;
  for await (const { line, cells } of readTable(file, SHAPE, limits, issues, (names) =>
    ignoredColumns.push(...names),
  )) {
    if (rows.length === limits.nodes) {
      past++;
      continue;
    }
    const [id = '', entry = '', label = '', earliest = '', latest = ''] = cells;
    const raw = { entry, earliest, latest };
    checkNames(file.name, line, id, label, limits, issues);
    checkRepeated(file.name, line, id, rowOf, rows, issues);
    rows.push({
      line,
      id,
      label: label === '' ? id : label,
      raw,
      read: readTimes(file.name, line, raw, issues),
    });
  }
  if (past > 0) {
    issues.add({
      file: file.name,
      message: `There are ${limits.nodes + past} nodes; at most ${limits.nodes} can be stored. Leave the others out.`,
    });
  }
  const entryUnit = commonUnit(rows);
  checkUnits(file.name, rows, entryUnit, issues);
  checkZones(file.name, rows, issues);
  checkWindows(file.name, rows, issues);
  return { nodes: rows.map((row) => finished(row, entryUnit)), entryUnit, rowOf, ignoredColumns };
}

function checkNames(
  file: string,
  line: number,
  id: string,
  label: string,
  limits: FormatLimits,
  issues: IssueList,
): void {
  if (id === '')
    issues.add({
      file,
      line,
      field: 'id',
      message: 'The id is empty. Give every node an id of its own.',
    });
  for (const [field, text] of [
    ['id', id],
    ['label', label],
  ] as const) {
    if (text.length <= limits.labelCharacters) continue;
    issues.add({
      file,
      line,
      field,
      message: `${quoted(text)} is ${text.length} characters long; at most ${limits.labelCharacters} are kept. Shorten it.`,
    });
  }
}

function checkRepeated(
  file: string,
  line: number,
  id: string,
  rowOf: Map<string, number>,
  rows: readonly RawNode[],
  issues: IssueList,
): void {
  if (id === '') return;
  const key = id.normalize('NFC');
  const earlier = rowOf.get(key);
  if (earlier === undefined) {
    rowOf.set(key, rows.length);
    return;
  }
  issues.add({
    file,
    line,
    field: 'id',
    message: `The id ${quoted(id)} stands already on line ${rows[earlier]?.line}. Every node needs an id of its own.`,
  });
}

function readTimes(
  file: string,
  line: number,
  raw: RawNode['raw'],
  issues: IssueList,
): RawNode['read'] {
  const read: Record<TimeField, Entry | null> = { entry: null, earliest: null, latest: null };
  for (const field of TIMES) {
    if (raw[field] === '') {
      if (field === 'entry')
        issues.add({
          file,
          line,
          field,
          message:
            'The entry is empty. Write when this node arrived, or leave the node and its edges out.',
        });
      continue;
    }
    const entry = readEntry(raw[field]);
    read[field] = entry;
    if (entry.unit === null) issues.add({ file, line, field, message: entry.message });
  }
  return read;
}

/** The unit most cells have; any date with time makes dates count in seconds. */
function commonUnit(rows: readonly RawNode[]): EntryUnit {
  const counts = { number: 0, days: 0, seconds: 0 };
  for (const { read } of rows) {
    for (const field of TIMES) {
      const unit = read[field]?.unit;
      if (unit) counts[unit]++;
    }
  }
  if (counts.number >= counts.days + counts.seconds) return 'number';
  return counts.seconds > 0 ? 'seconds' : 'days';
}

function checkUnits(
  file: string,
  rows: readonly RawNode[],
  unit: EntryUnit,
  issues: IssueList,
): void {
  for (const { line, read, raw } of rows) {
    for (const field of TIMES) {
      const own = read[field]?.unit;
      if (!own || own === unit || (unit === 'seconds' && own === 'days')) continue;
      issues.add({
        file,
        line,
        field,
        message: `${quoted(raw[field])} is ${UNIT_WORDS[own]}, but most of the file has ${UNIT_WORDS[unit]}. Use one kind throughout.`,
      });
    }
  }
}

function checkZones(file: string, rows: readonly RawNode[], issues: IssueList): void {
  const moments = rows.flatMap(({ line, read }) =>
    TIMES.flatMap((field) => {
      const entry = read[field];
      return entry?.unit === 'seconds' ? [{ line, field, zoned: entry.zoned }] : [];
    }),
  );
  const first = moments[0];
  const other = moments.find(({ zoned }) => zoned !== first?.zoned);
  if (!first || !other) return;
  issues.add({
    file,
    line: other.line,
    field: other.field,
    message: `Some times have a time zone and some do not (line ${first.line} differs). Write a zone on all of them, like 2024-02-01T09:30Z, or on none.`,
  });
}

function valueOf(entry: Entry | null): number | null {
  return entry !== null && entry.unit !== null ? entry.value : null;
}

function checkWindows(file: string, rows: readonly RawNode[], issues: IssueList): void {
  for (const { line, read, raw } of rows) {
    const [entry, earliest, latest] = TIMES.map((field) => scaled(read[field]));
    if (entry == null) continue;
    if (earliest != null && earliest > entry) {
      issues.add({
        file,
        line,
        field: 'earliest',
        message: `The earliest ${quoted(raw.earliest)} is after the entry ${quoted(raw.entry)}. Correct one of them.`,
      });
    }
    if (latest != null && latest < entry) {
      issues.add({
        file,
        line,
        field: 'latest',
        message: `The latest ${quoted(raw.latest)} is before the entry ${quoted(raw.entry)}. Correct one of them.`,
      });
    }
  }
}

/** A value that compares across dates with and without time. */
function scaled(entry: Entry | null | undefined): number | null {
  if (!entry || entry.unit === null) return null;
  return entry.unit === 'days' ? entry.value * 86_400 : entry.value;
}

function finished(row: RawNode, unit: EntryUnit): NetworkNode {
  const value = (field: TimeField) =>
    unit === 'seconds' ? scaled(row.read[field]) : valueOf(row.read[field]);
  return {
    id: row.id,
    label: row.label,
    entryRaw: row.raw.entry,
    entry: value('entry') ?? NaN,
    earliestRaw: row.raw.earliest,
    earliest: value('earliest'),
    latestRaw: row.raw.latest,
    latest: value('latest'),
  };
}
