import type { Dropped, GraphFormat } from '../../formats/sources/types';
import type { Found } from '../../formats/understanding/found';
import type { EntryUnit } from '../../formats/types';
import type { Changes } from './bring';

/** An invented file of test/formats/fixtures/graphs and what it is to be brought in as. */
export interface GraphFixture {
  readonly shows: string;
  readonly file: string;
  readonly changes?: Changes;
  readonly format: GraphFormat;
  readonly directed?: boolean;
  /** As `drawn` writes them: 'id@entry[earliest,latest]', 'a-b*weight'. */
  readonly nodes: readonly string[];
  readonly edges: readonly string[];
  readonly unit?: EntryUnit;
  readonly labels?: readonly string[];
  /** Columns of nodes and of edges. */
  readonly columns: readonly [string, string];
  readonly dropped?: readonly Dropped[];
  /** A part of each note. */
  readonly notes?: readonly string[];
  readonly found?: Partial<Found>;
}

export const GOOD_GRAPHS: readonly GraphFixture[] = [
  {
    shows: 'GraphML: typed keys, defaults, CDATA, months that are intervals',
    file: 'reedbed.graphml',
    format: 'graphml',
    nodes: ['n0@18719', 'n1@18763[18748,18778]', 'n2@18789'],
    edges: ['n0-n1*0.25', 'n1-n2*1'],
    unit: 'days',
    labels: ['Reed & rush', 'Moth <small>', 'n2'],
    columns: ['id label guild first_seen', 'source target weight id'],
    found: { windows: { given: 0, years: 0, months: 1, tolerance: 0 } },
  },
  {
    shows: 'GraphML: nested graphs, ports, hyperedges, drawings, mixed directions',
    file: 'control-room.graphml',
    format: 'graphml',
    directed: true,
    nodes: ['pumps@5', 'pumps::a@7', 'pumps::b@6', 'valve@9'],
    edges: ['pumps-valve', 'pumps::a-pumps::b', 'pumps::a-valve'],
    columns: ['id start', 'source target start'],
    dropped: [
      { what: 'values of the whole graph', count: 1 },
      { what: 'descriptions', count: 1 },
      { what: 'values made of elements (drawings)', count: 1 },
      { what: 'ports', count: 2 },
      { what: 'nested graphs (nodes and edges are kept)', count: 1 },
      { what: 'further values of one attribute of one element', count: 1 },
      { what: 'ends at ports (the edge is kept)', count: 1 },
      { what: 'hyperedges', count: 1 },
    ],
    notes: ['2 have a direction and 2 have none'],
    found: { reversed: 1 },
  },
  {
    shows: 'GraphML: a prefix on every element, and ISO-8859-1 as declared',
    file: 'moor-prefixed.graphml',
    format: 'graphml',
    nodes: ['Gänseried@2', 'Möwenstein@1'],
    edges: ['Gänseried-Möwenstein'],
    columns: ['id entry', 'source target'],
    notes: ['windows-1252'],
  },
  {
    shows: 'GEXF 1.2: spells out of order, an open start, defaults, values that change',
    file: 'ferry.gexf',
    format: 'gexf',
    directed: true,
    nodes: ['s1@18322', 's2@18383', 's3@18620'],
    edges: ['s1-s2*2.5', 's2-s3*1'],
    unit: 'days',
    labels: ['Alder Stage', 'Birch Stage', 'Cedar Stage'],
    columns: ['id label start end bank berths', 'source target weight start id sailings'],
    dropped: [
      { what: 'descriptions of the file', count: 1 },
      { what: 'drawing values (viz)', count: 2 },
      { what: 'spells past the first of an element', count: 2 },
      { what: 'open ends of intervals (read as closed)', count: 1 },
      { what: 'later values of attributes that change', count: 1 },
      { what: 'mutual directions', count: 1 },
    ],
    notes: ['have the weight 1', '1 has a direction and 1 has none'],
  },
  {
    shows: 'GEXF 1.3: timestamps and lists of intervals with times of day',
    file: 'beacons.gexf',
    format: 'gexf',
    nodes: ['b1@1706774400', 'b2@1706782500', 'b3@1706832000'],
    edges: ['b1-b2', 'b2-b3'],
    unit: 'seconds',
    columns: ['id label start end', 'source target'],
    dropped: [{ what: 'spells past the first of an element', count: 2 }],
  },
  {
    shows: 'GEXF 1.1: nodes within nodes, parents, an attribute that is called like a column',
    file: 'offices.gexf',
    format: 'gexf',
    directed: true,
    nodes: ['house@1', 'east@2', 'west@3', 'annex@4'],
    edges: ['house-annex*4', 'east-west*1'],
    labels: ['House', 'East wing', 'West wing', 'Annex'],
    columns: ['id label label (attribute) pid', 'source target weight id'],
    dropped: [{ what: 'nesting of nodes (the nodes are kept)', count: 1 }],
    notes: ['have the weight 1', '1 has a direction and 2 have none'],
    found: { reversed: 1, differingWeights: 1 },
  },
  {
    shows: 'JSON: links before nodes, numbers up to 2⁵³, __proto__ as an id and a key',
    file: 'pollen.json',
    format: 'node_link',
    directed: true,
    nodes: ['bee@9007199254740991', 'vetch@12.5', '__proto__@7'],
    edges: ['bee-vetch*2'],
    labels: ['Carder bee', 'Vetch\nin two lines', '__proto__'],
    columns: ['id label entry native __proto__ constructor', 'source target weight start key'],
    dropped: [
      { what: 'values of the whole graph', count: 2 },
      { what: 'values of “position” that are lists or objects', count: 1 },
    ],
    found: { selfLoops: 1, reversed: 1, differingWeights: 1 },
  },
  {
    shows: 'JSON: nodes without ids, ends by position',
    file: 'choir.json',
    format: 'node_link',
    nodes: ['0@18141', '1@18141', '2@18274'],
    edges: ['0-1*4', '0-2*1'],
    unit: 'days',
    labels: ['Ida', 'Jon', 'Kit'],
    columns: ['id name joined', 'source target value'],
    notes: ['named by their position, from 0'],
  },
  {
    shows: 'JSON: nodes with ids, ends by position all the same',
    file: 'placed.json',
    format: 'node_link',
    nodes: ['larch@3', 'pine@1', 'yew@2'],
    edges: ['larch-pine', 'pine-yew'],
    columns: ['id entry', 'source target'],
    notes: ['are positions of nodes, counted from 0'],
  },
  {
    shows: 'JSON: keys and attributes apart',
    file: 'harbour.json',
    format: 'node_link',
    nodes: ['buoy@2', 'light@1'],
    edges: ['buoy-light*0.5'],
    columns: ['id entry size', 'source target weight key'],
    dropped: [
      { what: 'other parts of the file (“attributes”)', count: 1 },
      { what: 'other parts of the file (“options”)', count: 1 },
    ],
  },
  {
    shows: 'JSON: one line, and numbers that could be ids or positions, read as ids',
    file: 'numbered.json',
    format: 'node_link',
    nodes: ['2@1', '1@2', '0@3'],
    edges: ['2-1', '1-0'],
    columns: ['id entry', 'source target'],
    notes: ['they are read as ids'],
  },
  {
    shows: 'JSON: nodes by name, ends called from and to, one of them an object',
    file: 'two-lists.json',
    format: 'node_link',
    nodes: ['fox@1', 'owl@4'],
    edges: ['fox-owl'],
    columns: ['id entry', 'source target'],
  },
  {
    shows: 'GML: entities, comments, texts over two lines, nested lists, repeated keys',
    file: 'brook.gml',
    format: 'gml',
    nodes: ['10@1.5', '20@3', '30@2'],
    edges: ['10-20*2'],
    labels: ['Café weir & lock', 'Old\nmill', 'Möwen R&D'],
    columns: ['id label start alias', 'source target value'],
    dropped: [
      { what: 'values about the file', count: 2 },
      { what: 'values of the whole graph', count: 1 },
      { what: 'lists “graphics”', count: 1 },
      { what: 'further values of one key of one element', count: 1 },
      { what: 'comment lines', count: 2 },
    ],
    found: { selfLoops: 1, reversed: 1, rowsWithoutWeight: 1 },
  },
  {
    shows: 'GML: CRLF, times at the edges alone',
    file: 'calls.gml',
    format: 'gml',
    directed: true,
    nodes: ['1@18690', '2@18659', '3@18659'],
    edges: ['1-2', '2-3'],
    unit: 'days',
    columns: ['id', 'source target since'],
  },
  {
    shows: 'Pajek: relations, time intervals, a vertex that is not listed',
    file: 'paths.net',
    changes: { missing: 'last' },
    format: 'pajek',
    directed: true,
    nodes: ['1@3', '2@5', '3@6[1,6]', '4@1', '5@6[1,6]'],
    edges: ['1-2*4', '2-3*1', '3-4*1'],
    labels: ['Lower hut', 'Upper hut', 'ridge', 'Gate', '5'],
    columns: ['id label start end', 'source target weight start end relation'],
    dropped: [
      { what: 'comment lines', count: 1 },
      { what: 'coordinates and drawing values', count: 9 },
      { what: 'spells past the first of an element', count: 1 },
    ],
    notes: ['have the weight 1', '2 have a direction and 2 have none'],
    found: { placedLast: 2 },
  },
  {
    shows: 'Pajek: lists of arcs and edges in two modes, then a partition',
    file: 'lists.net',
    format: 'pajek',
    directed: true,
    nodes: ['1@1', '2@2', '3@3', '4@4'],
    edges: ['1-3', '1-4', '2-3', '3-4'],
    labels: ['a', 'b', 'c', 'd'],
    columns: ['id label', 'source target'],
    dropped: [
      { what: 'division of the vertices into two modes', count: 1 },
      { what: 'partitions', count: 1 },
    ],
    notes: ['3 have a direction and 1 has none'],
  },
  {
    shows: 'Pajek: a matrix',
    file: 'matrix.net',
    format: 'pajek',
    directed: true,
    nodes: ['1@1', '2@2', '3@3'],
    edges: ['1-2*2.5', '2-3*1'],
    labels: ['Oak', 'Elm', 'Yew'],
    columns: ['id label', 'source target weight'],
    found: { reversed: 1, differingWeights: 1 },
  },
];

export interface BadGraphFixture {
  readonly shows: string;
  readonly file: string;
  /** Every problem: line:field, and a part of what it says. */
  readonly problems: readonly (readonly [place: string, says: string])[];
}

export const BAD_GRAPHS: readonly BadGraphFixture[] = [
  {
    shows: 'GraphML with a DOCTYPE that defines entities, by the line where it begins',
    file: 'entities.graphml',
    problems: [['3:', 'has a DOCTYPE']],
  },
  {
    shows: 'GraphML with repeated ids and keys, ends that are no nodes, a double that says abc',
    file: 'twins.graphml',
    problems: [
      ['3:entry', '“soon” is no number'],
      ['4:key', 'already on line 2'],
      ['10:weight', '“abc” is no number, but the attribute is declared as double'],
      ['8:id', '“a” stands already on line 6'],
      ['9:id', 'The id is empty'],
      ['11:target', 'no node “nowhere”'],
      ['12:target', 'target of this edge is missing'],
    ],
  },
  {
    shows: 'GraphML with an element that is never closed, by the line where it opens',
    file: 'unclosed.graphml',
    problems: [['3:', '“node” is never closed']],
  },
  {
    shows: 'a web page that is called GraphML',
    file: 'page.graphml',
    problems: [['1:', 'no GraphML']],
  },
  {
    shows: 'a picture that is called GraphML',
    file: 'picture.graphml',
    problems: [[':', 'picture (PNG)']],
  },
  {
    shows: 'GraphML with two graphs',
    file: 'two-graphs.graphml',
    problems: [['3:', 'several graphs']],
  },
  {
    shows: 'GEXF with times that are not in its time format',
    file: 'wrong-times.gexf',
    problems: [
      ['5:start', '“17” of the node “a” is not a date'],
      ['6:depth', '“deep” is no number'],
      ['6:end', '“soon” of the node “b” is not a date'],
      ['7:start', '“2024-02-30” of the node “c”'],
      ['9:target', 'no node “d”'],
    ],
  },
  {
    shows: 'JSON with a key twice in one object',
    file: 'twice.json',
    problems: [['5:', '“entry” stands twice']],
  },
  {
    shows: 'JSON with half of a character',
    file: 'half.json',
    problems: [['3:', 'lone surrogate']],
  },
  {
    shows: 'JSON with a node without an id, an id twice, ends that are no nodes',
    file: 'ends.json',
    problems: [
      ['3:id', 'The id is empty'],
      ['4:id', 'already on line 2'],
      ['6:target', 'no node “1”'],
      ['7:target', 'missing'],
    ],
  },
  {
    shows: 'GML with a list that is never closed',
    file: 'open.gml',
    problems: [['3:', 'never closed']],
  },
  {
    shows: 'GML with a text without quotes',
    file: 'wordy.gml',
    problems: [['2:label', 'text in double quotes']],
  },
  {
    shows: 'Pajek with numbers that are no vertices and an interval that is none',
    file: 'numbers.net',
    problems: [
      ['4:id', 'already on line 3'],
      ['5:id', '“4” is not the number of a vertex'],
      ['7:target', '“5” is not the number of a vertex'],
      ['8:source', '“x” is not the number of a vertex'],
      ['3:start', '“[seven]” is no interval'],
    ],
  },
  {
    shows: 'Pajek with a quote that is not closed',
    file: 'open-quote.net',
    problems: [['2:', 'not closed on this line']],
  },
];
