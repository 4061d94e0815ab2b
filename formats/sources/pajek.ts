import { quoted } from '../issues';
import type { ElementRows } from './elementRows';
import { readTables, type GraphTables } from './graphTables';
import { linesOf, TooLong } from './lines';
import { pajekTimes, pajekTokens, type PajekToken } from './pajekLine';
import type { GraphReader } from './types';
import { Unreadable } from './unreadable';

/**
 * Reads a Pajek network (Batagelj, Mrvar 1998): vertices numbered from 1 with labels and time
 * intervals, arcs and edges one by one, as lists and as a matrix. Vertices that are not listed are
 * there all the same, called by their number. Coordinates and drawing values are counted; so are the
 * partitions and vectors of a project file. Its networks past the first are refused.
 */
export const readPajek: GraphReader = (file, limits) =>
  readTables(file, 'pajek', limits, (tables) => {
    const reader = new PajekReader(tables);
    try {
      for (const { line, text } of linesOf([file.text], limits.lineCharacters))
        reader.take(text.trim(), line);
    } catch (error) {
      if (!(error instanceof TooLong)) throw error;
      throw new Unreadable(
        error.line,
        `A line is longer than ${limits.lineCharacters} characters. Look for missing line ends.`,
      );
    }
    reader.end();
  });

type Section =
  'none' | 'vertices' | 'arcs' | 'edges' | 'arcslist' | 'edgeslist' | 'matrix' | 'passed';

interface Vertex {
  readonly line: number;
  readonly tokens: readonly PajekToken[];
}

/** Sections that hold something else than a network, by how they are counted. */
const PASSED: ReadonlyMap<string, string> = new Map([
  ['partition', 'partitions'],
  ['vector', 'vectors'],
  ['permutation', 'permutations'],
  ['cluster', 'clusters'],
  ['hierarchy', 'hierarchies'],
  ['events', 'lists of events'],
]);
const SECTIONS: ReadonlyMap<string, Section> = new Map(
  (['arcs', 'edges', 'arcslist', 'edgeslist', 'matrix'] as const).map((name) => [name, name]),
);
const WHOLE = /^-?\d+$/;

class PajekReader {
  private section: Section = 'none';
  private vertices: (Vertex | undefined)[] = [];
  private count: number | null = null;
  private verticesLine = 1;
  private sectionLine = 1;
  private relation: string | null = null;
  private matrixRow = 0;
  private unweighted = 0;

  constructor(private readonly tables: GraphTables) {}

  take(text: string, line: number): void {
    if (text === '') return;
    if (text.startsWith('%')) this.tables.drop('comment lines');
    else if (text.startsWith('*')) this.header(text, line);
    else if (this.section === 'none') throw new Unreadable(line, FIRST);
    else if (this.section !== 'passed') this.row(this.tokens(text, line), line);
  }

  private tokens(text: string, line: number): PajekToken[] {
    const tokens = pajekTokens(text);
    if (tokens) return tokens;
    throw new Unreadable(
      line,
      'A quote or a square bracket is opened and not closed on this line. Close it.',
    );
  }

  private header(text: string, line: number): void {
    this.endMatrix();
    this.sectionLine = line;
    const [, name = ''] = /^\*\s*(\w+)/.exec(text) ?? [];
    const rest = text.slice(text.indexOf(name) + name.length).trim();
    const lower = name.toLowerCase();
    const passed = PASSED.get(lower);
    if (passed !== undefined) {
      this.section = 'passed';
      this.tables.drop(passed);
    } else if (lower === 'network') {
      if (this.count !== null) throw new Unreadable(line, SEVERAL);
    } else if (lower === 'vertices') this.beginVertices(rest, line);
    else this.beginLinks(lower, rest, line);
  }

  private beginVertices(rest: string, line: number): void {
    // The vertices of a partition or a vector come after its own header.
    if (this.section === 'passed') return;
    if (this.count !== null) throw new Unreadable(line, SEVERAL);
    const [size = '', mode] = rest.split(/\s+/);
    if (!/^\d+$/.test(size)) {
      throw new Unreadable(line, 'After *Vertices their number is expected, like *Vertices 12.');
    }
    const most = this.tables.limits.nodes;
    if (Number(size) > most) {
      throw new Unreadable(
        line,
        `There are ${size.slice(0, 20)} vertices; at most ${most} can be stored. Leave the others out.`,
      );
    }
    if (mode !== undefined) this.tables.drop('division of the vertices into two modes');
    this.count = Number(size);
    this.vertices = new Array<Vertex | undefined>(this.count).fill(undefined);
    this.verticesLine = line;
    this.section = 'vertices';
  }

  private beginLinks(name: string, rest: string, line: number): void {
    const section = SECTIONS.get(name);
    if (section === undefined) {
      this.tables.drop(`sections “*${name.slice(0, 40)}”`);
      this.section = 'passed';
      return;
    }
    if (this.count === null) throw new Unreadable(line, FIRST);
    const [, number, label] = /^:\s*(\d+)\s*(?:"([^"]*)")?/.exec(rest) ?? [];
    this.relation = label ?? number ?? null;
    this.section = section;
    this.matrixRow = 0;
  }

  private row(tokens: readonly PajekToken[], line: number): void {
    switch (this.section) {
      case 'vertices':
        return this.vertex(tokens, line);
      case 'arcs':
      case 'edges':
        return this.link(tokens, line, this.section);
      case 'arcslist':
      case 'edgeslist':
        return this.list(tokens, line, this.section === 'arcslist' ? 'arcs' : 'edges');
      case 'matrix':
        return this.matrix(tokens, line);
      default:
    }
  }

  private vertex(tokens: readonly PajekToken[], line: number): void {
    const number = this.vertexNumber(tokens[0], line, 'id');
    if (number === null) return;
    const earlier = this.vertices[number - 1];
    if (earlier) {
      this.tables.issue(
        line,
        'id',
        `The vertex ${number} stands already on line ${earlier.line}. Every vertex needs a number of its own.`,
      );
    } else this.vertices[number - 1] = { line, tokens };
  }

  /** The number of a vertex, or null with an issue. */
  private vertexNumber(
    token: PajekToken | undefined,
    line: number,
    field: 'id' | 'source' | 'target',
  ): number | null {
    const text = token?.text ?? '';
    const number = WHOLE.test(text) && token?.kind === 'word' ? Number(text) : NaN;
    if (number >= 1 && number <= (this.count ?? 0)) return number;
    this.tables.issue(
      line,
      field,
      text === ''
        ? `The ${field} is missing. Write the number of a vertex.`
        : `${quoted(text)} is not the number of a vertex: they go from 1 to ${this.count}.`,
    );
    return null;
  }

  private link(tokens: readonly PajekToken[], line: number, kind: 'arcs' | 'edges'): void {
    const [first, second, third] = tokens;
    const ends = this.ends(first, second, line);
    if (!ends) return;
    const weighted = third?.kind === 'word' && !/^[A-Za-z]/.test(third.text);
    const row = this.begin(ends, kind, line);
    if (weighted) this.weigh(row, third.text);
    else this.unweighted++;
    this.rest(this.tables.edges, row, tokens.slice(weighted ? 3 : 2), line);
  }

  private ends(
    first: PajekToken | undefined,
    second: PajekToken | undefined,
    line: number,
  ): [number, number] | null {
    const source = this.vertexNumber(first, line, 'source');
    const target = this.vertexNumber(second, line, 'target');
    return source === null || target === null ? null : [source, target];
  }

  private begin([source, target]: [number, number], kind: 'arcs' | 'edges', line: number): number {
    const { edges, directions } = this.tables;
    const row = this.tables.beginEdge(line);
    directions[kind === 'arcs' ? 'directed' : 'undirected']++;
    edges.set(row, edges.own('source'), String(source));
    edges.set(row, edges.own('target'), String(target));
    if (this.relation !== null)
      edges.set(row, this.tables.attribute(edges, line, 'relation'), this.relation);
    return row;
  }

  private weigh(row: number, text: string): void {
    const { edges } = this.tables;
    edges.set(row, edges.own('weight'), text);
  }

  private list([first, ...others]: readonly PajekToken[], line: number, kind: 'arcs' | 'edges') {
    for (const other of others) {
      const ends = this.ends(first, other, line);
      if (!ends) continue;
      this.begin(ends, kind, line);
      this.unweighted++;
    }
  }

  private matrix(tokens: readonly PajekToken[], line: number): void {
    const count = this.count ?? 0;
    this.matrixRow++;
    if (this.matrixRow > count || tokens.length !== count) {
      this.tables.issue(
        line,
        undefined,
        this.matrixRow > count
          ? `The matrix has more than ${count} rows, one for each vertex. Remove the others.`
          : `This row of the matrix has ${tokens.length} values; there are ${count} vertices.`,
      );
      return;
    }
    for (const [at, { text }] of tokens.entries()) {
      if (Number(text) === 0) continue;
      this.weigh(this.begin([this.matrixRow, at + 1], 'arcs', line), text);
    }
  }

  /** Intervals, which are times; all else on the line is drawing. */
  private rest(rows: ElementRows, row: number, tokens: readonly PajekToken[], line: number): void {
    let timed = false;
    for (const { kind, text } of tokens) {
      if (kind !== 'interval' || timed) {
        this.tables.drop('coordinates and drawing values');
        continue;
      }
      const times = pajekTimes(text);
      if (times === null) {
        this.tables.issue(
          line,
          'start',
          `${quoted(`[${text}]`)} is no interval. Write intervals like [3-7] or [1,5-*].`,
        );
        continue;
      }
      timed = true;
      if (times.start !== '') rows.set(row, rows.own('start'), times.start);
      if (times.end !== '') rows.set(row, rows.own('end'), times.end);
      this.tables.drop('spells past the first of an element', times.intervals - 1);
    }
  }

  private endMatrix(): void {
    const count = this.count ?? 0;
    if (this.section !== 'matrix' || this.matrixRow >= count) return;
    this.tables.issue(
      this.sectionLine,
      undefined,
      `The matrix has ${this.matrixRow} rows, but there are ${count} vertices.`,
    );
  }

  end(): void {
    if (this.count === null) throw new Unreadable(undefined, FIRST);
    this.endMatrix();
    const { nodes, edges, notes } = this.tables;
    for (const [at, vertex] of this.vertices.entries()) {
      const line = vertex?.line ?? this.verticesLine;
      const row = this.tables.beginNode(line);
      nodes.set(row, nodes.own('id'), String(at + 1));
      const [, label, ...others] = vertex?.tokens ?? [];
      if (label && label.kind !== 'interval') nodes.set(row, nodes.own('label'), label.text);
      this.rest(nodes, row, label?.kind === 'interval' ? [label, ...others] : others, line);
    }
    if (this.unweighted > 0 && edges.isUsed(edges.own('weight'))) {
      edges.setStandard(edges.own('weight'), '1');
      notes.push(
        `Lines without a weight (${this.unweighted}) have the weight 1, as the format has it.`,
      );
    }
  }
}

const FIRST =
  'A network begins with *Vertices and their number. Write that line before everything else.';
const SEVERAL = 'There are several networks in the file. Bring each in a file of its own.';
