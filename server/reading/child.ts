import { setPriority } from 'node:os';
import { readDraft, readDraftNetwork, readProblems } from './draft';
import { readGrown } from './grown';
import type { NetworkOnDisk, Problems, ReadAnswer, ReadRequest } from './messages';
import { readTwoFiles } from './twoFiles';

/** Answering requests goes before reading. */
const NICENESS = 10;

const orProblems = (outcome: NetworkOnDisk | Problems): ReadAnswer =>
  'nodes' in outcome ? { kind: 'network', network: outcome } : { kind: 'problems', ...outcome };

async function answerTo(request: ReadRequest): Promise<ReadAnswer> {
  switch (request.kind) {
    case 'two_files':
      return orProblems(await readTwoFiles(request));
    case 'grown':
      return readGrown(request);
    case 'view':
      return { kind: 'view', draft: await readDraft(request) };
    case 'network':
      return orProblems(await readDraftNetwork(request));
    case 'problems':
      return { kind: 'problems', ...(await readProblems(request)) };
  }
}

const broken = (error: unknown): ReadAnswer => ({
  kind: 'broken',
  message: error instanceof Error ? (error.stack ?? error.message) : String(error),
});

setPriority(NICENESS);
// Listening keeps the process until the server, which has the answer then, ends it or is gone.
process.on('message', (request: ReadRequest) => {
  void answerTo(request)
    .catch(broken)
    .then((answer) => process.send?.(answer));
});
