import type { SourceFormat } from '../../formats/sources/types';
import type { Found } from '../../formats/understanding/found';
import type { EntryUnit } from '../../formats/types';
import type { Changes } from './bring';

/** Invented files of test/formats/fixtures/tables and what they are to be brought in as. */
export interface TableFixture {
  /** What the files show. */
  readonly shows: string;
  readonly files: readonly string[];
  /** Changes to the guessed choices. */
  readonly changes?: Changes;
  readonly formats: readonly SourceFormat[];
  /** As `drawn` writes them: 'id@entry[earliest,latest]', 'a-b*weight'. */
  readonly nodes: readonly string[];
  readonly edges: readonly string[];
  readonly unit: EntryUnit;
  readonly found?: Partial<Found>;
}

export interface BadTableFixture {
  readonly shows: string;
  readonly files: readonly string[];
  /** Every problem: file:line:column, and a part of what it says. */
  readonly problems: readonly (readonly [place: string, says: string])[];
  readonly questions?: readonly string[];
}

export const GOOD_TABLES: readonly TableFixture[] = [
  {
    shows: 'a node table with windows and an edge table with weights',
    files: ['fen-nodes.csv', 'fen-edges.csv'],
    formats: ['table', 'table'],
    nodes: ['sedge@3[1,4]', 'moss@5', 'crane@8[6,11]', 'newt@8', 'heron@15[12,null]'],
    edges: ['sedge-moss*0.6', 'sedge-crane*0.1', 'moss-crane*1.25', 'crane-newt*2'],
    unit: 'number',
    found: {
      components: 2,
      isolated: 1,
      ties: 1,
      tiedNodes: 2,
      selfLoops: 1,
      duplicates: 1,
      reversed: 1,
      differingWeights: 1,
      windows: { given: 3, years: 0, months: 0, tolerance: 0 },
    },
  },
  {
    shows: 'a threshold of weights',
    files: ['fen-nodes.csv', 'fen-edges.csv'],
    changes: { weights: { kind: 'threshold', least: 0.6 } },
    formats: ['table', 'table'],
    nodes: ['sedge@3[1,4]', 'moss@5', 'crane@8[6,11]', 'newt@8', 'heron@15[12,null]'],
    edges: ['sedge-moss*0.6', 'moss-crane*1.25', 'crane-newt*2'],
    unit: 'number',
    found: { edgesBelowThreshold: 1, leastWeight: 0.6 },
  },
  {
    shows: 'semicolons, decimal commas, a byte order mark, CRLF and German names',
    files: ['moor-stations-de.csv'],
    formats: ['table'],
    nodes: ['M1@0.5', 'M2@1.25', 'M3@1.25', 'M4@12'],
    edges: [],
    unit: 'number',
    found: { ties: 1, ignoredColumns: [] },
  },
  {
    shows: 'UTF-16 with a byte order mark and tabs',
    files: ['tern-stations-utf16.txt'],
    formats: ['table'],
    nodes: ['TB-01@17987', 'TB-02@17989', 'TB-03@17989'],
    edges: [],
    unit: 'days',
  },
  {
    shows: 'UTF-16, big-endian, without a byte order mark: an edge list with dates',
    files: ['harbour-links-utf16be.csv'],
    formats: ['table'],
    nodes: ['Quay@18266', 'Lock@18266', 'Basin@18268'],
    edges: ['Quay-Lock', 'Quay-Basin', 'Lock-Basin'],
    unit: 'days',
    found: { ties: 1, nodeRows: 0, edgeRows: 3 },
  },
  {
    shows: 'windows-1252 with curly quotes',
    files: ['orchard-windows1252.csv'],
    formats: ['table'],
    nodes: ['pom@1', 'poi@2', 'cer@3'],
    edges: [],
    unit: 'number',
  },
  {
    shows: 'mixed line ends, blank lines and no end of line at the end',
    files: ['mixed-line-ends.csv'],
    formats: ['table'],
    nodes: ['a@1', 'b@2', 'c@3', 'd@4'],
    edges: [],
    unit: 'number',
  },
  {
    shows: 'an edge list without a header: the order is the first date of any edge',
    files: ['contacts-no-header.csv'],
    formats: ['table'],
    nodes: ['ash@18688', 'beech@18687', 'cedar@18687', 'dogwood@18695'],
    edges: ['ash-beech', 'ash-cedar', 'beech-cedar', 'cedar-dogwood'],
    unit: 'days',
    found: {
      selfLoops: 1,
      orderFrom:
        'The first time in the column “column 3” of contacts-no-header.csv of any edge at the node.',
    },
  },
  {
    shows: 'a list by spaces below comment lines: weights, then times that never fall',
    files: ['radio-contacts.txt'],
    formats: ['table'],
    nodes: ['1@1700000300', '2@1700000300', '3@1700000360', '4@1700000480'],
    edges: ['1-2*0.5', '1-3*0.25', '2-3*1', '3-4*2'],
    unit: 'number',
    found: { dropped: [{ what: 'comment lines', count: 2 }] },
  },
  {
    shows: 'dates with slashes, the day first as answered',
    files: ['visits-slashed-dates.csv'],
    changes: { dayOrder: 'day_first' },
    formats: ['table'],
    nodes: ['Bee A@19024', 'Clover@19024', 'Thyme@19028', 'Bee B@19054'],
    edges: ['Bee A-Clover', 'Bee A-Thyme', 'Clover-Bee B'],
    unit: 'days',
  },
  {
    shows: 'dates with slashes of which one tells that the month is first',
    files: ['visits-month-first.tsv'],
    formats: ['table'],
    nodes: ['B1@19087', 'P1@19087', 'P2@19099', 'B2@19144'],
    edges: ['B1-P1', 'B1-P2', 'P2-B2'],
    unit: 'days',
  },
  {
    shows: 'a symmetric matrix with empty cells and decimal commas',
    files: ['exchange-matrix.csv'],
    formats: ['matrix'],
    nodes: ['Aller@1', 'Brede@2', 'Cinder@3', 'Dale@4'],
    edges: ['Aller-Brede*0.5', 'Aller-Dale*1', 'Brede-Cinder*2.25'],
    unit: 'number',
    found: { directed: false, reversed: 0, edgeRows: 3 },
  },
  {
    shows: 'a matrix with two halves, a diagonal and no corner cell',
    files: ['calls-matrix.tsv'],
    formats: ['matrix'],
    nodes: ['main@1', 'parse@2', 'emit@3'],
    edges: ['main-parse*4', 'main-emit*2', 'parse-emit*3'],
    unit: 'number',
    found: { directed: true, selfLoops: 1, reversed: 1, differingWeights: 1 },
  },
  {
    shows: 'years and months among dates are intervals',
    files: ['library-growth.csv'],
    formats: ['table'],
    nodes: [
      'core@10409[10227,10591]',
      'parser@10696[10682,10711]',
      'cache@11505[11323,11687]',
      'views@11631',
      'plugins@12235[12053,12417]',
    ],
    edges: [],
    unit: 'days',
    found: { windows: { given: 0, years: 3, months: 1, tolerance: 0 } },
  },
  {
    shows: 'nodes without an entry, left out with their edges',
    files: ['gaps-nodes.csv', 'gaps-edges.csv'],
    changes: { missing: 'leave_out' },
    formats: ['table', 'table'],
    nodes: ['alpha@1', 'delta@4'],
    edges: [],
    unit: 'number',
    found: { nodesWithoutEntry: 4, nodesLeftOut: 4, edgesLeftOut: 4, nodesOnlyInEdges: 1 },
  },
  {
    shows: 'nodes without an entry, placed last and tied',
    files: ['gaps-nodes.csv', 'gaps-edges.csv'],
    changes: { missing: 'last' },
    formats: ['table', 'table'],
    nodes: ['alpha@1', 'beta@5[1,5]', 'gamma@5[1,5]', 'delta@4', 'epsilon@5[1,5]', 'zeta@5[1,5]'],
    edges: ['alpha-beta', 'alpha-gamma', 'beta-delta', 'delta-zeta'],
    unit: 'number',
    found: { placedLast: 4, tiedNodes: 4, ties: 1, isolated: 1 },
  },
  {
    shows: 'repeated, empty, __proto__ and constructor as headers and ids',
    files: ['strange-headers.csv'],
    formats: ['table'],
    nodes: ['a@1', '__proto__@2', 'constructor@3'],
    edges: [],
    unit: 'number',
    found: {
      ignoredColumns: ['column 2', 'column 3', '__proto__', 'constructor'].map(
        (name) => `strange-headers.csv: ${name}`,
      ),
    },
  },
  {
    shows: 'labels that look like formulas and markup, over two lines, right to left',
    files: ['labels.csv'],
    formats: ['table'],
    nodes: ['a@1', 'b@2', 'c@3', 'd@4', 'e@5', 'café@6', 'cafe\u0301s@7'],
    edges: [],
    unit: 'number',
  },
  {
    shows: 'a first line that declares the delimiter',
    files: ['declared-separator.csv'],
    formats: ['table'],
    nodes: ['a@1', 'b@2'],
    edges: [],
    unit: 'number',
  },
  {
    shows: 'the heaviest third of all pairs, ties at the cut together',
    files: ['correlation.csv'],
    changes: { weights: { kind: 'density', share: 1 / 3 } },
    formats: ['table'],
    nodes: ['V1@1', 'V2@1', 'V3@2', 'V4@3'],
    edges: ['V1-V2*0.91', 'V2-V3*0.55', 'V2-V4*0.55'],
    unit: 'number',
    found: {
      edgesBelowThreshold: 2,
      edgesWithoutWeight: 1,
      leastWeight: 0.55,
      rowsWithoutWeight: 1,
    },
  },
  {
    shows: 'nodes that are all tied',
    files: ['all-tied.csv'],
    formats: ['table'],
    nodes: ['a@7', 'b@7', 'c@7'],
    edges: [],
    unit: 'number',
    found: { ties: 1, tiedNodes: 3, components: 3 },
  },
  {
    shows: 'dates with time and windows that name columns in words',
    files: ['commissioning.csv'],
    formats: ['table'],
    nodes: [
      'S1@1683019800[1683014400,1683028800]',
      'S2@1683108000',
      'S3@1683244799[null,1683244800]',
    ],
    edges: [],
    unit: 'seconds',
  },
];

export const BAD_TABLES: readonly BadTableFixture[] = [
  {
    shows: 'a matrix with a row missing and a cell that is no number',
    files: ['broken-matrix.csv'],
    problems: [
      ['broken-matrix.csv:3:c', '“x” is no number'],
      ['broken-matrix.csv::', 'no row “c”'],
    ],
  },
  {
    shows: 'missing entries that nothing was chosen for',
    files: ['gaps-nodes.csv', 'gaps-edges.csv'],
    problems: [
      ['gaps-nodes.csv:3:entry', 'entry is missing'],
      ['gaps-nodes.csv:4:entry', 'entry is missing'],
      ['gaps-nodes.csv:6:entry', 'entry is missing'],
      ['gaps-edges.csv:4:', '“zeta” is not among the nodes'],
    ],
  },
  {
    shows: 'rows that are too short and too long (an empty cell too much is none)',
    files: ['ragged.csv'],
    problems: [
      ['ragged.csv:3:', '2 cells, the header 3'],
      ['ragged.csv:4:', '4 cells, the header 3'],
    ],
  },
  {
    shows: 'a quote that is never closed',
    files: ['unclosed-quote.csv'],
    problems: [['unclosed-quote.csv:3:', 'never closed']],
  },
  { shows: 'a NUL', files: ['nul.csv'], problems: [['nul.csv:3:', 'NUL']] },
  { shows: 'a picture', files: ['picture.csv'], problems: [['picture.csv::', 'picture (PNG)']] },
  { shows: 'a gzip file', files: ['packed.csv'], problems: [['packed.csv::', 'gzip']] },
  { shows: 'an empty file', files: ['empty.csv'], problems: [['empty.csv::', 'empty']] },
  {
    shows: 'a header only',
    files: ['header-only.csv'],
    problems: [['header-only.csv::', 'no nodes']],
  },
  {
    shows: 'one id in two normal forms',
    files: ['twins.csv'],
    problems: [['twins.csv:4:id', 'already on line 2']],
  },
  {
    shows: 'times with a zone among times without',
    files: ['mixed-zones.csv'],
    problems: [['mixed-zones.csv:3:entry', 'time zone']],
  },
  {
    shows: 'a reversed window and an entry past all numbers',
    files: ['reversed-window.csv'],
    problems: [
      ['reversed-window.csv:3:latest', 'before the earliest'],
      ['reversed-window.csv:3:earliest', 'after the entry'],
      ['reversed-window.csv:4:entry', 'larger than a number'],
    ],
  },
  {
    shows: 'dates that can be read in two ways: a question, and no problem',
    files: ['visits-slashed-dates.csv'],
    problems: [],
    questions: ['day_order'],
  },
  {
    shows: 'two tables of nodes',
    files: ['fen-nodes.csv', 'all-tied.csv'],
    problems: [['all-tied.csv::', 'holds nodes already']],
  },
];
