import type { ElementRows } from './elementRows';
import { lineFeeds, readTables, type GraphTables } from './graphTables';
import { JsonText } from './jsonText';
import type { GraphReader } from './types';
import { Unreadable } from './unreadable';

/**
 * Reads JSON node-link: `nodes` and `links` (or `edges`) in one object, in any order. A node is an
 * object with `id` (or `key`), or an id alone; an edge has `source` and `target` (or `from` and `to`).
 * Ends are ids if every one is the id of a node; else positions from 0 if every one is a whole number
 * below the number of nodes. Members of `attributes` count as the element's own; what else is nested
 * is dropped and counted.
 */
export const readNodeLink: GraphReader = (file, limits) =>
  readTables(file, 'node_link', limits, (tables) =>
    new NodeLinkReader(new JsonText(lineFeeds(file), limits), tables).read(),
  );

type End = 'source' | 'target';

/** Keys by which an end goes, the first that is there. */
const ENDS: ReadonlyMap<string, End> = new Map([
  ['source', 'source'],
  ['target', 'target'],
  ['from', 'source'],
  ['to', 'target'],
]);

class NodeLinkReader {
  private directed = false;
  /** Rows of nodes that have none. */
  private readonly withoutId: number[] = [];
  /** Whether every end is written as a number, as positions are. */
  private numbersOnly = true;
  private nodesRead = false;
  private edgeKey: string | null = null;

  constructor(
    private readonly json: JsonText,
    private readonly tables: GraphTables,
  ) {}

  read(): void {
    const { json, tables } = this;
    if (json.kind() === 'array') json.items(() => this.edge());
    else if (json.kind() === 'object') json.members((key) => this.member(key, 'top'));
    else throw new Unreadable(json.line(), 'An object with nodes and links is expected.');
    json.end();
    this.nameNodes();
    if (tables.nodes.count > 0) this.resolveEnds();
    tables.directions[this.directed ? 'directed' : 'undirected'] = tables.edges.count;
  }

  private member(key: string, level: 'top' | 'graph'): void {
    const { json, tables } = this;
    const kind = json.kind();
    const nested = kind === 'array' || kind === 'object';
    if (key === 'nodes' && nested) this.nodes(kind);
    else if ((key === 'links' || key === 'edges') && nested) this.edges(key);
    else if (key === 'directed' && kind === 'word') this.directed = json.text() === 'true';
    else if (key === 'graph' && kind === 'object' && level === 'top')
      json.members((inner) => this.member(inner, 'graph'));
    else {
      if (key !== 'multigraph') {
        const what = `other parts of the file (“${key.slice(0, 40)}”)`;
        tables.drop(level === 'top' ? what : 'values of the whole graph');
      }
      json.skip();
    }
  }

  private nodes(kind: 'array' | 'object'): void {
    const { json } = this;
    this.once(this.nodesRead, 'nodes');
    this.nodesRead = true;
    if (kind === 'array') json.items(() => this.node(undefined));
    else json.members((id) => this.node(id));
  }

  private edges(key: string): void {
    this.once(this.edgeKey !== null, `links, as “${this.edgeKey ?? ''}” already`);
    this.edgeKey = key;
    if (this.json.kind() === 'array') this.json.items(() => this.edge());
    else throw new Unreadable(this.json.line(), `The ${key} have to be a list in [ and ].`);
  }

  private once(already: boolean, what: string): void {
    if (already)
      throw new Unreadable(this.json.line(), `The file has ${what}, a second time. Keep one list.`);
  }

  private node(name: string | undefined): void {
    const { json, tables } = this;
    const line = json.line();
    const row = tables.beginNode(line);
    const { nodes } = tables;
    let id = name;
    let key: string | undefined;
    const element = { rows: nodes, row };
    if (json.kind() === 'object') {
      json.members((member) => {
        if (member === 'id' && id === undefined) id = this.scalar(member);
        else if (member === 'key') key = this.scalar(member);
        else this.attribute(member, element);
      });
    } else if (json.kind() === 'array') {
      throw new Unreadable(line, 'A node has to be an object with an id, or an id alone.');
    } else id = json.text();
    if (id !== undefined && key !== undefined)
      nodes.set(row, tables.attribute(nodes, line, 'key'), key);
    const own = id ?? key;
    if (own === undefined) this.withoutId.push(row);
    else nodes.set(row, nodes.own('id'), own);
  }

  private edge(): void {
    const { json, tables } = this;
    const line = json.line();
    if (json.kind() !== 'object') {
      throw new Unreadable(line, 'A link has to be an object with a source and a target.');
    }
    const row = tables.beginEdge(line);
    const { edges } = tables;
    const ends = new Map<string, string>();
    json.members((member) => {
      if (ENDS.has(member)) ends.set(member, this.end());
      else this.attribute(member, { rows: edges, row });
    });
    for (const [key, end] of ENDS) {
      const text = ends.get(key);
      if (text === undefined || edges.set(row, edges.own(end), text)) continue;
      edges.set(row, tables.attribute(edges, line, key), text);
    }
  }

  /** The text of an end; of an object its id. */
  private end(): string {
    const { json } = this;
    const kind = json.kind();
    if (kind !== 'number') this.numbersOnly = false;
    if (kind === 'array') throw new Unreadable(json.line(), 'An end of a link has to be one node.');
    if (kind !== 'object') return json.text();
    let id = '';
    json.members((key) => {
      const nested = json.kind() === 'object' || json.kind() === 'array';
      if (key === 'id' && !nested) id = json.text();
      else json.skip();
    });
    return id;
  }

  private attribute(name: string, element: { rows: ElementRows; row: number }): void {
    const { json, tables } = this;
    if (name === 'attributes' && json.kind() === 'object') {
      json.members((member) => this.attribute(member, element));
      return;
    }
    const { rows, row } = element;
    const line = json.line();
    const text = this.scalar(name);
    if (text !== undefined && !rows.set(row, tables.attribute(rows, line, name), text))
      tables.drop('further values of one attribute of one element');
  }

  /** Text, number or word as written, null being empty; undefined, and counted, for what is nested. */
  private scalar(name: string): string | undefined {
    const { json, tables } = this;
    const kind = json.kind();
    if (kind === 'object' || kind === 'array') {
      tables.drop(`values of “${name.slice(0, 40)}” that are lists or objects`);
      json.skip();
      return undefined;
    }
    const text = json.text();
    return kind === 'word' && text === 'null' ? '' : text;
  }

  /** Nodes are named by position where none has an id; where only some have none, those are wrong later. */
  private nameNodes(): void {
    const { nodes, notes } = this.tables;
    const { withoutId } = this;
    if (withoutId.length === 0 || withoutId.length < nodes.count) return;
    for (const row of withoutId) nodes.set(row, nodes.own('id'), String(row));
    notes.push('The nodes have no id, so they are named by their position, from 0.');
  }

  private resolveEnds(): void {
    const { tables, numbersOnly } = this;
    const ids: string[] = [];
    for (const { cells } of tables.nodes.finish().rows()) ids.push(cells[0] ?? '');
    const known = new Set(ids.map((id) => id.normalize('NFC')));
    let [named, placed] = [true, numbersOnly];
    for (const { cells } of tables.edges.finish().rows()) {
      for (const end of cells.slice(0, 2)) {
        named &&= known.has(end.normalize('NFC'));
        placed &&= Number.isInteger(Number(end)) && Number(end) >= 0 && Number(end) < ids.length;
      }
      if (!named && !placed) return;
    }
    if (tables.edges.count === 0 || !placed || this.withoutId.length > 0) return;
    if (named) tables.notes.push(AS_IDS);
    else {
      tables.notes.push(AS_POSITIONS);
      tables.endName = (written) => ids[Number(written)] ?? '';
    }
  }
}

const AS_IDS =
  'The ends of the links are numbers that could be positions too; as each is the id of a node, they are read as ids.';
const AS_POSITIONS = 'The ends of the links are positions of nodes, counted from 0.';
