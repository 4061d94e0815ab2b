import { createHash } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import { IMPORT_LIMITS, LISTED_PROBLEMS } from '#contract/imports';
import { contentHash } from '../../formats/canonical';
import { readSource } from '../../formats/sources/readSource';
import type { RawSource, SourceLimits } from '../../formats/sources/types';
import { guessChoices } from '../../formats/understanding/guessChoices';
import { openQuestions } from '../../formats/understanding/openQuestions';
import { understand, type Understanding } from '../../formats/understanding/understand';
import { writeArray } from './arrayFiles';
import { draftView, type DraftView } from './draftView';
import { growthOf } from './growth';
import type {
  DraftFile,
  DraftRequest,
  GrowthOnDisk,
  NetworkOnDisk,
  Problems,
  ReadDraft,
} from './messages';
import { shownFile } from './preview';
import { weightSteps } from './weightSteps';

/** Problems that a download lists. */
const MOST_PROBLEMS = 100_000;

const LIMITS: SourceLimits = { ...IMPORT_LIMITS, bytes: IMPORT_LIMITS.fileBytes };

interface Understood {
  readonly sources: readonly RawSource[];
  readonly guess: ReturnType<typeof guessChoices>;
  readonly outcome: Understanding;
}

async function understood(
  { files, choices }: DraftRequest,
  limits: SourceLimits,
): Promise<Understood> {
  const sources: RawSource[] = [];
  for (const { path, name, hint } of files) {
    sources.push(await readSource({ name, bytes: await readFile(path) }, hint, limits));
  }
  const guess = guessChoices(sources);
  return { sources, guess, outcome: understand(sources, choices ?? guess.choices, limits) };
}

/** Reads the files and says all that was found, with what a worker needs to count cliques. */
export async function readDraft(request: DraftRequest): Promise<ReadDraft> {
  const { sources, guess, outcome } = await understood(request, LIMITS);
  const { network, weighted } = outcome;
  return {
    view: viewOf(request, sources, guess, outcome),
    weights: network && weighted ? weightSteps(weighted.weights, network.nodes.length) : null,
    growth: network && growthOnDisk(request.folder, network),
  };
}

function viewOf(
  { files, choices }: DraftRequest,
  sources: readonly RawSource[],
  guess: Understood['guess'],
  { network, found, questions, issues, leftOut }: Understanding,
): DraftView {
  const shown = (file: DraftFile, position: number) => {
    const source = sources[position];
    if (!source) throw new Error('A file has no source.');
    return shownFile(file, position, source);
  };
  const taken = choices ?? guess.choices;
  const asked = [...questions, ...openQuestions(sources, taken)];
  return draftView.parse({
    files: files.map(shown),
    choices: taken,
    guessed: guess.choices,
    remembered: false,
    questions: asked,
    found,
    issues: issues.slice(0, LISTED_PROBLEMS),
    issuesLeftOut: leftOut + Math.max(0, issues.length - LISTED_PROBLEMS),
    ready: network !== null,
    growth: network && growthOf(network),
    signature: signatureOf(sources),
  });
}

/** Names the columns of both tables, whatever their order. */
function signatureOf(sources: readonly RawSource[]): string | null {
  const columns = (part: 'nodes' | 'edges') =>
    sources
      .flatMap((source) => source[part]?.columns ?? [])
      .map((name) => name.normalize('NFC'))
      .sort();
  const both = [columns('nodes'), columns('edges')];
  if (both.every((names) => names.length === 0)) return null;
  return createHash('sha256').update(JSON.stringify(both)).digest('hex');
}

function growthOnDisk(
  folder: string,
  { nodes, edges }: NonNullable<Understanding['network']>,
): GrowthOnDisk {
  return {
    entries: writeArray(
      folder,
      Float64Array.from(nodes, ({ entry }) => entry),
    ),
    edges: writeArray(folder, edges),
  };
}

/** Reads the files for good. @returns the network, or what is wrong now */
export async function readDraftNetwork(request: DraftRequest): Promise<NetworkOnDisk | Problems> {
  const { outcome } = await understood(request, LIMITS);
  const { network, issues, leftOut } = outcome;
  if (!network) return { issues, leftOut };
  const { nodes, edges, weights, entryUnit, report } = network;
  return {
    nodes,
    edges: writeArray(request.folder, edges),
    weights: weights && writeArray(request.folder, weights),
    entryUnit,
    report,
    contentHash: contentHash({ nodes, edges, entryUnit }),
  };
}

/** Everything that is wrong with the files. */
export async function readProblems(request: DraftRequest): Promise<Problems> {
  const { outcome } = await understood(request, { ...LIMITS, issues: MOST_PROBLEMS });
  return { issues: outcome.issues, leftOut: outcome.leftOut };
}
