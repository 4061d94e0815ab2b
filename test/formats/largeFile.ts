/** Brings in one large file, up to 50 MB, and prints what was found; run by largeFiles.test.ts with a small heap. */
import { bring, LIMITS } from './bring';

const bytes = new Uint8Array(LIMITS.bytes);
let length = 0;
const encoder = new TextEncoder();
const put = (text: string): void => {
  length += encoder.encodeInto(text, bytes.subarray(length)).written;
};

const KINDS: Readonly<Record<string, () => void>> = {
  /** 1,600,000 edge rows among 5,000 nodes. */
  edges: () => {
    put('source,target\n');
    for (let k = 0; k < 1_600_000; k++)
      put(`long node ${k % 5_000},long node ${(k * 7_919 + 1) % 5_000}\n`);
  },
  /** Times that are all different, and too long to be copied when they are cut from the text. */
  times: () => {
    put('from,to,time\n');
    for (let k = 0; k < 400_000; k++) {
      const time = new Date(1_600_000_000_000 + k * 60_000).toISOString();
      put(`"node ${k % 5_000}","node ${(k * 7_919) % 5_000}",${time}\n`);
    }
  },
  /** Cells over two lines, as many as fit. */
  lines: () => {
    put('source,target\n');
    for (let k = 0; k < 1_900_000; k++) put(`"a\n${k % 50}","b\n${k % 7}"\n`);
  },
  /** JSON on one line: 550,000 links among 5,000 nodes. */
  links: () => {
    const nodes = Array.from({ length: 5_000 }, (_, k) => `{"id":${k},"entry":${k}}`);
    put(`{"nodes":[${nodes.join(',')}],"links":[{"source":0,"target":1}`);
    for (let k = 1; k < 550_000; k++)
      put(`,{"source":${k % 5_000},"target":${(k * 7_919 + 1) % 5_000}}`);
    put(']}');
  },
  /** GraphML with an element a line: more than a million spaces of layout between 300,000 edges. */
  layout: () => {
    put('<graphml>\n  <graph edgedefault="undirected">\n');
    for (let k = 0; k < 5_000; k++) put(`    <node id="n${k}"/>\n`);
    for (let k = 0; k < 300_000; k++)
      put(`    <edge source="n${k % 5_000}" target="n${(k * 7_919 + 1) % 5_000}">\n    </edge>\n`);
    put('  </graph>\n</graphml>\n');
  },
  /** A quote out of place in every line. */
  quotes: () => {
    for (let k = 0; k < 12_000_000; k++) put('a"b\n');
  },
  /** A matrix of 3,500 nodes, every cell full: more edges than are read. */
  matrix: () => {
    const labels = Array.from({ length: 3_500 }, (_, k) => k);
    put(`,${labels.join(',')}\n`);
    for (const label of labels) put(`${label}${',.5'.repeat(3_500)}\n`);
  },
};

KINDS[process.argv[2] ?? '']?.();
const { found, issues } = await bring({ 'large.csv': bytes.subarray(0, length) });
const { nodes, edges, edgeRows } = found;
const [first] = issues;
console.log(JSON.stringify({ nodes, edges, edgeRows, says: first?.message ?? '', bytes: length }));
