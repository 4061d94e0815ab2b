import type { ElementRows } from './elementRows';
import { GmlText, type GmlValue } from './gmlText';
import { lineFeeds, readTables, type GraphTables } from './graphTables';
import type { GraphReader } from './types';
import { Unreadable } from './unreadable';

/**
 * Reads GML (Himsolt 1997): one `graph` with `node` and `edge` lists. Lists within them (drawings)
 * are dropped and counted; so are further values of a key that stands more than once.
 */
export const readGml: GraphReader = (file, limits) =>
  readTables(file, 'gml', limits, (tables) =>
    new GmlReader(new GmlText(lineFeeds(file), limits), tables).read(),
  );

/** A list while it is walked: what its keys set. */
interface Element {
  readonly rows: ElementRows;
  readonly row: number;
  readonly own: ReadonlySet<string>;
}

class GmlReader {
  private graphs = 0;
  private directed = false;

  constructor(
    private readonly text: GmlText,
    private readonly tables: GraphTables,
  ) {}

  read(): void {
    const { text, tables } = this;
    text.entries((key, value, line) => {
      if (key.toLowerCase() === 'graph' && value.kind === 'list') this.graph(line);
      else this.other(value, 'values about the file');
    });
    if (this.graphs === 0) throw new Unreadable(1, 'There is no graph [ … ] in it.');
    tables.drop('comment lines', text.comments);
    tables.directions[this.directed ? 'directed' : 'undirected'] = tables.edges.count;
  }

  private graph(line: number): void {
    if (this.graphs++ > 0) {
      throw new Unreadable(
        line,
        'There are several graphs in the file. Bring each in a file of its own.',
      );
    }
    const { tables, text } = this;
    text.entries((key, value, at) => {
      const name = key.toLowerCase();
      if (value.kind !== 'list') {
        if (name === 'directed') this.directed = value.text === '1';
        else tables.drop('values of the whole graph');
      } else if (name === 'node') {
        const row = tables.beginNode(at);
        this.element({ rows: tables.nodes, row, own: NODE_KEYS });
      } else if (name === 'edge') {
        const row = tables.beginEdge(at);
        this.element({ rows: tables.edges, row, own: EDGE_KEYS });
      } else this.other(value, 'values of the whole graph');
    });
  }

  private element({ rows, row, own }: Element): void {
    const { tables } = this;
    this.text.entries((key, value, line) => {
      if (value.kind === 'list') return this.other(value, `lists “${key.slice(0, 40)}”`);
      const name = key.toLowerCase();
      const column = own.has(name) ? rows.own(name) : tables.attribute(rows, line, key);
      if (rows.set(row, column, value.text)) return;
      if (own.has(name)) {
        throw new Unreadable(
          line,
          `The ${name} stands twice in one list. Remove one of them.`,
          name,
        );
      }
      tables.drop('further values of one key of one element');
    });
  }

  private other(value: GmlValue, what: string): void {
    this.tables.drop(what);
    if (value.kind === 'list') this.text.skip();
  }
}

const NODE_KEYS = new Set(['id']);
const EDGE_KEYS = new Set(['source', 'target']);
