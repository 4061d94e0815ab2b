import { readSource } from '../../formats/sources/readSource';
import type { RawSource, SourceHint, SourceLimits } from '../../formats/sources/types';
import type { ImportChoices, Question } from '../../formats/understanding/choices';
import { guessChoices } from '../../formats/understanding/guessChoices';
import { understand, type Understanding } from '../../formats/understanding/understand';

export const LIMITS: SourceLimits = {
  nodes: 5_000,
  edgeRows: 2_000_000,
  lineCharacters: 1_000_000,
  labelCharacters: 300,
  bytes: 52_428_800,
  columns: 10_000,
  depth: 100,
};

export interface Brought extends Understanding {
  readonly sources: readonly RawSource[];
  readonly guessed: ImportChoices;
  readonly asked: readonly Question[];
}

export type Files = Readonly<Record<string, string | Uint8Array>>;

/** Changes to the guessed choices. */
export type Changes = Partial<Omit<ImportChoices, 'columns'>> & {
  readonly nodes?: Partial<ImportChoices['columns']['nodes']>;
  readonly edges?: Partial<ImportChoices['columns']['edges']>;
};

/** Reads files, guesses, applies the changes, understands: as an import does. */
export async function bring(
  files: Files,
  changes: Changes = {},
  hints: Readonly<Record<string, SourceHint>> = {},
  limits: SourceLimits = LIMITS,
): Promise<Brought> {
  const sources: RawSource[] = [];
  for (const [name, content] of Object.entries(files)) {
    const bytes = typeof content === 'string' ? new TextEncoder().encode(content) : content;
    sources.push(await readSource({ name, bytes }, hints[name] ?? {}, limits));
  }
  const { choices: guessed, questions: asked } = guessChoices(sources);
  const { nodes, edges, ...others } = changes;
  const choices = {
    ...guessed,
    ...others,
    columns: {
      nodes: { ...guessed.columns.nodes, ...nodes },
      edges: { ...guessed.columns.edges, ...edges },
    },
  };
  return { sources, guessed, asked, ...understand(sources, choices, limits) };
}

/** The network as text that is easy to compare: 'id@entry[earliest,latest]' and 'a-b*weight'. */
export function drawn({ network, issues, questions }: Understanding): {
  nodes: string[];
  edges: string[];
} {
  if (!network) throw new Error(`No network: ${JSON.stringify({ issues, questions })}`);
  const { nodes, edges, weights } = network;
  return {
    nodes: nodes.map(({ id, entry, earliest, latest }) => {
      const window = earliest === null && latest === null ? '' : `[${earliest},${latest}]`;
      return `${id}@${entry}${window}`;
    }),
    edges: Array.from({ length: edges.length / 2 }, (_, at) => {
      const ends = [edges[2 * at], edges[2 * at + 1]].map((row) => nodes[row ?? 0]?.id);
      return `${ends.join('-')}${weights ? `*${weights[at]}` : ''}`;
    }),
  };
}

/** Issues as 'file:line:field', and their messages. */
export const placesOf = ({ issues }: Understanding): string[] =>
  issues.map(({ file, line, field }) => [file, line ?? '', field ?? ''].join(':'));
