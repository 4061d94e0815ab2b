import { createReadStream, createWriteStream } from 'node:fs';
import { rename, rm } from 'node:fs/promises';
import { Readable, type Writable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { csvLines, type Cell } from '../../formats/csv';
import {
  barcodesTable,
  BARCODES_HEADER,
  pairsTable,
  PAIRS_HEADER,
  type ArrivingNode,
  type MatrixRow,
} from '../../formats/matrixTable';
import { readNetwork } from '../../formats/nodesAndEdges';
import type { FileIssue, FormatLimits, ReadNetwork } from '../../formats/types';
import {
  arrivalOrder,
  computePairs,
  countPairs,
  partnersOf,
  prepare,
  recordedBarcode,
  type Partners,
  type Prepared,
} from '../engine/index';
import type { Control, PairChoice } from '../engine/types';
import { enginePart } from '../parts';
import { valuesOn } from '../scales';
import { similarityDimensions, type MatrixOptions } from './options';

/** The same limits as an upload has, but for the number of nodes. */
const FILE_LIMITS: FormatLimits = {
  nodes: 20_000,
  edgeRows: 2_000_000,
  lineCharacters: 1_000_000,
  labelCharacters: 300,
};

/** The same limits as a worker has unless told otherwise. */
const ENGINE_LIMITS = { simplices: 40_000_000, bytes: 2_048 * 2 ** 20 };

/** Pairs whose results are held at once. */
const PAIRS_AT_ONCE = 200_000;

/** The input files are wrong; every fault is listed. */
export class WrongFiles extends Error {
  override readonly name = 'WrongFiles';
  constructor(
    readonly issues: readonly FileIssue[],
    readonly leftOut: number,
  ) {
    const count = issues.length + leftOut;
    super(
      count === 1
        ? 'The files have one fault; nothing was computed. Correct it, then try again.'
        : `The files have ${count} faults; nothing was computed. Correct them, then try again.`,
    );
  }
}

export interface Surroundings {
  /** Receives pairs.csv where neither file is named. */
  readonly output: Writable;
  /** Told the pairs done and all pairs, at least every 50 ms. */
  readonly onProgress: (pairsDone: number, pairsTotal: number) => void;
}

/**
 * Reads the two files, computes the swap matrix, writes what was asked for.
 * @throws WrongFiles; FileTrouble; EngineInputError; EngineLimitError
 */
export async function computeMatrix(
  options: MatrixOptions,
  { output, onProgress }: Surroundings,
): Promise<void> {
  const network = await readFiles(options);
  const entries = Float64Array.from(network.nodes, ({ entry }) => entry);
  const values = valuesOn(options.scale, entries);
  const { length: nodeCount } = values;
  const { edges } = network;
  const prepared = prepare(
    { nodeCount, edges, values },
    options.maxDimension,
    ENGINE_LIMITS,
    silent,
  );
  if (options.barcodes !== null) {
    await writeCsv(options.barcodes, BARCODES_HEADER, barcodesTable(recordedBarcode(prepared)));
  }
  if (options.pairs === null && options.barcodes !== null) return;
  const partners = partnersOf(enginePart(options.part, network.nodes), nodeCount);
  const arriving = Array.from(arrivalOrder(entries)).flatMap((row) => network.nodes[row] ?? []);
  const table = partTable({
    // The values are on the scale already; the table measures them as they are.
    nodes: arriving.map(({ id, entryRaw }, p) => ({
      nodeId: id,
      entryRaw,
      entry: prepared.values[p] ?? NaN,
    })),
    dimensions: similarityDimensions(options.maxDimension),
    rows: matrixRows(prepared, partners, onProgress),
  });
  if (options.pairs !== null) await writeCsv(options.pairs, PAIRS_HEADER, table);
  else await pipeline(Readable.from(csvLines(PAIRS_HEADER, table)), output, { end: false });
}

async function readFiles({ nodes, edges }: MatrixOptions): Promise<ReadNetwork> {
  const outcome = await readNetwork(
    { name: nodes, bytes: bytesOf(nodes) },
    { name: edges, bytes: bytesOf(edges) },
    FILE_LIMITS,
  );
  if (!outcome.ok) throw new WrongFiles(outcome.issues, outcome.leftOut);
  return outcome;
}

/** A file that cannot be read or written; the message says which and what to do. */
export class FileTrouble extends Error {
  override readonly name = 'FileTrouble';
  constructor(path: string, cause: unknown) {
    super(troubleWith(path, codeOf(cause)), { cause });
  }
}

const codeOf = (error: unknown): string =>
  error instanceof Error && 'code' in error ? String(error.code) : '';

/** Whether the system refused: its codes are names like ENOENT, Node's own begin with ERR_. */
const isTrouble = (error: unknown): boolean => /^E[A-Z]+$/.test(codeOf(error));

function troubleWith(path: string, code: string): string {
  switch (code) {
    case 'ENOENT':
      return `There is no file or folder ${path}; check the path.`;
    case 'EISDIR':
      return `${path} is a folder; name a file.`;
    case 'EACCES':
    case 'EPERM':
      return `${path} may not be opened by this user; change its permissions or name another file.`;
    case 'ENOSPC':
    case 'EDQUOT':
      return `There is no room left to write ${path}; make room or name a file elsewhere.`;
    default:
      return `${path} cannot be read or written (${code}).`;
  }
}

/** The bytes of a file that is opened when its first byte is asked for. @throws FileTrouble */
async function* bytesOf(path: string): AsyncGenerator<Uint8Array> {
  try {
    yield* createReadStream(path);
  } catch (error) {
    throw isTrouble(error) ? new FileTrouble(path, error) : error;
  }
}

const silent: Control = { shouldStop: () => false, onProgress: () => undefined };

interface PartRow extends MatrixRow {
  /** Positions q > p of its pairs, ascending; the results are in their order. */
  readonly partners: Uint32Array;
}

interface PartTable {
  /** In arrival order, `entry` on the scale. */
  readonly nodes: readonly ArrivingNode[];
  readonly dimensions: readonly number[];
  readonly rows: Iterable<PartRow>;
}

/** The rows of pairs.csv, one for each pair of the part. */
async function* partTable({ nodes, dimensions, rows }: PartTable): AsyncGenerator<Cell[]> {
  for (const { p, partners, ...results } of rows) {
    const chosen = [p, ...partners].flatMap((position) => nodes[position] ?? []);
    const row = { p: 0, ...results };
    yield* pairsTable({ nodes: chosen, scale: 'entry', dimensions, rows: [row] });
  }
}

/** The rows with a pair in the order of p, computed a batch at a time so that memory stays bounded. */
function* matrixRows(
  prepared: Prepared,
  partners: Partners,
  onProgress: Surroundings['onProgress'],
): Generator<PartRow> {
  const total = countPairs(partners);
  let done = 0;
  for (const choice of batches(partners)) {
    const before = done;
    const control = { ...silent, onProgress: (pairs: number) => onProgress(before + pairs, total) };
    const { pairCount, distances, bettiGaps } = computePairs(prepared, choice, control);
    for (const [i, p] of choice.rows.entries()) {
      const [start = 0, end] = choice.starts.subarray(i, i + 2);
      yield {
        p,
        partners: choice.partners.subarray(start, end),
        distance: (k, at) => distances[k * pairCount + start + at] ?? NaN,
        bettiGap: (k, at) => bettiGaps[k * pairCount + start + at] ?? NaN,
      };
    }
    done += pairCount;
  }
}

function* batches(partners: Partners): Generator<PairChoice> {
  let rows: number[] = [];
  let lists: Uint32Array[] = [];
  let pairs = 0;
  const close = (): PairChoice => {
    const choice = {
      rows: Uint32Array.from(rows),
      starts: new Uint32Array(rows.length + 1),
      partners: new Uint32Array(pairs),
    };
    lists.forEach((list, i) => {
      const start = choice.starts[i] ?? 0;
      choice.partners.set(list, start);
      choice.starts[i + 1] = start + list.length;
    });
    [rows, lists, pairs] = [[], [], 0];
    return choice;
  };
  for (let p = 0; p < partners.nodeCount; p++) {
    const list = partners.of(p);
    if (list.length === 0) continue;
    rows.push(p);
    lists.push(list);
    pairs += list.length;
    if (pairs >= PAIRS_AT_ONCE) yield close();
  }
  if (pairs > 0) yield close();
}

/** Writes beside the file and renames at the end: a file with this name is always a whole one. */
async function writeCsv(
  path: string,
  header: readonly string[],
  rows: Iterable<readonly Cell[]> | AsyncIterable<readonly Cell[]>,
): Promise<void> {
  const partial = `${path}.${process.pid}.part`;
  try {
    await pipeline(Readable.from(csvLines(header, rows)), createWriteStream(partial));
    await rename(partial, path);
  } catch (error) {
    await rm(partial, { force: true });
    throw isTrouble(error) ? new FileTrouble(path, error) : error;
  }
}
