import { DIFFERENCE_ROWS, type DifferenceBody } from '#contract/revisions';
import type { EntryUnit } from '#contract/enums';

/** A node of a revision as it is stored. */
export interface ComparedNode {
  readonly nodeId: string;
  readonly label: string;
  readonly entryRaw: string;
  readonly entry: number;
  readonly earliestRaw: string;
  readonly earliest: number | null;
  readonly latestRaw: string;
  readonly latest: number | null;
}

export interface ComparedRevision {
  readonly entryUnit: EntryUnit;
  /** In row order. */
  readonly nodes: readonly ComparedNode[];
  /** u32[2 m]: node rows of the ends of each edge, lower row first, edges ascending. */
  readonly edges: Uint32Array;
}

type Counts = DifferenceBody['counts'];
type Lists = Omit<DifferenceBody, 'units' | 'rowsMoved' | 'counts'>;

/** Counts every difference of a kind and keeps the first of them. */
class Found {
  readonly counts: Counts = {
    nodesAdded: 0,
    nodesRemoved: 0,
    relabelled: 0,
    entriesChanged: 0,
    windowsChanged: 0,
    edgesAdded: 0,
    edgesRemoved: 0,
  };
  readonly lists: Lists = {
    nodesAdded: [],
    nodesRemoved: [],
    relabelled: [],
    entriesChanged: [],
    windowsChanged: [],
    edgesAdded: [],
    edgesRemoved: [],
  };

  /** @param row made only where there is room for it */
  add<K extends keyof Counts>(kind: K, row: () => Lists[K][number]): void {
    this.counts[kind]++;
    const list: Lists[K][number][] = this.lists[kind];
    if (list.length < DIFFERENCE_ROWS) list.push(row());
  }
}

/** What `after` has otherwise than `before`; a node is the same where its id is. */
export function differenceOf(before: ComparedRevision, after: ComparedRevision): DifferenceBody {
  const found = new Found();
  const newRow = new Map(after.nodes.map(({ nodeId }, row) => [nodeId, row]));
  const rowOf = Int32Array.from(before.nodes, ({ nodeId }) => newRow.get(nodeId) ?? -1);
  const kept = new Set<string>();
  for (const [row, old] of before.nodes.entries()) {
    const now = after.nodes[rowOf[row] ?? -1];
    if (now === undefined) {
      found.add('nodesRemoved', () => ({ id: old.nodeId, label: old.label }));
      continue;
    }
    kept.add(old.nodeId);
    compareNode(found, { node: old, unit: before.entryUnit }, { node: now, unit: after.entryUnit });
  }
  for (const { nodeId, label } of after.nodes) {
    if (!kept.has(nodeId)) found.add('nodesAdded', () => ({ id: nodeId, label }));
  }
  compareEdges(found, before, after, rowOf);
  const staying = rowOf.filter((row) => row >= 0);
  return {
    units: { before: before.entryUnit, after: after.entryUnit },
    rowsMoved: staying.some((row, at) => at > 0 && row < (staying[at - 1] ?? 0)),
    counts: found.counts,
    ...found.lists,
  };
}

interface Side {
  readonly node: ComparedNode;
  readonly unit: EntryUnit;
}

function compareNode(found: Found, before: Side, after: Side): void {
  const [old, now] = [before.node, after.node];
  const { nodeId: id, label } = now;
  if (old.label !== label) found.add('relabelled', () => ({ id, before: old.label, after: label }));
  if (old.entryRaw !== now.entryRaw || old.entry !== now.entry) {
    found.add('entriesChanged', () => ({ id, label, before: old.entryRaw, after: now.entryRaw }));
  }
  const same =
    old.earliestRaw === now.earliestRaw &&
    old.earliest === now.earliest &&
    old.latestRaw === now.latestRaw &&
    old.latest === now.latest;
  if (!same) {
    found.add('windowsChanged', () => ({
      id,
      label,
      before: windowOf(before),
      after: windowOf(after),
    }));
  }
}

const windowOf = ({ node, unit }: Side) => ({
  earliest: endWords(node.earliestRaw, node.earliest, unit),
  latest: endWords(node.latestRaw, node.latest, unit),
});

/** The end as written; one that comes from a tolerance or from a year is told by its value. */
function endWords(raw: string, value: number | null, unit: EntryUnit): string | null {
  if (raw !== '') return raw;
  if (value === null) return null;
  if (unit === 'number') return String(value);
  const date = new Date(value * (unit === 'days' ? 86_400_000 : 1000));
  if (Number.isNaN(date.getTime())) return String(value);
  return unit === 'days' ? date.toISOString().slice(0, 10) : date.toISOString();
}

/** Both lists of edges by the rows of `after`, one merged into the other. */
function compareEdges(
  found: Found,
  before: ComparedRevision,
  after: ComparedRevision,
  rowOf: Int32Array,
): void {
  const edgeOf = (nodes: readonly ComparedNode[], a: number, b: number) => ({
    a: nodes[a]?.nodeId ?? '',
    b: nodes[b]?.nodeId ?? '',
  });
  const size = after.nodes.length;
  const gone = (key: number) => edgeOf(after.nodes, Math.floor(key / size), key % size);
  const old = new Float64Array(before.edges.length / 2);
  let count = 0;
  for (let at = 0; at < before.edges.length; at += 2) {
    const [from, to] = [before.edges[at] ?? 0, before.edges[at + 1] ?? 0];
    const [a, b] = [rowOf[from] ?? -1, rowOf[to] ?? -1];
    if (a < 0 || b < 0) found.add('edgesRemoved', () => edgeOf(before.nodes, from, to));
    else old[count++] = Math.min(a, b) * size + Math.max(a, b);
  }
  const known = old.subarray(0, count).sort();
  let next = 0;
  for (let at = 0; at < after.edges.length; at += 2) {
    const [a, b] = [after.edges[at] ?? 0, after.edges[at + 1] ?? 0];
    const key = a * size + b;
    for (; next < count && (known[next] ?? 0) < key; next++) {
      const passed = known[next] ?? 0;
      found.add('edgesRemoved', () => gone(passed));
    }
    if (next < count && known[next] === key) next++;
    else found.add('edgesAdded', () => edgeOf(after.nodes, a, b));
  }
  for (; next < count; next++) {
    const passed = known[next] ?? 0;
    found.add('edgesRemoved', () => gone(passed));
  }
}
