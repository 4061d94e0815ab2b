import { quoted, type IssueList } from './issues';
import { readTable } from './table';
import type { FormatLimits, SourceFile } from './types';

export interface EdgesTable {
  /** u32[2 m]: lower row first, edges ascending, every undirected edge once. */
  readonly edges: Uint32Array;
  readonly edgeRows: number;
  readonly selfLoops: number;
  readonly duplicateEdges: number;
  readonly reversedEdges: number;
  readonly ignoredColumns: readonly string[];
}

const SHAPE = { required: ['source', 'target'], optional: ['weight'] };
const ENDS = ['source', 'target'] as const;

/** Reads edges.csv: `source,target` and optionally `weight`; direction, repeats and self loops are folded and counted. */
export async function readEdgesTable(
  file: SourceFile,
  rowOf: ReadonlyMap<string, number>,
  limits: FormatLimits,
  issues: IssueList,
): Promise<EdgesTable> {
  const ignoredColumns: string[] = [];
  const arcs = new Arcs(rowOf.size);
  let edgeRows = 0;
  let selfLoops = 0;
  for await (const { line, cells } of readTable(file, SHAPE, limits, issues, (names) =>
    ignoredColumns.push(...names),
  )) {
    edgeRows++;
    if (edgeRows > limits.edgeRows) {
      issues.add({
        file: file.name,
        line,
        message: `There are more than ${limits.edgeRows} edge rows. Leave the weaker edges out.`,
      });
      break;
    }
    const [a, b] = ENDS.map((field, end) =>
      endRow(file.name, line, field, cells[end] ?? '', rowOf, issues),
    );
    if (a === undefined || b === undefined) continue;
    if (a === b) selfLoops++;
    else arcs.add(a, b);
  }
  return { ...arcs.fold(), edgeRows, selfLoops, ignoredColumns };
}

function endRow(
  file: string,
  line: number,
  field: string,
  id: string,
  rowOf: ReadonlyMap<string, number>,
  issues: IssueList,
): number | undefined {
  const row = rowOf.get(id.normalize('NFC'));
  if (row === undefined) {
    issues.add({
      file,
      line,
      field,
      message:
        id === ''
          ? `The ${field} is empty. Write the id of a node.`
          : `No node has the id ${quoted(id)}. Add it to the nodes, or correct or remove this edge.`,
    });
  }
  return row;
}

/** Directed rows as they are read, folded to undirected edges at the end. */
class Arcs {
  /** (lower row · n + higher row) · 2 + (1 if written from higher to lower); below 2⁵³ for n up to 6.7 · 10⁷. */
  private keys = new Float64Array(1024);
  private count = 0;

  constructor(private readonly nodeCount: number) {}

  add(a: number, b: number): void {
    if (this.count === this.keys.length) {
      const larger = new Float64Array(2 * this.count);
      larger.set(this.keys);
      this.keys = larger;
    }
    this.keys[this.count++] =
      (Math.min(a, b) * this.nodeCount + Math.max(a, b)) * 2 + (a < b ? 0 : 1);
  }

  fold(): { edges: Uint32Array; duplicateEdges: number; reversedEdges: number } {
    const keys = this.keys.subarray(0, this.count).sort();
    const edges = new Uint32Array(2 * this.count);
    let kept = 0;
    let duplicateEdges = 0;
    let reversedEdges = 0;
    let previous = -1;
    for (const key of keys) {
      if (key === previous) duplicateEdges++;
      else if (Math.floor(key / 2) === Math.floor(previous / 2)) reversedEdges++;
      else {
        const pair = Math.floor(key / 2);
        edges[2 * kept] = Math.floor(pair / this.nodeCount);
        edges[2 * kept + 1] = pair % this.nodeCount;
        kept++;
      }
      previous = key;
    }
    return { edges: edges.slice(0, 2 * kept), duplicateEdges, reversedEdges };
  }
}
