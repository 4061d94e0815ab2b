import { IssueList, quoted } from '../issues';
import { ElementRows } from './elementRows';
import { tableOf } from './rawTable';
import type { DecodedFile, GraphFormat, RawRow, RawSource, RawTable, SourceLimits } from './types';
import { Unreadable } from './unreadable';

/** Cells of one table, empty ones with the rest; as many are walked within a few seconds. */
const MOST_CELLS = 40_000_000;
/** Kinds of dropped things that are told apart. */
const MOST_KINDS = 40;

/** What a reader of a graph format gathers: nodes, edges, and all that is wrong or not kept. */
export class GraphTables {
  readonly nodes = new ElementRows(['id', 'label', 'start', 'end'], ['id']);
  readonly edges = new ElementRows(
    ['source', 'target', 'weight', 'start', 'end'],
    ['source', 'target'],
  );
  readonly notes: string[] = [];
  private readonly issues: IssueList;
  private readonly droppedCounts = new Map<string, number>();
  /** Edges with and without a direction. */
  readonly directions = { directed: 0, undirected: 0 };
  /** Finds the id behind the end of an edge, where ends are written otherwise. */
  endName: ((written: string) => string) | null = null;

  constructor(
    private readonly file: DecodedFile,
    private readonly format: GraphFormat,
    readonly limits: SourceLimits,
  ) {
    this.issues = new IssueList(limits.issues);
  }

  /** Counts what cannot be kept. */
  drop(what: string, count = 1): void {
    if (count === 0) return;
    const room = this.droppedCounts.size < MOST_KINDS || this.droppedCounts.has(what);
    const kind = room ? what : 'other things that are not known';
    this.droppedCounts.set(kind, (this.droppedCounts.get(kind) ?? 0) + count);
  }

  issue(line: number, field: string | undefined, message: string): void {
    this.issues.add({
      file: this.file.name,
      line,
      ...(field === undefined ? {} : { field }),
      message,
    });
  }

  beginNode(line: number): number {
    return this.begin(this.nodes, line, 'nodes');
  }

  beginEdge(line: number): number {
    return this.begin(this.edges, line, 'edges');
  }

  private begin(rows: ElementRows, line: number, what: string): number {
    const most = this.limits.edgeRows;
    if (rows.count === most) {
      throw new Unreadable(
        line,
        `There are more than ${most} ${what}. Leave the ${what === 'edges' ? 'weaker' : 'other'} ones out.`,
      );
    }
    return rows.begin(line);
  }

  /** Index of an attribute's column. @throws Unreadable past the limits */
  attribute(rows: ElementRows, line: number, name: string, key = name): number {
    const before = rows.columnCount;
    const index = rows.attribute(name, key);
    if (rows.columnCount === before) return index;
    if (before >= this.limits.columns) {
      throw new Unreadable(
        line,
        `There are more than ${this.limits.columns} attributes. Leave the others out.`,
      );
    }
    if (name.length > this.limits.labelCharacters) {
      throw new Unreadable(
        line,
        `The name of an attribute, ${quoted(name)}, is ${name.length} characters long; at most ${this.limits.labelCharacters} are read. Shorten it.`,
      );
    }
    return index;
  }

  /** The source, once everything was read; repeated ids and ends that are no node are issues. */
  source(): RawSource {
    const nodes = this.nodes.count > 0 ? this.table(this.nodes, 'nodes') : null;
    const edges = this.edges.count > 0 ? this.table(this.edges, 'edges') : null;
    if (!nodes && !edges) this.issues.add({ file: this.file.name, message: NOTHING });
    if (!nodes && edges)
      this.notes.push('The file lists no nodes; they are the ends of its edges.');
    const { directed, undirected } = this.directions;
    if (directed > 0 && undirected > 0) this.notes.push(mixedWords(directed, undirected));
    if (nodes) this.checkEnds(nodes, edges);
    return {
      ...unreadSource(this.file, this.format),
      nodes,
      edges,
      directed: directed > 0,
      dropped: [...this.droppedCounts].map(([what, count]) => ({ what, count })),
      notes: this.notes,
      issues: this.issues.listed,
      leftOut: this.issues.leftOut,
    };
  }

  /** The source of a file that could not be read to its end. */
  broken({ line, field, message }: Unreadable): RawSource {
    const last = {
      file: this.file.name,
      ...(line === undefined ? {} : { line }),
      ...(field === undefined ? {} : { field }),
      message,
    };
    return {
      ...unreadSource(this.file, this.format),
      issues: [...this.issues.listed, last],
      leftOut: this.issues.leftOut,
    };
  }

  /** Rows are told by line, or by number where many stand on one line. */
  private table(rows: ElementRows, what: string): RawTable {
    const { columns, rows: plain, cells } = rows.finish();
    const { endName } = this;
    const walk = what === 'edges' && endName ? () => withEnds(plain(), endName) : plain;
    if (cells > MOST_CELLS) {
      throw new Unreadable(
        undefined,
        `${rows.count} ${what} with ${columns.length} columns are ${cells} cells; at most ${MOST_CELLS} are read. Leave attributes out.`,
      );
    }
    if (!crowded(walk())) return tableOf(columns, walk, 'line');
    return tableOf(columns, () => numbered(walk()), 'element');
  }

  private checkEnds(nodes: RawTable, edges: RawTable | null): void {
    const lineOf = new Map<string, number>();
    const id = nodes.columns.indexOf('id');
    const place = nodes.where === 'line' ? 'on line' : 'as node';
    for (const { line, cells } of nodes.rows()) {
      const name = (cells[id] ?? '').normalize('NFC');
      const earlier = lineOf.get(name);
      if (name === '') this.issue(line, 'id', 'The id is empty. Give every node an id of its own.');
      else if (earlier === undefined) lineOf.set(name, line);
      else
        this.issue(
          line,
          'id',
          `The id ${quoted(name)} stands already ${place} ${earlier}. Every node needs an id of its own.`,
        );
    }
    if (edges) this.checkEdges(edges, lineOf);
  }

  private checkEdges(edges: RawTable, known: ReadonlyMap<string, number>): void {
    for (const { line, cells } of edges.rows()) {
      for (const [at, field] of ['source', 'target'].entries()) {
        const end = cells[at] ?? '';
        if (known.has(end) || known.has(end.normalize('NFC'))) continue;
        this.issue(
          line,
          field,
          end === ''
            ? `The ${field} of this edge is missing. Write the id of a node.`
            : `There is no node ${quoted(end)}, but this edge has it as its ${field}. Add the node, or correct or remove the edge.`,
        );
      }
    }
  }
}

const mixedWords = (directed: number, undirected: number): string =>
  `Of the edges ${directed} ${directed === 1 ? 'has' : 'have'} a direction and ${undirected} ${undirected === 1 ? 'has' : 'have'} none; all are read without.`;

const NOTHING = 'There are neither nodes nor edges in it.';

/** Whether most rows share their line with the row before them, as in a file without line ends. */
function crowded(rows: Iterable<RawRow>): boolean {
  let shared = 0;
  let count = 0;
  let before = 0;
  for (const { line } of rows) {
    if (line === before) shared++;
    before = line;
    if (++count === 1_000) break;
  }
  return count > 1 && shared > count / 2;
}

/** The first two columns of edges are always source and target. */
function* withEnds(
  rows: Iterable<RawRow>,
  endName: (written: string) => string,
): Generator<RawRow> {
  for (const { line, cells } of rows) {
    const [source = '', target = '', ...others] = cells;
    yield { line, cells: [endName(source), endName(target), ...others] };
  }
}

function* numbered(rows: Iterable<RawRow>): Generator<RawRow> {
  let number = 0;
  for (const { cells } of rows) yield { line: ++number, cells };
}

/** A source of which nothing is known yet; delimiter, decimal mark and header mean nothing. */
export function unreadSource({ name, encoding }: DecodedFile, format: GraphFormat): RawSource {
  return {
    file: name,
    format,
    reading: { encoding, delimiter: ',', decimal: '.', header: true },
    nodes: null,
    edges: null,
    directed: false,
    dropped: [],
    notes: [],
    issues: [],
    leftOut: 0,
  };
}

/** Reads a graph file into tables; where it cannot be read on, that is its issue. */
export function readTables(
  file: DecodedFile,
  format: GraphFormat,
  limits: SourceLimits,
  read: (tables: GraphTables) => void,
): RawSource {
  const tables = new GraphTables(file, format, limits);
  try {
    read(tables);
    return tables.source();
  } catch (error) {
    if (error instanceof Unreadable) return tables.broken(error);
    throw error;
  }
}

/** The text with line feeds for all line ends. */
export const lineFeeds = ({ text }: DecodedFile): string =>
  text.includes('\r') ? text.replace(/\r\n?/g, '\n') : text;
