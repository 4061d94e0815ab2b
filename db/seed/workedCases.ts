import { tableText, type DemoNetwork } from './source';

interface WorkedCase {
  readonly name: string;
  readonly description: string;
  /** Entry of node 0, 1, … */
  readonly entries: readonly number[];
  readonly edges: readonly (readonly [number, number])[];
}

const OCTAHEDRON_GAPS = new Set(['0,4', '1,5', '2,3']);

const CASES: readonly WorkedCase[] = [
  {
    name: 'Four nodes, safe in pairs only',
    description:
      'Worked case from an exhaustive search of all graphs with up to four nodes; it is the ' +
      'smallest. Every one of the six swaps leaves the barcode as it is, yet 4 of the 24 orders of ' +
      'the four nodes add the bar [1, 2) in dimension 0: being swap-safe in pairs does not make a ' +
      'group safe to shuffle.',
    entries: [0, 1, 2, 3],
    edges: [
      [0, 1],
      [0, 2],
      [0, 3],
      [1, 2],
      [1, 3],
    ],
  },
  {
    name: 'Octahedron, a hollow sphere',
    description:
      'Worked case from the octahedron (Coxeter, Regular Polytopes, 3rd ed. 1973; the order was ' +
      'found by exhaustive search). Barcode: [0, ∞) in dimension 0 and [5, ∞) in dimension 2. The ' +
      'swaps among nodes 2, 3, 4, 5 are all safe, yet 4 of their 24 orders add [3, 4) in dimension 1.',
    entries: [0, 1, 2, 3, 4, 5],
    edges: Array.from({ length: 6 }, (_, i) =>
      Array.from({ length: i }, (_, j): [number, number] => [j, i]),
    )
      .flat()
      .filter((edge) => !OCTAHEDRON_GAPS.has(edge.join(','))),
  },
  {
    name: 'Ring of eight',
    description:
      'Worked case from the elder rule (Edelsbrunner, Harer, Computational Topology, AMS 2010, ' +
      'ch. VII.1) on a cycle of eight nodes, every second one arriving first. Barcode: [0, ∞), ' +
      '[1, 4), [2, 5), [3, 6) in dimension 0 and [7, ∞) in dimension 1.',
    entries: [0, 4, 1, 5, 2, 6, 3, 7],
    edges: Array.from({ length: 8 }, (_, i): [number, number] => [i, (i + 1) % 8]),
  },
];

/** Small networks whose barcodes can be checked by hand; each description names its source. */
export function workedCases(): DemoNetwork[] {
  return CASES.map(({ name, description, entries, edges }) => ({
    name,
    description,
    invented: false,
    nodesCsv: tableText(
      'id,label,entry',
      entries.map((entry, node) => [node, `Node ${node}`, entry]),
    ),
    edgesCsv: tableText('source,target', edges),
  }));
}
