import { quoted } from '../issues';
import type { ElementRows } from './elementRows';
import { ElementTimes, type TimeFormat } from './gexfTimes';
import { readTables, type GraphTables } from './graphTables';
import { isChecked, typeFault } from './typedText';
import type { GraphReader } from './types';
import { Unreadable } from './unreadable';
import { readXml, type XmlElement, type XmlReader } from './xml';

/**
 * Reads GEXF 1.1 to 1.3: attributes with types and defaults, weights, directions, and times from
 * `start` and `end`, `spells`, `timestamp`, `timestamps` and `intervals`. It streams over saxes,
 * because the reader of graphology drops times without a word; the tests hold both together on files
 * without times. Nested nodes are kept, their nesting and all drawing is counted.
 */
export const readGexf: GraphReader = (file, limits) =>
  readTables(file, 'gexf', limits, (tables) => readXml(file.text, limits, new GexfReader(tables)));

interface Attribute {
  readonly key: string;
  readonly title: string;
  readonly type: string;
  readonly kind: Kind;
  readonly line: number;
}

type Kind = 'node' | 'edge';

/** A node or edge whose end has not been read. */
interface Current {
  readonly kind: Kind;
  readonly rows: ElementRows;
  readonly row: number;
  readonly words: string;
  readonly times: ElementTimes;
}

const NODE_ATTRIBUTES = new Set([
  ...['id', 'label', 'start', 'end', 'startopen', 'endopen', 'timestamp', 'timestamps'],
  ...['intervals', 'pid'],
]);
const EDGE_ATTRIBUTES = new Set([
  ...['id', 'label', 'source', 'target', 'type', 'weight', 'start', 'end', 'startopen', 'endopen'],
  ...['timestamp', 'timestamps', 'intervals', 'kind'],
]);
/** Elements that only hold others. */
const HOLDERS = new Set(['nodes', 'edges', 'attvalues', 'spells']);
const COUNTED: ReadonlyMap<string, string> = new Map([
  ['meta', 'descriptions of the file'],
  ['options', 'lists of allowed values'],
  ['parents', 'further parents of nodes'],
  ...['color', 'position', 'size', 'shape', 'thickness'].map(
    (name) => [name, 'drawing values (viz)'] as const,
  ),
]);

class GexfReader implements XmlReader {
  private readonly attributes = new Map<string, Attribute>();
  private readonly current: Current[] = [];
  private format: TimeFormat = { written: 'double' };
  private defaultType = 'undirected';
  private graphs = 0;
  private unweighted = 0;
  private undeclared = 0;
  private passed: XmlElement | null = null;

  constructor(private readonly tables: GraphTables) {}

  open(element: XmlElement): void {
    const { name, parent, line } = element;
    if (parent === null) {
      if (name === 'gexf') return;
      throw new Unreadable(
        line,
        `The file is no GEXF: its first element is ${quoted(name)}, not “gexf”.`,
      );
    }
    if (this.passed) return;
    const counted = element.foreign ? 'drawing values (viz)' : COUNTED.get(name);
    if (counted !== undefined) {
      this.tables.drop(counted);
      this.passed = element;
    } else this.openKnown(element, parent);
  }

  private openKnown(element: XmlElement, parent: XmlElement): void {
    const { name } = element;
    const current = this.current.at(-1);
    if (name === 'graph' && parent.name === 'gexf') return this.graph(element);
    if (name === 'attributes' && parent.name === 'graph') return;
    if (name === 'attribute' && parent.name === 'attributes')
      return this.attribute(element, parent);
    if (name === 'default' && parent.name === 'attribute') return;
    if (name === 'node' && parent.name === 'nodes') return this.node(element);
    if (name === 'edge' && parent.name === 'edges') return this.edge(element);
    if (name === 'attvalue' && current) return this.value(element, current);
    if (name === 'spell' && current) return current.times.spell(element.attributes, this.tables);
    if (HOLDERS.has(name)) {
      if (name === 'nodes' && current) this.tables.drop('nesting of nodes (the nodes are kept)');
      return;
    }
    this.tables.drop(`elements “${name.slice(0, 40)}” out of place`);
    this.passed = element;
  }

  close(element: XmlElement, text: string): void {
    const { name, parent } = element;
    if (this.passed === element) this.passed = null;
    else if (this.passed) return;
    else if (name === 'default' && parent?.name === 'attribute') this.standard(element, text);
    else if (
      (name === 'node' && parent?.name === 'nodes') ||
      (name === 'edge' && parent?.name === 'edges')
    ) {
      const current = this.current.pop();
      current?.times.finish(current.rows, current.row, this.format, this.tables);
    }
    if (parent === null) this.end();
  }

  private end(): void {
    const { edges, notes } = this.tables;
    if (edges.isUsed(edges.own('weight')) && this.unweighted > 0) {
      edges.setStandard(edges.own('weight'), '1');
      notes.push(
        `Edges without a weight (${this.unweighted}) have the weight 1, as the format has it.`,
      );
    }
    if (this.undeclared > 0) {
      notes.push(
        `Values of attributes that are not declared (${this.undeclared}) are read as text.`,
      );
    }
  }

  private graph({ attributes, line }: XmlElement): void {
    if (this.graphs++ > 0) {
      throw new Unreadable(
        line,
        'There are several graphs in the file. Bring each in a file of its own.',
      );
    }
    this.defaultType = attributes.get('defaultedgetype') ?? 'undirected';
    this.format = { written: attributes.get('timeformat') ?? 'double' };
    const times = ['start', 'end', 'timestamp', 'timestamps', 'intervals'];
    this.tables.drop(
      'times of the whole graph',
      times.filter((name) => attributes.has(name)).length,
    );
  }

  private attribute({ attributes, line }: XmlElement, parent: XmlElement): void {
    const kind: Kind = parent.attributes.get('class') === 'edge' ? 'edge' : 'node';
    const id = attributes.get('id') ?? '';
    const key = `${kind} ${id}`;
    const earlier = this.attributes.get(key);
    if (earlier) {
      this.tables.issue(
        line,
        'attribute',
        `The attribute ${quoted(id)} is declared already on line ${earlier.line}. Give every attribute an id of its own.`,
      );
      return;
    }
    if (this.attributes.size > 2 * this.tables.limits.columns)
      throw new Unreadable(
        line,
        'There are too many attributes. Leave out those that are not used.',
      );
    const title = attributes.get('title') ?? id;
    const type = attributes.get('type') ?? 'string';
    this.attributes.set(key, { key, title, type, kind, line });
  }

  private standard({ parent, line, preserve }: XmlElement, text: string): void {
    const kind: Kind = parent?.parent?.attributes.get('class') === 'edge' ? 'edge' : 'node';
    const attribute = this.attributes.get(`${kind} ${parent?.attributes.get('id') ?? ''}`);
    if (!attribute || attribute.line !== parent?.line) return;
    const { nodes, edges } = this.tables;
    const rows = kind === 'node' ? nodes : edges;
    const value = preserve ? text : text.trim();
    this.check(value, attribute, line, 'the default of the attribute');
    rows.setStandard(this.column(rows, attribute, line), value);
  }

  private node(element: XmlElement): void {
    const { attributes, line } = element;
    const rows = this.tables.nodes;
    const row = this.tables.beginNode(line);
    const id = attributes.get('id') ?? '';
    rows.set(row, rows.own('id'), id);
    const label = attributes.get('label');
    if (label !== undefined) rows.set(row, rows.own('label'), label);
    const pid = attributes.get('pid');
    if (pid !== undefined) rows.set(row, rows.attribute('pid', 'pid of the element'), pid);
    this.begin({ kind: 'node', rows, row, words: `the node ${quoted(id)}` }, element);
    this.countOthers(attributes, NODE_ATTRIBUTES);
  }

  private edge(element: XmlElement): void {
    const { attributes, line } = element;
    const rows = this.tables.edges;
    const type = attributes.get('type') ?? this.defaultType;
    const row = this.tables.beginEdge(line);
    this.tables.directions[type === 'directed' ? 'directed' : 'undirected']++;
    const [source, target] = [attributes.get('source') ?? '', attributes.get('target') ?? ''];
    rows.set(row, rows.own('source'), source);
    rows.set(row, rows.own('target'), target);
    const weight = attributes.get('weight')?.trim();
    if (weight === undefined) this.unweighted++;
    else rows.set(row, rows.own('weight'), weight);
    for (const name of ['id', 'label', 'kind']) {
      const given = attributes.get(name);
      if (given !== undefined) rows.set(row, rows.attribute(name, `${name} of the element`), given);
    }
    if (type === 'mutual') this.tables.drop('mutual directions');
    const words = `the edge from ${quoted(source)} to ${quoted(target)}`;
    this.begin({ kind: 'edge', rows, row, words }, element);
    this.countOthers(attributes, EDGE_ATTRIBUTES);
  }

  private begin(one: Omit<Current, 'times'>, { attributes, line }: XmlElement): void {
    const times = new ElementTimes(line, one.words);
    times.take(attributes, this.tables);
    times.takeLists(attributes);
    this.current.push({ ...one, times });
  }

  private countOthers(attributes: ReadonlyMap<string, string>, known: ReadonlySet<string>): void {
    for (const name of attributes.keys())
      if (!known.has(name)) this.tables.drop('XML attributes that GEXF does not know');
  }

  private value({ attributes, line }: XmlElement, { kind, rows, row, words }: Current): void {
    const id = attributes.get('for') ?? attributes.get('id') ?? '';
    const key = `${kind} ${id}`;
    const declared = this.attributes.get(key);
    if (!declared) this.undeclared++;
    const attribute = declared ?? { key, title: id, type: 'string', kind, line };
    const given = attributes.get('value') ?? '';
    const value = isChecked(attribute.type) ? given.trim() : given;
    this.check(value, attribute, line, words);
    if (!rows.set(row, this.column(rows, attribute, line), value))
      this.tables.drop('later values of attributes that change');
  }

  /** Attributes of one title share a column: programs declare one for each type of value. */
  private column(rows: ElementRows, { title }: Attribute, line: number): number {
    return this.tables.attribute(rows, line, title);
  }

  private check(value: string, { title, type }: Attribute, line: number, words: string): void {
    const fault = typeFault(value, type);
    if (fault !== null) this.tables.issue(line, title, `${fault} It is a value of ${words}.`);
  }
}
