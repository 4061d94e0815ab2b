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
  type MatrixRow,
} from '../../formats/matrixTable';
import { readNetwork } from '../../formats/nodesAndEdges';
import type { FileIssue, FormatLimits, ReadNetwork } from '../../formats/types';
import {
  arrivalOrder,
  computeRows,
  prepare,
  recordedBarcode,
  type Prepared,
} from '../engine/index';
import type { Control } from '../engine/types';
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
  const nodes = Array.from(arrivalOrder(entries), (row) => network.nodes[row]).flatMap((node) =>
    node ? [{ nodeId: node.id, entryRaw: node.entryRaw, entry: node.entry }] : [],
  );
  const table = pairsTable({
    nodes,
    scale: options.scale,
    dimensions: similarityDimensions(options.maxDimension),
    rows: matrixRows(prepared, nodeCount, onProgress),
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

/** All rows in the order of p, computed a batch at a time so that memory stays bounded. */
function* matrixRows(
  prepared: Prepared,
  nodeCount: number,
  onProgress: Surroundings['onProgress'],
): Generator<MatrixRow> {
  const total = (nodeCount * (nodeCount - 1)) / 2;
  let done = 0;
  for (const rows of batches(nodeCount)) {
    const before = done;
    const control = { ...silent, onProgress: (pairs: number) => onProgress(before + pairs, total) };
    const { pairCount, distances, bettiGaps } = computeRows(prepared, rows, control);
    let offset = 0;
    for (const p of rows) {
      const start = offset;
      yield {
        p,
        distance: (k, i) => distances[k * pairCount + start + i] ?? NaN,
        bettiGap: (k, i) => bettiGaps[k * pairCount + start + i] ?? NaN,
      };
      offset += nodeCount - 1 - p;
    }
    done += pairCount;
  }
}

function* batches(nodeCount: number): Generator<Uint32Array> {
  for (let p = 0; p < nodeCount - 1;) {
    const rows: number[] = [];
    for (let pairs = 0; p < nodeCount - 1 && pairs < PAIRS_AT_ONCE; p++) {
      rows.push(p);
      pairs += nodeCount - 1 - p;
    }
    yield Uint32Array.from(rows);
  }
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
