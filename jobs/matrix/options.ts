import { parseArgs } from 'node:util';

/** What the command was asked for. */
export interface MatrixOptions {
  readonly nodes: string;
  readonly edges: string;
  readonly scale: 'entry' | 'rank';
  /** 0..3; all dimensions up to it are computed. */
  readonly maxDimension: number;
  /** Which pairs are computed. */
  readonly part: MatrixPart;
  /** File for pairs.csv; null: not wanted, or on standard output where `barcodes` is null too. */
  readonly pairs: string | null;
  readonly barcodes: string | null;
}

/** `overlapping`: pairs whose intervals [earliest, latest] overlap. */
export type MatrixPart =
  | { readonly kind: 'whole' }
  | { readonly kind: 'within'; readonly positions: number }
  | { readonly kind: 'overlapping' };

/** The command was called wrongly; the message says what was wrong and what to do. */
export class UsageError extends Error {
  override readonly name = 'UsageError';
}

export const USAGE = `npm run matrix -- --nodes nodes.csv --edges edges.csv [--scale entry|rank]
    [--max-dimension 3] [--within k | --overlapping] [--pairs pairs.csv] [--barcodes barcodes.csv]

  --nodes          id,label,entry and optionally earliest,latest
  --edges          source,target and optionally weight
  --scale          entry: recorded values (unless told otherwise); rank: steps 1, 2, …
  --max-dimension  0 to 3; 3 unless told otherwise
  --within         only pairs at most k arrival positions apart
  --overlapping    only pairs whose intervals from earliest to latest overlap
  --pairs          file for the matrix, one row a pair
  --barcodes       file for the barcode of the recorded order

With neither --pairs nor --barcodes the matrix goes to standard output.
`;

const OPTIONS = {
  nodes: { type: 'string' },
  edges: { type: 'string' },
  scale: { type: 'string', default: 'entry' },
  'max-dimension': { type: 'string', default: '3' },
  within: { type: 'string' },
  overlapping: { type: 'boolean', default: false },
  pairs: { type: 'string' },
  barcodes: { type: 'string' },
  help: { type: 'boolean', short: 'h' },
} as const;

/** @returns the options, or 'help'. @throws UsageError */
export function readOptions(args: readonly string[]): MatrixOptions | 'help' {
  const values = parsed(args);
  if (values.help) return 'help';
  const { nodes, edges, scale, pairs = null, barcodes = null } = values;
  const maxDimension = values['max-dimension'];
  if (!nodes) throw new UsageError('--nodes is missing; name the file with the nodes.');
  if (!edges) throw new UsageError('--edges is missing; name the file with the edges.');
  if (scale !== 'entry' && scale !== 'rank') {
    throw new UsageError(`--scale is "${scale}"; write entry or rank.`);
  }
  if (!/^[0-3]$/.test(maxDimension)) {
    throw new UsageError(`--max-dimension is "${maxDimension}"; write 0, 1, 2 or 3.`);
  }
  for (const [name, path] of Object.entries({ pairs, barcodes })) {
    if (path === '') throw new UsageError(`--${name} is empty; name the file to write.`);
    if (path !== null && (path === nodes || path === edges)) {
      throw new UsageError(`--${name} is a file that is read (${path}); name another.`);
    }
  }
  if (pairs !== null && pairs === barcodes) {
    throw new UsageError(`--pairs and --barcodes are the same file (${pairs}); name two.`);
  }
  const part = partOf(values);
  return { nodes, edges, scale, maxDimension: Number(maxDimension), part, pairs, barcodes };
}

function partOf({ within, overlapping }: { within?: string; overlapping: boolean }): MatrixPart {
  if (within === undefined) return overlapping ? { kind: 'overlapping' } : { kind: 'whole' };
  if (overlapping) throw new UsageError('--within and --overlapping are two parts; write one.');
  if (!/^[1-9]\d{0,6}$/.test(within)) {
    throw new UsageError(`--within is "${within}"; write a whole number of positions from 1.`);
  }
  return { kind: 'within', positions: Number(within) };
}

function parsed(args: readonly string[]) {
  try {
    return parseArgs({ args: [...args], options: OPTIONS, allowPositionals: false }).values;
  } catch (error) {
    // Node's own first sentence names the option; what follows is advice for programmers.
    const said = error instanceof Error ? error.message : String(error);
    throw new UsageError(`${said.split(/\.\s|\n/)[0]}. Ask with --help what may be written.`);
  }
}

/** Dimensions of the similarity: 1 up to the highest, or 0 where that is the highest. */
export function similarityDimensions(maxDimension: number): number[] {
  return maxDimension === 0 ? [0] : Array.from({ length: maxDimension }, (_, k) => k + 1);
}
