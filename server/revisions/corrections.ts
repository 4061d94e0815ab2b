import type { z } from 'zod';
import type { ImportReport } from '#contract/datasets';
import type { Issue } from '#contract/problems';
import type { correctionsRequest } from '#contract/revisions';
import type { NewNode } from '../../db/repositories/revisions';
import { UNIT_WORDS } from '../../formats/entries';
import { quoted } from '../../formats/issues';
import type { EntryUnit } from '../../formats/types';
import { readTime, type ReadTime, type TimeReading } from '../../formats/understanding/times';

export type Correction = z.output<typeof correctionsRequest>['corrections'][number];

/** What the entries of a revision are written in. */
export interface EntryRules {
  readonly unit: EntryUnit;
  readonly reading: TimeReading;
  /** ± for nodes whose window nobody wrote, in the unit; null for none. */
  readonly tolerance: number | null;
  /** Whether the times of the other nodes name a zone; null where none is a time of day. */
  readonly zoned: boolean | null;
}

const DAY_SECONDS = 86_400;

/** How the nodes were read once, so that a correction is read the same way. */
export function entryRulesOf(
  unit: EntryUnit,
  nodes: readonly NewNode[],
  { imported }: ImportReport,
): EntryRules {
  const { decimal = '.', dayOrder = null, years = 'numbers' } = imported?.choices ?? {};
  const reading = { decimal, dayOrder, years } as const;
  const rules = { unit, reading, tolerance: imported?.choices.tolerance ?? null };
  if (unit !== 'seconds') return { ...rules, zoned: null };
  for (const { entryRaw } of nodes) {
    const time = readTime(entryRaw, reading);
    if (time.unit === 'seconds') return { ...rules, zoned: time.zoned };
  }
  return { ...rules, zoned: null };
}

/** One time in the unit of the revision; of a year or a month its ends too. */
interface Scaled {
  readonly value: number;
  readonly first: number | null;
  readonly last: number | null;
}

/**
 * The nodes with their corrections, raw texts as typed.
 * @returns the nodes, and what is wrong by field (`corrections.0.entry`); nodes of wrong ones stay
 */
export function correctedNodes(
  nodes: readonly NewNode[],
  corrections: readonly Correction[],
  rules: EntryRules,
): { readonly nodes: readonly NewNode[]; readonly issues: readonly Issue[] } {
  const corrected = [...nodes];
  const issues: Issue[] = [];
  const seen = new Set<number>();
  for (const [at, correction] of corrections.entries()) {
    const say = (field: string, message: string): void => {
      issues.push({ field: `corrections.${at}.${field}`, message });
    };
    const node = nodes[correction.row];
    if (node === undefined) {
      say('row', `The revision has no row ${correction.row}; its last is ${nodes.length - 1}.`);
    } else if (seen.has(correction.row)) {
      say('row', `The node ${quoted(node.id)} is corrected twice; correct it once.`);
    } else {
      const sayOfNode: Say = (field, message) =>
        say(field, `Node ${quoted(node.id)}, ${field}: ${message}`);
      corrected[correction.row] = correctedNode(node, correction, rules, sayOfNode) ?? node;
    }
    seen.add(correction.row);
  }
  return { nodes: corrected, issues };
}

type Say = (field: string, message: string) => void;

function correctedNode(
  node: NewNode,
  { entry: entryRaw, ...ends }: Correction,
  rules: EntryRules,
  say: Say,
): NewNode | null {
  const entry = scaled(entryRaw, rules, (message) => say('entry', message));
  const earliest = endOf('earliest', node, ends.earliest, { entry, rules, say });
  const latest = endOf('latest', node, ends.latest, { entry, rules, say });
  if (entry === null || earliest === undefined || latest === undefined) return null;
  const [from, until] = [earliest.value, latest.value];
  const shown = (raw: string, value: number) => quoted(raw === '' ? String(value) : raw);
  if (from !== null && until !== null && from > until) {
    say(
      'latest',
      `The latest ${shown(latest.raw, until)} is before the earliest ${shown(earliest.raw, from)}. Correct one of them.`,
    );
    return null;
  }
  if (from !== null && from > (entry.last ?? entry.value)) {
    say(
      'earliest',
      `The earliest ${shown(earliest.raw, from)} is after the entry ${quoted(entryRaw)}. Correct one of them.`,
    );
    return null;
  }
  if (until !== null && until < (entry.first ?? entry.value)) {
    say(
      'latest',
      `The latest ${shown(latest.raw, until)} is before the entry ${quoted(entryRaw)}. Correct one of them.`,
    );
    return null;
  }
  return {
    ...node,
    entryRaw,
    entry: middle(entry, from, until),
    earliestRaw: earliest.raw,
    earliest: from,
    latestRaw: latest.raw,
    latest: until,
  };
}

/** Of a year or a month, the middle of what the window leaves of it; else the entry itself. */
function middle({ value, first, last }: Scaled, from: number | null, until: number | null): number {
  if (first === null || last === null || (from === null && until === null)) return value;
  return Math.floor((Math.max(first, from ?? first) + Math.min(last, until ?? last)) / 2);
}

interface EndContext {
  readonly entry: Scaled | null;
  readonly rules: EntryRules;
  readonly say: Say;
}

/**
 * One end of the window: as typed; else as it is. One that nobody wrote follows the entry: it is the
 * end of its year or month, or the tolerance away from it.
 * @returns undefined if it cannot be read, having said why
 */
function endOf(
  field: 'earliest' | 'latest',
  node: NewNode,
  typed: string | undefined,
  { entry, rules, say }: EndContext,
): { readonly raw: string; readonly value: number | null } | undefined {
  const side = field === 'earliest' ? 'first' : 'last';
  if (typed !== undefined && typed !== '') {
    const end = scaled(typed, rules, (message) => say(field, message));
    return end === null ? undefined : { raw: typed, value: end[side] ?? end.value };
  }
  const ofInterval = entry?.[side] ?? null;
  if (typed === '') return { raw: '', value: ofInterval };
  const [raw, value] =
    field === 'earliest' ? [node.earliestRaw, node.earliest] : [node.latestRaw, node.latest];
  if (raw !== '') return { raw, value };
  if (ofInterval !== null) return { raw, value: ofInterval };
  if (value === null || entry === null) return { raw, value };
  const written = readTime(node.entryRaw, rules.reading);
  if (written.unit !== null && written.interval !== null) return { raw, value: null };
  if (rules.tolerance === null) return { raw, value };
  return { raw, value: entry.value + (field === 'earliest' ? -1 : 1) * rules.tolerance };
}

function scaled(text: string, rules: EntryRules, say: (message: string) => void): Scaled | null {
  const time = readTime(text, rules.reading);
  if (time.unit === null) {
    say(time.message);
    return null;
  }
  if (time.unit !== rules.unit && !(rules.unit === 'seconds' && time.unit === 'days')) {
    say(
      `${quoted(text)} is ${UNIT_WORDS[time.unit]}, but the entries of this revision are each ${UNIT_WORDS[rules.unit]}. Write it the same way.`,
    );
    return null;
  }
  if (time.unit === 'seconds' && rules.zoned !== null && time.zoned !== rules.zoned) {
    say(
      rules.zoned
        ? `${quoted(text)} has no time zone, but the other times have one. Write it too, like 2024-02-01T09:30Z.`
        : `${quoted(text)} has a time zone, but the other times have none. Leave it out.`,
    );
    return null;
  }
  return inUnit(rules.unit, time);
}

/** A day among times of day counts from its midnight; an interval of days to its last second. */
function inUnit(unit: EntryUnit, { unit: own, value, interval }: ReadTime): Scaled {
  const step = unit === 'seconds' && own === 'days' ? DAY_SECONDS : 1;
  return {
    value: value * step,
    first: interval && interval.first * step,
    last: interval && interval.last * step + step - 1,
  };
}
