import { quoted } from '../issues';
import type { ElementRows } from './elementRows';
import { readTables, type GraphTables } from './graphTables';
import { isChecked, typeFault } from './typedText';
import type { GraphReader } from './types';
import { Unreadable } from './unreadable';
import { readXml, type XmlElement, type XmlReader } from './xml';

/**
 * Reads GraphML (Brandes, Eiglsperger, Herman, Himsolt, Marshall 2002): keys with types and
 * defaults, directions by graph and edge. Nodes and edges of nested graphs are kept, hyperedges,
 * ports and drawings are counted. It streams over saxes, because the reader of graphology builds a
 * document of any depth, throws at the first edge to a missing node, and makes parallel edges a
 * multigraph in silence; the tests hold both together on well-formed files.
 */
export const readGraphml: GraphReader = (file, limits) =>
  readTables(file, 'graphml', limits, (tables) =>
    readXml(file.text, limits, new GraphmlReader(tables)),
  );

/** A declared attribute. */
interface Key {
  readonly id: string;
  readonly name: string;
  readonly type: string;
  readonly line: number;
}

/** A node or edge whose end has not been read. */
interface Current {
  readonly rows: ElementRows;
  readonly row: number;
  /** 'node “a”', for messages. */
  readonly words: string;
}

/** Elements of drawings and of other structure, whose contents are passed over. */
const COUNTED: ReadonlyMap<string, string> = new Map([
  ['port', 'ports'],
  ['hyperedge', 'hyperedges'],
  ['desc', 'descriptions'],
  ['locator', 'locators'],
]);

const NODE_ATTRIBUTES = new Set(['id', 'xml:space']);
const EDGE_ATTRIBUTES = new Set([
  ...['id', 'source', 'target', 'directed', 'sourceport', 'targetport', 'xml:space'],
]);

class GraphmlReader implements XmlReader {
  private readonly keys = new Map<string, Key>();
  private readonly current = new Map<XmlElement, Current>();
  private readonly directedByDefault = new Map<XmlElement, boolean>();
  private readonly structured = new Set<XmlElement>();
  private graphs = 0;
  private undeclared = 0;
  /** The element whose whole content is passed over. */
  private passed: XmlElement | null = null;

  constructor(private readonly tables: GraphTables) {}

  open(element: XmlElement): void {
    const { name, parent, line } = element;
    if (parent === null) {
      if (name === 'graphml') return;
      throw new Unreadable(
        line,
        `The file is no GraphML: its first element is ${quoted(name)}, not “graphml”.`,
      );
    }
    if (this.passed) return;
    if (parent.name === 'data' && !parent.foreign) {
      this.structured.add(parent);
      this.passed = element;
      return;
    }
    const counted = element.foreign ? 'elements of other vocabularies' : COUNTED.get(name);
    if (counted !== undefined) {
      this.tables.drop(counted);
      this.passed = element;
    } else this.openKnown(element, parent);
  }

  private openKnown(element: XmlElement, parent: XmlElement): void {
    switch (`${parent.name} ${element.name}`) {
      case 'graphml key':
        return this.key(element);
      case 'graphml graph':
      case 'node graph':
      case 'edge graph':
        return this.graph(element, parent);
      case 'graph node':
        return this.node(element);
      case 'graph edge':
        return this.edge(element, parent);
      case 'key default':
      case 'graphml data':
      case 'graph data':
      case 'node data':
      case 'edge data':
        return;
      default:
        this.tables.drop(`elements “${element.name.slice(0, 40)}” out of place`);
        this.passed = element;
    }
  }

  close(element: XmlElement, text: string): void {
    if (this.passed === element) this.passed = null;
    else if (this.passed) return;
    else if (element.name === 'default') this.standard(element, text);
    else if (element.name === 'data') this.data(element, text);
    else this.current.delete(element);
    if (element.parent === null) this.end();
  }

  private end(): void {
    if (this.undeclared === 0) return;
    this.tables.notes.push(
      `Values of attributes that no key declares (${this.undeclared}) are read as text.`,
    );
  }

  private key({ attributes, line }: XmlElement): void {
    const id = attributes.get('id') ?? '';
    const earlier = this.keys.get(id);
    if (earlier) {
      this.tables.issue(
        line,
        'key',
        `The key ${quoted(id)} is declared already on line ${earlier.line}. Give every key an id of its own.`,
      );
      return;
    }
    if (this.keys.size > 2 * this.tables.limits.columns)
      throw new Unreadable(line, 'There are too many keys. Leave out those that are not used.');
    const name = attributes.get('attr.name') ?? id;
    this.keys.set(id, { id, name, type: attributes.get('attr.type') ?? 'string', line });
  }

  /** A default stands for every element of the kind that the key is for. */
  private standard({ parent, preserve, line }: XmlElement, text: string): void {
    const key = this.keys.get(parent?.attributes.get('id') ?? '');
    if (!parent || key?.line !== parent.line) return;
    const { nodes, edges } = this.tables;
    const of = parent.attributes.get('for') ?? 'all';
    const value = this.value(text, key, { preserve, line }, 'the default of the attribute');
    for (const [kind, rows] of [
      ['node', nodes],
      ['edge', edges],
    ] as const) {
      if (of === kind || of === 'all') rows.setStandard(this.column(rows, key, line), value);
    }
  }

  private graph(element: XmlElement, parent: XmlElement): void {
    if (parent.name !== 'graphml') this.tables.drop('nested graphs (nodes and edges are kept)');
    else if (this.graphs++ > 0) {
      throw new Unreadable(
        element.line,
        'There are several graphs in the file. Bring each in a file of its own.',
      );
    }
    this.directedByDefault.set(element, element.attributes.get('edgedefault') === 'directed');
  }

  private node(element: XmlElement): void {
    const { attributes, line } = element;
    const rows = this.tables.nodes;
    const row = this.tables.beginNode(line);
    const id = attributes.get('id') ?? '';
    rows.set(row, rows.own('id'), id);
    this.current.set(element, { rows, row, words: `the node ${quoted(id)}` });
    this.countOthers(attributes, NODE_ATTRIBUTES);
  }

  private edge(element: XmlElement, parent: XmlElement): void {
    const { attributes, line } = element;
    const rows = this.tables.edges;
    const said = attributes.get('directed');
    const directed =
      said === undefined ? (this.directedByDefault.get(parent) ?? false) : said === 'true';
    const row = this.tables.beginEdge(line);
    this.tables.directions[directed ? 'directed' : 'undirected']++;
    const [source, target] = [attributes.get('source') ?? '', attributes.get('target') ?? ''];
    rows.set(row, rows.own('source'), source);
    rows.set(row, rows.own('target'), target);
    const id = attributes.get('id');
    if (id !== undefined) rows.set(row, rows.attribute('id', 'id of the element'), id);
    const ports = [attributes.get('sourceport'), attributes.get('targetport')];
    this.tables.drop(
      'ends at ports (the edge is kept)',
      ports.filter((one) => one !== undefined).length,
    );
    const words = `the edge from ${quoted(source)} to ${quoted(target)}`;
    this.current.set(element, { rows, row, words });
    this.countOthers(attributes, EDGE_ATTRIBUTES);
  }

  private countOthers(attributes: ReadonlyMap<string, string>, known: ReadonlySet<string>): void {
    for (const name of attributes.keys()) {
      if (known.has(name) || name.startsWith('parse.')) continue;
      this.tables.drop('XML attributes that GraphML does not know');
    }
  }

  private data(element: XmlElement, text: string): void {
    const { parent, attributes, line } = element;
    const current = parent ? this.current.get(parent) : undefined;
    if (this.structured.delete(element)) {
      this.tables.drop('values made of elements (drawings)');
      return;
    }
    if (!current) {
      this.tables.drop('values of the whole graph');
      return;
    }
    const id = attributes.get('key') ?? '';
    const key = this.keys.get(id) ?? { id, name: id, type: 'string', line };
    if (!this.keys.has(id)) this.undeclared++;
    const { rows, row, words } = current;
    const value = this.value(text, key, element, words);
    if (!rows.set(row, this.column(rows, key, line), value))
      this.tables.drop('further values of one attribute of one element');
  }

  /** Keys of one name share a column: programs declare one for each type that the values have. */
  private column(rows: ElementRows, { name }: Key, line: number): number {
    return this.tables.attribute(rows, line, name);
  }

  private value(
    text: string,
    { name, type }: Key,
    { preserve, line }: Pick<XmlElement, 'preserve' | 'line'>,
    words: string,
  ): string {
    const value = preserve && !isChecked(type) ? text : text.trim();
    const fault = typeFault(value, type);
    if (fault !== null) this.tables.issue(line, name, `${fault} It is a value of ${words}.`);
    return value;
  }
}
